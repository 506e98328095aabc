#include <jansson.h>

#include "app/window-private.h"

static json_t *
site_state (const EnlAnalysis *a, uint32_t place)
{
  uint32_t s = a->rank[place];
  const EnlSite *site = &a->sites->site[s];
  json_t *object = json_pack ("{s:i, s:s, s:i, s:f, s:s}", "rank", (int)place + 1, "position",
                              site->position, "hydrogens", (int)site->hydrogens, "pka",
                              a->estimate[s].value, "basis", enl_basis_text (a->estimate[s].basis));

  if (a->estimate[s].remark)
    json_object_set_new (object, "remark", json_string (a->estimate[s].remark));
  return object;
}

static json_t *
lab_state (EnlWindow *self, uint32_t index)
{
  const EnlLabEntry *e = enl_workset_lab (enl_session_set (self->session), index);
  EnlLabOutcome outcome = enl_session_lab_outcome (self->session, index);
  json_t *object = json_pack ("{s:s, s:s, s:s, s:s, s:f, s:f, s:b}", "name", e->name, "structure",
                              e->structure, "note", e->note, "solvent", enl_solvent_id (e->solvent),
                              "pka", e->pka, "sigma", e->sigma, "contradicts", outcome.contradicts);

  if (outcome.remark)
    json_object_set_new (object, "remark", json_string (outcome.remark));
  if (outcome.fault) {
    g_autofree char *message = enl_error_message (outcome.fault);
    json_object_set_new (object, "fault", json_string (message));
  }
  return object;
}

static json_t *
substrate_state (EnlWindow *self, uint32_t index)
{
  const EnlSubstrate *s = enl_workset_get (enl_session_set (self->session), index);
  EnlOutcome outcome = enl_session_outcome (self->session, index);
  json_t *object = json_object (), *sites = json_array ();

  json_object_set_new (object, "name", json_string (s->name));
  json_object_set_new (object, "text", json_string (s->text));
  json_object_set_new (object, "running", json_boolean (outcome.running));
  json_object_set_new (object, "current", json_boolean (outcome.current));
  if (outcome.error) {
    g_autofree char *message = enl_error_message (outcome.error);
    json_object_set_new (object, "error", json_string (message));
  }
  if (outcome.analysis) {
    json_object_set_new (object, "smiles", json_string (outcome.analysis->smiles));
    if (outcome.analysis->sites->no_enol)
      json_object_set_new (object, "reason", json_string (outcome.analysis->sites->no_enol));
    for (uint32_t i = 0; i < outcome.analysis->sites->n_sites; i++)
      json_array_append_new (sites, site_state (outcome.analysis, i));
  }
  json_object_set_new (object, "sites", sites);
  return object;
}

/* The explanation on show, or null. */
static json_t *
why_state (EnlWindow *self)
{
  const EnlWhyResult *result = enl_why_panel_result (self->why);
  json_t *lines = json_array (), *precedents = json_array ();
  double value[ENL_WHY_LINES];

  if (!result) {
    json_decref (lines);
    json_decref (precedents);
    return json_null ();
  }
  enl_why_round (result->why, 1, value);
  for (uint32_t i = 0; i < result->why->n_lines; i++)
    json_array_append_new (
        lines, json_pack ("{s:s, s:f}", "words", result->why->line[i].words, "value", value[i]));
  for (uint32_t i = 0; i < result->n_pictures; i++)
    json_array_append_new (precedents, json_string (result->picture[i].row->name));
  return json_pack ("{s:o, s:f, s:s, s:o}", "lines", lines, "pka", result->why->value, "width",
                    result->why->width, "precedents", precedents);
}

/* The weigh-out on show. */
static json_t *
weigh_state (EnlWindow *self)
{
  const char *fault;
  const EnlWeighList *list = enl_weigh_panel_list (self->weigh, &fault);

  if (!list)
    return json_pack ("{s:s}", "fault", fault);
  const EnlWeighPart *part = &list->line[0].weighing->part[0];
  g_autofree char *amount = enl_weigh_amount_text (part);
  return json_pack ("{s:s, s:s, s:f, s:s, s:f}", "fault", "", "base",
                    list->line[0].weighing->base->id, "mmol", list->mmol, "amount", amount, "equiv",
                    list->line[0].weighing->equivalents);
}

char *
enl_window_state (EnlWindow *self)
{
  const EnlWorkset *set = enl_session_set (self->session);
  const EnlSelection *selection = enl_workset_selection (set);
  json_t *root = json_object (), *substrates = json_array (), *lab = json_array ();
  uint32_t site = enl_session_site (self->session);

  /* A long set would make every change slow: the probe shows its beginning. */
  for (uint32_t i = 0; i < MIN (enl_workset_size (set), 12); i++)
    json_array_append_new (substrates, substrate_state (self, i));
  json_object_set_new (root, "size", json_integer (enl_workset_size (set)));
  json_object_set_new (root, "substrates", substrates);
  for (uint32_t i = 0; i < MIN (enl_workset_lab_size (set), 12); i++)
    json_array_append_new (lab, lab_state (self, i));
  json_object_set_new (root, "lab", lab);
  json_object_set_new (root, "solvent",
                       json_string (enl_solvent_id (enl_workset_conditions (set)->solvent)));
  json_object_set_new (
      root, "substrate",
      json_integer (selection->substrate == ENL_NONE ? -1 : (int)selection->substrate));
  json_object_set_new (root, "site", json_integer (site == ENL_NONE ? -1 : (int)site));
  json_object_set_new (root, "base", json_string (selection->base));
  json_object_set_new (root, "detail",
                       json_string (gtk_stack_get_visible_child_name (self->details)));
  json_object_set_new (root, "why", why_state (self));
  json_object_set_new (root, "curve", json_string (enl_curve_panel_words (self->curve)));
  json_object_set_new (root, "matrix", json_string (enl_matrix_view_words (self->matrix)));
  json_object_set_new (root, "weigh", weigh_state (self));
  json_object_set_new (root, "busy", json_boolean (enl_session_busy (self->session)));
  json_object_set_new (root, "unsaved", json_boolean (enl_session_unsaved (self->session)));
  char *text = json_dumps (root, JSON_COMPACT);
  char *out = g_strdup (text ? text : "");
  free (text);
  json_decref (root);
  return out;
}
