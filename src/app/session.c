#include "app/session.h"

#include <math.h>
#include <string.h>

#include "app/history.h"
#include "app/job.h"
#include "app/lab-job.h"
#include "draw/whisker.h"

/* What the session holds beside each substrate of the set, in the same order. */
typedef struct {
  EnlAnalysis *analysis;
  EnlError error;
  bool has_error, current;
  GCancellable *cancellable; /* of the running worker, NULL: none */
} Slot;

struct _EnlSession {
  GObject parent;
  const EnlKnowledge *knowledge; /* without own values */
  EnlKnowledge *now;             /* held: with those of the set */
  EnlLabResult *lab;             /* what `now` was made of; NULL without own values */
  GCancellable *lab_cancellable; /* of the worker that makes the next one: analyses wait for it */
  EnlWorkset *set;
  GPtrArray *slot; /* Slot */
  EnlHistory *history;
  char *path;
  char *saved; /* text of the set as it was last saved or opened */
};

enum {
  SET_CHANGED,
  SUBSTRATE_CHANGED,
  SELECTION_CHANGED,
  CONDITIONS_CHANGED,
  LAB_CHANGED,
  STATE_CHANGED,
  N
};

static guint signal_id[N];

G_DEFINE_FINAL_TYPE (EnlSession, enl_session, G_TYPE_OBJECT)

/* ---- slots and workers ---- */

static void
slot_stop (Slot *slot)
{
  if (slot->cancellable)
    g_cancellable_cancel (slot->cancellable);
  g_clear_object (&slot->cancellable);
}

static void
slot_free (gpointer data)
{
  Slot *slot = data;

  slot_stop (slot);
  enl_analysis_free (slot->analysis);
  g_free (slot);
}

static Slot *
slot_at (EnlSession *self, uint32_t substrate)
{
  return g_ptr_array_index (self->slot, substrate);
}

typedef struct {
  EnlSession *session;
  Slot *slot; /* only compared, never followed: it may be gone */
  GCancellable *cancellable;
} Errand;

static void
job_done (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autofree Errand *errand = data;
  g_autoptr (EnlSession) self = errand->session;
  g_autoptr (GCancellable) mine = errand->cancellable;
  g_autoptr (EnlJobResult) done = enl_job_finish (result);
  guint index;

  (void)source;
  if (!done || !g_ptr_array_find (self->slot, errand->slot, &index))
    return;
  Slot *slot = slot_at (self, index);
  if (slot->cancellable != mine)
    return; /* a newer text is already on its way */
  g_clear_object (&slot->cancellable);
  slot->has_error = done->analysis == NULL;
  slot->error = done->error;
  if (done->analysis) {
    enl_analysis_free (slot->analysis);
    slot->analysis = g_steal_pointer (&done->analysis);
    slot->current = true;
  }
  g_signal_emit (self, signal_id[SUBSTRATE_CHANGED], 0, index);
  if (enl_workset_selection (self->set)->substrate == index)
    g_signal_emit (self, signal_id[SELECTION_CHANGED], 0);
}

static void
slot_start (EnlSession *self, uint32_t substrate)
{
  Slot *slot = slot_at (self, substrate);
  const char *text = enl_workset_get (self->set, substrate)->text;

  slot_stop (slot);
  slot->current = false;
  if (strspn (text, " \t\r\n") == strlen (text)) {
    g_clear_pointer (&slot->analysis, enl_analysis_free);
    slot->has_error = false;
    return;
  }
  if (self->lab_cancellable)
    return; /* on_lab_done starts it */
  slot->cancellable = g_cancellable_new ();
  Errand *errand = g_new0 (Errand, 1);
  errand->session = g_object_ref (self);
  errand->slot = slot;
  errand->cancellable = g_object_ref (slot->cancellable);
  enl_job_start (self->now, text, enl_workset_conditions (self->set)->solvent, slot->cancellable,
                 job_done, errand);
}

static void
restart_all (EnlSession *self)
{
  for (uint32_t i = 0; i < self->slot->len; i++)
    slot_start (self, i);
}

/* ---- own values ---- */

