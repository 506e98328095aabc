#include "app/base-item.h"

#include <math.h>
#include <string.h>

struct _EnlBaseItem {
  GObject parent;
  char *id, *cell[ENL_N_CELLS], *details;
};

G_DEFINE_FINAL_TYPE (EnlBaseItem, enl_base_item, G_TYPE_OBJECT)

static void
enl_base_item_finalize (GObject *object)
{
  EnlBaseItem *self = ENL_BASE_ITEM (object);

  g_free (self->id);
  g_free (self->details);
  for (int i = 0; i < ENL_N_CELLS; i++)
    g_free (self->cell[i]);
  G_OBJECT_CLASS (enl_base_item_parent_class)->finalize (object);
}

static void
enl_base_item_class_init (EnlBaseItemClass *klass)
{
  G_OBJECT_CLASS (klass)->finalize = enl_base_item_finalize;
}

static void
enl_base_item_init (EnlBaseItem *self)
{
  (void)self;
}

/* A filled share that says the verdict without colour. */
static const char *
verdict_shape (EnlVerdict verdict)
{
  static const char *const shape[ENL_N_VERDICTS] = {
      [ENL_VERDICT_COMPLETE] = "●", [ENL_VERDICT_SHARED] = "◒",    [ENL_VERDICT_LARGELY] = "◕",
      [ENL_VERDICT_PARTIAL] = "◑",  [ENL_VERDICT_TRACE] = "◔",     [ENL_VERDICT_NO] = "○",
      [ENL_VERDICT_REACTS] = "↯",   [ENL_VERDICT_NO_NUMBER] = "?", [ENL_VERDICT_OFF_SCALE] = "–",
      [ENL_VERDICT_SOLVENT] = "×",
  };

  return shape[verdict];
}

static char *
percent (double share)
{
  if (share > 0.9995)
    return g_strdup ("100 %");
  if (share >= 0.1)
    return g_strdup_printf ("%.0f %%", 100 * share);
  if (share >= 0.001)
    return g_strdup_printf ("%.1f %%", 100 * share);
  return g_strdup ("< 0.1 %");
}

static char *
conversion_text (const EnlCandidate *c)
{
  if (isnan (c->conversion))
    return g_strdup ("");
  g_autofree char *value = percent (c->conversion);
  if (c->high - c->low < 0.01)
    return g_steal_pointer (&value);
  return g_strdup_printf ("%s (%.0f–%.0f)", value, 100 * c->low, 100 * c->high);
}

/* What speaks against it or can hurt someone is marked; remarks are not. */
static const char *
mark_of (EnlEffect effect)
{
  return effect == ENL_EFFECT_NOTE ? "·" : "⚠";
}

static char *
details_text (const EnlBase *base, const EnlCandidate *c)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < c->n_cautions; i++) /* the reason has told one of them already */
    if (!strstr (c->reason, c->caution[i].clause))
      g_string_append_printf (out, "%s%s %s", out->len ? "\n" : "",
                              mark_of (c->caution[i].rule->effect), c->caution[i].text);
  if (base->nucleophilicity[0])
    g_string_append_printf (out, "%sNucleophilicity: %s", out->len ? "\n" : "",
                            base->nucleophilicity);
  if (base->typical_solvents[0])
    g_string_append_printf (out, "%sUsual solvents: %s; %s °C", out->len ? "\n" : "",
                            base->typical_solvents, base->typical_temperature);
  if (base->form[0])
    g_string_append_printf (out, "%sSold as: %s", out->len ? "\n" : "", base->form);
  if (base->incompatible[0])
    g_string_append_printf (out, "%sKeep away from: %s", out->len ? "\n" : "", base->incompatible);
  if (base->note[0])
    g_string_append_printf (out, "%s%s", out->len ? "\n" : "", base->note);
  return g_string_free (out, FALSE);
}

EnlBaseItem *
enl_base_item_new (const EnlBase *base, const EnlCandidate *c)
{
  EnlBaseItem *self = g_object_new (ENL_TYPE_BASE_ITEM, NULL);

  self->id = g_strdup (base->id);
  self->cell[ENL_CELL_NAME] = g_strdup (base->name);
  self->cell[ENL_CELL_PKAH] = isnan (c->pkah) ? g_strdup ("") : g_strdup_printf ("%.1f", c->pkah);
  self->cell[ENL_CELL_GAP] = isnan (c->gap) ? g_strdup ("") : g_strdup_printf ("%+.1f", c->gap);
  self->cell[ENL_CELL_CONVERSION] = conversion_text (c);
  self->cell[ENL_CELL_VERDICT] = g_strdup_printf ("%s %s", verdict_shape (c->verdict), c->words);
  self->cell[ENL_CELL_REASON] = g_strdup (c->reason);
  self->details = details_text (base, c);
  return self;
}

const char *
enl_base_item_id (EnlBaseItem *self)
{
  return self->id;
}

const char *
enl_base_item_cell (EnlBaseItem *self, EnlBaseCell cell)
{
  g_assert (cell < ENL_N_CELLS);
  return self->cell[cell];
}

const char *
enl_base_item_details (EnlBaseItem *self)
{
  return self->details;
}