typedef struct {
  EnlSession *session;
  GCancellable *cancellable;
} LabErrand;

static void
take_lab (EnlSession *self, EnlLabResult *result)
{
  enl_knowledge_free (self->now);
  self->now = enl_knowledge_ref (result && result->knowledge ? result->knowledge : self->knowledge);
  g_clear_pointer (&self->lab, enl_lab_result_free);
  self->lab = result;
}

static void
on_lab_done (GObject *source, GAsyncResult *result, gpointer data)
{
  g_autofree LabErrand *errand = data;
  g_autoptr (EnlSession) self = errand->session;
  g_autoptr (GCancellable) mine = errand->cancellable;
  g_autoptr (EnlLabResult) done = enl_lab_job_finish (result);

  (void)source;
  if (!done || self->lab_cancellable != mine)
    return; /* newer values are already on their way */
  g_clear_object (&self->lab_cancellable);
  take_lab (self, g_steal_pointer (&done));
  restart_all (self);
  g_signal_emit (self, signal_id[LAB_CHANGED], 0);
}

/* Makes the knowledge anew after the own values of the set have changed. Without any it is there at
 * once, else analyses wait for a worker. */
static void
refresh_lab (EnlSession *self)
{
  if (self->lab_cancellable)
    g_cancellable_cancel (self->lab_cancellable);
  g_clear_object (&self->lab_cancellable);
  if (enl_workset_lab_size (self->set) == 0) {
    take_lab (self, NULL);
    return;
  }
  self->lab_cancellable = g_cancellable_new ();
  LabErrand *errand = g_new0 (LabErrand, 1);
  errand->session = g_object_ref (self);
  errand->cancellable = g_object_ref (self->lab_cancellable);
  enl_lab_job_start (self->knowledge, self->set, self->lab_cancellable, on_lab_done, errand);
}

/* Brings the slots in line with a set that was replaced: a substrate whose text is unchanged keeps
 * its analysis. */
static void
rebuild_slots (EnlSession *self, const EnlWorkset *before)
{
  g_autoptr (GPtrArray) old = g_steal_pointer (&self->slot);

  self->slot = g_ptr_array_new_with_free_func (slot_free);
  for (uint32_t i = 0; i < enl_workset_size (self->set); i++) {
    const char *text = enl_workset_get (self->set, i)->text;
    Slot *slot = NULL;
    for (uint32_t j = 0; before && j < old->len && !slot; j++)
      if (old->pdata[j] && strcmp (enl_workset_get (before, j)->text, text) == 0)
        slot = g_steal_pointer (&old->pdata[j]);
    bool fresh = !slot || !slot->current;
    g_ptr_array_add (self->slot, slot ? slot : g_new0 (Slot, 1));
    if (fresh)
      slot_start (self, i);
  }
  for (uint32_t j = 0; j < old->len; j++)
    if (!old->pdata[j])
      old->pdata[j] = g_new0 (Slot, 1);
}

/* ---- reading ---- */

const EnlKnowledge *
enl_session_knowledge (EnlSession *self)
{
  return self->knowledge;
}

const EnlWorkset *
enl_session_set (EnlSession *self)
{
  return self->set;
}

EnlOutcome
enl_session_outcome (EnlSession *self, uint32_t substrate)
{
  const Slot *slot = slot_at (self, substrate);

  bool waits = self->lab_cancellable && !slot->current;

  return (EnlOutcome){slot->analysis, slot->current, slot->cancellable || waits,
                      slot->has_error ? &slot->error : NULL};
}

/* Row of the lab that own value `index` became; ENL_NONE when it could not be used or is not known
 * yet. */
static uint32_t
lab_row (EnlSession *self, uint32_t index)
{
  for (uint32_t i = 0; self->lab && i < enl_lab_size (self->lab->lab); i++)
    if (enl_lab_row (self->lab->lab, i)->tag == index)
      return i;
  return ENL_NONE;
}

EnlLabOutcome
enl_session_lab_outcome (EnlSession *self, uint32_t index)
{
  const EnlLabJudgement *judgement = enl_estimator_lab (self->now->estimator);
  EnlLabOutcome outcome = {0};

  if (self->lab_cancellable || !self->lab || index >= self->lab->n)
    return outcome;
  uint32_t row = lab_row (self, index);
  if (self->lab->fault[index].code != ENL_OK)
    outcome.fault = &self->lab->fault[index];
  if (judgement && row < judgement->n_rows) {
    outcome.remark = judgement->site[judgement->site_of[row]].remark;
    outcome.contradicts = judgement->site[judgement->site_of[row]].contradicts;
  }
  return outcome;
}

/* Row of the lab that a site shows; ENL_NONE for none, or when the analysis is an older one. */
static uint32_t
shown_row (EnlSession *self, const EnlAnalysis *a, uint32_t site)
{
  const EnlLabJudgement *judgement = enl_estimator_lab (self->now->estimator);
  const EnlEstimate *e = &a->estimate[site];

  if (self->lab_cancellable || !judgement || a->knowledge != self->now || e->basis != ENL_BASIS_LAB)
    return ENL_NONE;
  return (uint32_t)e->row - (enl_reference_rows (self->now->reference) - judgement->n_rows);
}

uint32_t
enl_session_lab_shown (EnlSession *self, const EnlAnalysis *a, uint32_t site)
{
  uint32_t row = shown_row (self, a, site);

  return row == ENL_NONE ? ENL_NONE : enl_lab_row (self->lab->lab, row)->tag;
}

bool
enl_session_lab_belongs (EnlSession *self, uint32_t index, const EnlAnalysis *a, uint32_t site)
{
  const EnlLabJudgement *judgement = enl_estimator_lab (self->now->estimator);
  uint32_t shown = shown_row (self, a, site), row = lab_row (self, index);

  return shown != ENL_NONE && row != ENL_NONE &&
         judgement->site_of[shown] == judgement->site_of[row];
}

bool
enl_session_busy (EnlSession *self)
{
  for (uint32_t i = 0; i < self->slot->len; i++)
    if (slot_at (self, i)->cancellable)
      return true;
  return self->lab_cancellable != NULL;
}

void
enl_session_range (EnlSession *self, double *low, double *high)
{
  *low = INFINITY;
  *high = -INFINITY;
  for (uint32_t i = 0; i < self->slot->len; i++) {
    const EnlAnalysis *a = slot_at (self, i)->analysis;
    if (a)
      enl_whisker_range (a->estimate, a->sites->n_sites, low, high);
  }
}

bool
enl_session_unsaved (EnlSession *self)
{
  g_autofree char *now = enl_workset_write (self->set);

  return g_strcmp0 (now, self->saved) != 0;
}

const char *
enl_session_path (EnlSession *self)
{
  return self->path;
}

/* ---- changes ---- */

static void
remember (EnlSession *self, const char *join)
{
  enl_history_push (self->history, self->set, join);
}

static void
announce_set (EnlSession *self)
{
  g_signal_emit (self, signal_id[SET_CHANGED], 0);
  g_signal_emit (self, signal_id[SELECTION_CHANGED], 0);
  g_signal_emit (self, signal_id[STATE_CHANGED], 0);
}

void
enl_session_set_text (EnlSession *self, uint32_t substrate, const char *text)
{
  g_autofree char *join = g_strdup_printf ("text %u", substrate);

  if (strcmp (enl_workset_get (self->set, substrate)->text, text) == 0)
    return;
  remember (self, join);
  enl_workset_set_text (self->set, substrate, text);
  const EnlSelection *selection = enl_workset_selection (self->set);
  if (selection->substrate == substrate)
    enl_workset_select (self->set, substrate, ENL_NONE, NULL);
  slot_start (self, substrate);
  g_signal_emit (self, signal_id[SUBSTRATE_CHANGED], 0, substrate);
  g_signal_emit (self, signal_id[SELECTION_CHANGED], 0);
  g_signal_emit (self, signal_id[STATE_CHANGED], 0);
}

void
enl_session_set_name (EnlSession *self, uint32_t substrate, const char *name)
{
  g_autofree char *join = g_strdup_printf ("name %u", substrate);

  if (strcmp (enl_workset_get (self->set, substrate)->name, name) == 0)
    return;
  remember (self, join);
  enl_workset_set_name (self->set, substrate, name);
  g_signal_emit (self, signal_id[SUBSTRATE_CHANGED], 0, substrate);
  g_signal_emit (self, signal_id[STATE_CHANGED], 0);
}

EnlStatus
enl_session_add (EnlSession *self, const char *name, const char *text, EnlError *err)
{
  uint32_t selected = enl_workset_selection (self->set)->substrate;
  uint32_t index = selected == ENL_NONE ? enl_workset_size (self->set) : selected + 1;

  remember (self, NULL);
  EnlStatus status = enl_workset_insert (self->set, index, name, text, err);
  if (status != ENL_OK) {
    enl_history_drop (self->history);
    return status;
  }
  g_ptr_array_insert (self->slot, (int)index, g_new0 (Slot, 1));
  enl_workset_select (self->set, index, ENL_NONE, NULL);
  slot_start (self, index);
  announce_set (self);
  return ENL_OK;
}

void
enl_session_remove (EnlSession *self, uint32_t substrate)
{
  remember (self, NULL);
  enl_workset_remove (self->set, substrate);
  g_ptr_array_remove_index (self->slot, substrate);
  announce_set (self);
}

void
enl_session_move (EnlSession *self, uint32_t from, uint32_t to)
{
  if (from == to)
    return;
  remember (self, NULL);
  enl_workset_move (self->set, from, to);
  Slot *slot = g_ptr_array_steal_index (self->slot, from);
  g_ptr_array_insert (self->slot, (int)to, slot);
  announce_set (self);
}

EnlStatus
enl_session_set_conditions (EnlSession *self, const EnlConditions *conditions, EnlError *err)
{
  const EnlConditions *now = enl_workset_conditions (self->set);
  bool solvent = now->solvent != conditions->solvent;
  EnlStatus status = enl_conditions_check (conditions, err);

  if (status != ENL_OK || memcmp (now, conditions, sizeof *now) == 0)
    return status;
  remember (self, solvent ? NULL : "conditions");
  enl_workset_set_conditions (self->set, conditions);
  if (solvent)
    restart_all (self);
  g_signal_emit (self, signal_id[CONDITIONS_CHANGED], 0);
  g_signal_emit (self, signal_id[STATE_CHANGED], 0);
  return ENL_OK;
}

static void
announce_bases (EnlSession *self)
{
  g_signal_emit (self, signal_id[CONDITIONS_CHANGED], 0);
  g_signal_emit (self, signal_id[STATE_CHANGED], 0);
}

EnlStatus
enl_session_add_base (EnlSession *self, const EnlOwnBase *base, EnlError *err)
{
  const EnlSelection *now = enl_workset_selection (self->set);
  EnlStatus status = enl_own_base_check (base, self->knowledge->bases, err);

  if (status != ENL_OK)
    return status;
  remember (self, NULL);
  status = enl_workset_add_base (self->set, base, err);
  if (status != ENL_OK) {
    enl_history_drop (self->history);
    return status;
  }
  enl_workset_select (self->set, now->substrate, now->atom, base->name);
  announce_bases (self);
  return ENL_OK;
}

void
enl_session_remove_base (EnlSession *self, const char *id)
{
  for (uint32_t i = 0; i < enl_workset_bases (self->set); i++)
    if (strcmp (enl_workset_base (self->set, i)->name, id) == 0) {
      remember (self, NULL);
      enl_workset_remove_base (self->set, i);
      announce_bases (self);
      return;
    }
}

/* After a change of the own values. */
static void
announce_lab (EnlSession *self)
{
  refresh_lab (self);
  restart_all (self);
  g_signal_emit (self, signal_id[LAB_CHANGED], 0);
  g_signal_emit (self, signal_id[STATE_CHANGED], 0);
}

static bool
holds_lab (const EnlWorkset *set, uint32_t n, const EnlLabEntry *entry)
{
  for (uint32_t i = 0; i < n; i++)
    if (enl_lab_entry_equal (enl_workset_lab (set, i), entry))
      return true;
  return false;
}

EnlStatus
enl_session_add_lab (EnlSession *self, EnlLabEntry *const *entry, uint32_t n, uint32_t *added,
                     EnlError *err)
{
  g_autoptr (EnlWorkset) next = enl_workset_copy (self->set);
  uint32_t before = enl_workset_lab_size (next);

  for (uint32_t i = 0; i < n; i++) {
    if (holds_lab (next, before, entry[i]))
      continue;
    EnlStatus status = enl_workset_add_lab (next, entry[i], err);
    if (status != ENL_OK)
      return status;
  }
  if (added)
    *added = enl_workset_lab_size (next) - before;
  if (enl_workset_lab_size (next) == before)
    return ENL_OK;
  remember (self, NULL);
  enl_workset_free (self->set);
  self->set = g_steal_pointer (&next);
  announce_lab (self);
  return ENL_OK;
}

void
enl_session_set_lab (EnlSession *self, uint32_t index, const EnlLabEntry *entry)
{
  if (enl_lab_entry_equal (enl_workset_lab (self->set, index), entry))
    return;
  remember (self, NULL);
  enl_workset_set_lab (self->set, index, entry);
  announce_lab (self);
}

void
enl_session_remove_lab (EnlSession *self, uint32_t index)
{
  remember (self, NULL);
  enl_workset_remove_lab (self->set, index);
  announce_lab (self);
}

bool
enl_session_can_undo (EnlSession *self)
{
  return enl_history_can_undo (self->history);
}

bool
enl_session_can_redo (EnlSession *self)
{
  return enl_history_can_redo (self->history);
}

static void
step (EnlSession *self, EnlWorkset *to)
{
  g_autoptr (EnlWorkset) before = self->set;
  bool solvent = enl_workset_conditions (before)->solvent != enl_workset_conditions (to)->solvent;

  bool lab = !enl_workset_same_lab (before, to);

  self->set = to;
  if (lab)
    refresh_lab (self);
  rebuild_slots (self, before);
  if (solvent || lab)
    restart_all (self);
  g_signal_emit (self, signal_id[CONDITIONS_CHANGED], 0);
  g_signal_emit (self, signal_id[LAB_CHANGED], 0);
  announce_set (self);
}

void
enl_session_undo (EnlSession *self)
{
  EnlWorkset *to = enl_history_undo (self->history, self->set);

  if (to)
    step (self, to);
}

void
enl_session_redo (EnlSession *self)
{
  EnlWorkset *to = enl_history_redo (self->history, self->set);

  if (to)
    step (self, to);
}

/* ---- selection ---- */

void
enl_session_select (EnlSession *self, uint32_t substrate, uint32_t atom)
{
  const EnlSelection *now = enl_workset_selection (self->set);

  if (now->substrate == substrate && now->atom == atom)
    return;
  enl_workset_select (self->set, substrate, atom, NULL);
  g_signal_emit (self, signal_id[SELECTION_CHANGED], 0);
}

void
enl_session_select_base (EnlSession *self, const char *id)
{
  const EnlSelection *now = enl_workset_selection (self->set);

  if (strcmp (now->base, id) == 0)
    return;
  enl_workset_select (self->set, now->substrate, now->atom, id);
  g_signal_emit (self, signal_id[SELECTION_CHANGED], 0);
}

uint32_t
enl_session_site (EnlSession *self)
{
  const EnlSelection *selection = enl_workset_selection (self->set);

  if (selection->substrate == ENL_NONE)
    return ENL_NONE;
  const EnlAnalysis *a = slot_at (self, selection->substrate)->analysis;
  return a ? enl_analysis_site (a, selection->atom) : ENL_NONE;
}

/* ---- files ---- */

void
enl_session_replace (EnlSession *self, EnlWorkset *set, const char *path)
{
  char *copy = g_strdup (path);

  enl_workset_free (self->set);
  self->set = set;
  g_free (self->path);
  self->path = copy;
  g_free (self->saved);
  self->saved = enl_workset_write (set);
  enl_history_clear (self->history);
  if (enl_workset_selection (set)->substrate == ENL_NONE && enl_workset_size (set))
    enl_workset_select (set, 0, ENL_NONE, NULL);
  refresh_lab (self);
  rebuild_slots (self, NULL);
  g_signal_emit (self, signal_id[CONDITIONS_CHANGED], 0);
  g_signal_emit (self, signal_id[LAB_CHANGED], 0);
  announce_set (self);
}

EnlStatus
enl_session_open (EnlSession *self, const char *path, EnlError *err)
{
  EnlWorkset *set = NULL;
  EnlStatus status = enl_workset_load (path, &set, err);

  if (status == ENL_OK)
    enl_session_replace (self, set, path);
  return status;
}

EnlStatus
enl_session_save (EnlSession *self, const char *path, EnlError *err)
{
  g_autofree char *target = g_strdup (path ? path : self->path);

  g_assert (target);
  EnlStatus status = enl_workset_save (self->set, target, err);
  if (status != ENL_OK)
    return status;
  g_free (self->path);
  self->path = g_steal_pointer (&target);
  g_free (self->saved);
  self->saved = enl_workset_write (self->set);
  g_signal_emit (self, signal_id[STATE_CHANGED], 0);
  return ENL_OK;
}

/* ---- object ---- */

static void
enl_session_dispose (GObject *object)
{
  EnlSession *self = ENL_SESSION (object);

  for (uint32_t i = 0; i < self->slot->len; i++)
    slot_stop (slot_at (self, i));
  if (self->lab_cancellable)
    g_cancellable_cancel (self->lab_cancellable);
  g_clear_object (&self->lab_cancellable);
  G_OBJECT_CLASS (enl_session_parent_class)->dispose (object);
}

static void
enl_session_finalize (GObject *object)
{
  EnlSession *self = ENL_SESSION (object);

  g_ptr_array_unref (self->slot);
  enl_workset_free (self->set);
  enl_history_free (self->history);
  enl_lab_result_free (self->lab);
  enl_knowledge_free (self->now);
  g_free (self->path);
  g_free (self->saved);
  G_OBJECT_CLASS (enl_session_parent_class)->finalize (object);
}

static void
enl_session_class_init (EnlSessionClass *klass)
{
  GObjectClass *object_class = G_OBJECT_CLASS (klass);
  GType type = G_TYPE_FROM_CLASS (klass);

  object_class->dispose = enl_session_dispose;
  object_class->finalize = enl_session_finalize;
  signal_id[SET_CHANGED] =
      g_signal_new ("set-changed", type, G_SIGNAL_RUN_LAST, 0, NULL, NULL, NULL, G_TYPE_NONE, 0);
  signal_id[SUBSTRATE_CHANGED] = g_signal_new ("substrate-changed", type, G_SIGNAL_RUN_LAST, 0,
                                               NULL, NULL, NULL, G_TYPE_NONE, 1, G_TYPE_UINT);
  signal_id[SELECTION_CHANGED] = g_signal_new ("selection-changed", type, G_SIGNAL_RUN_LAST, 0,
                                               NULL, NULL, NULL, G_TYPE_NONE, 0);
  signal_id[CONDITIONS_CHANGED] = g_signal_new ("conditions-changed", type, G_SIGNAL_RUN_LAST, 0,
                                                NULL, NULL, NULL, G_TYPE_NONE, 0);
  signal_id[LAB_CHANGED] =
      g_signal_new ("lab-changed", type, G_SIGNAL_RUN_LAST, 0, NULL, NULL, NULL, G_TYPE_NONE, 0);
  signal_id[STATE_CHANGED] =
      g_signal_new ("state-changed", type, G_SIGNAL_RUN_LAST, 0, NULL, NULL, NULL, G_TYPE_NONE, 0);
}

static void
enl_session_init (EnlSession *self)
{
  self->set = enl_workset_new ();
  self->saved = enl_workset_write (self->set);
  self->slot = g_ptr_array_new_with_free_func (slot_free);
  self->history = enl_history_new ();
}

EnlSession *
enl_session_new (const EnlKnowledge *knowledge)
{
  EnlSession *self = g_object_new (ENL_TYPE_SESSION, NULL);

  self->knowledge = knowledge;
  self->now = enl_knowledge_ref (knowledge);
  return self;
}
