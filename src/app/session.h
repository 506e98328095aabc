/* The session: the set in the window, what is selected, and the analysis of every substrate.
 *
 * Views watch its signals and never call each other. Every change of the set goes through here, so
 * that it can be undone. Signals:
 *   "set-changed"                substrates were added, removed, moved or replaced
 *   "substrate-changed" (guint)  name, text or analysis of one substrate is new
 *   "selection-changed"          substrate, site or base
 *   "conditions-changed"         solvent, equivalents, concentration (analyses follow)
 *   "lab-changed"                own values, or what is known about them (analyses follow)
 *   "state-changed"              title, unsaved changes, undo and redo
 */
#pragma once

#include <gio/gio.h>

#include "core/workset/analysis.h"
#include "core/workset/workset.h"

#define ENL_TYPE_SESSION (enl_session_get_type ())
G_DECLARE_FINAL_TYPE (EnlSession, enl_session, ENL, SESSION, GObject)

/* What is known about one substrate now. Borrowed from the session until the next signal. */
typedef struct {
  const EnlAnalysis *analysis; /* of the last good text; NULL before there is one */
  bool current;                /* the analysis belongs to the present text and solvent */
  bool running;                /* a worker is on it */
  const EnlError *error;       /* of the present text; NULL when it reads well or is empty */
} EnlOutcome;

/* `knowledge` must outlive the session. */
EnlSession *enl_session_new (const EnlKnowledge *knowledge);

const EnlKnowledge *enl_session_knowledge (EnlSession *session);
const EnlWorkset *enl_session_set (EnlSession *session);
EnlOutcome enl_session_outcome (EnlSession *session, uint32_t substrate);
/* What is known about one own value of the set. Borrowed until the next signal. */
typedef struct {
  const EnlError *fault; /* why it cannot be used, NULL: it can */
  const char *remark;    /* what there is to say about its site, or NULL */
  bool contradicts;      /* another own value or the published one */
} EnlLabOutcome;

EnlLabOutcome enl_session_lab_outcome (EnlSession *session, uint32_t index);
/* Index of the own value that an estimate of a current analysis shows; ENL_NONE: none. */
uint32_t enl_session_lab_shown (EnlSession *session, const EnlAnalysis *analysis, uint32_t site);
/* True when own value `index` is one of those for this site. */
bool enl_session_lab_belongs (EnlSession *session, uint32_t index, const EnlAnalysis *analysis,
                              uint32_t site);

/* True while any worker runs. */
bool enl_session_busy (EnlSession *session);
/* Smallest and largest pKa bound over all substrates, for a common axis. */
void enl_session_range (EnlSession *session, double *low, double *high);

/* ---- changes; each is one step of undo, typing in one field is joined ---- */

void enl_session_set_text (EnlSession *session, uint32_t substrate, const char *text);
void enl_session_set_name (EnlSession *session, uint32_t substrate, const char *name);
/* Inserts behind the selected substrate (or at the end) and selects it. */
EnlStatus enl_session_add (EnlSession *session, const char *name, const char *text, EnlError *err);
void enl_session_remove (EnlSession *session, uint32_t substrate);
void enl_session_move (EnlSession *session, uint32_t from, uint32_t to);
EnlStatus enl_session_set_conditions (EnlSession *session, const EnlConditions *conditions,
                                      EnlError *err);
/* A base of the set's own; it becomes the selected one. */
EnlStatus enl_session_add_base (EnlSession *session, const EnlOwnBase *base, EnlError *err);
/* Nothing happens when the set has no base of this id. */
void enl_session_remove_base (EnlSession *session, const char *id);
/* Own values; analyses follow, and `added` (NULL allowed) says how many were not there before. */
EnlStatus enl_session_add_lab (EnlSession *session, EnlLabEntry *const *entry, uint32_t n,
                               uint32_t *added, EnlError *err);
void enl_session_set_lab (EnlSession *session, uint32_t index, const EnlLabEntry *entry);
void enl_session_remove_lab (EnlSession *session, uint32_t index);
bool enl_session_can_undo (EnlSession *session);
bool enl_session_can_redo (EnlSession *session);
void enl_session_undo (EnlSession *session);
void enl_session_redo (EnlSession *session);

/* ---- selection; kept in the file, no step of undo ---- */

/* `atom` as in EnlSelection. */
void enl_session_select (EnlSession *session, uint32_t substrate, uint32_t atom);
void enl_session_select_base (EnlSession *session, const char *id);
/* Index of the selected site in the analysis of the selected substrate; ENL_NONE: none. */
uint32_t enl_session_site (EnlSession *session);

/* ---- files ---- */

/* A new set in place of the present one; forgets history. */
void enl_session_replace (EnlSession *session, EnlWorkset *set, const char *path);
EnlStatus enl_session_open (EnlSession *session, const char *path, EnlError *err);
/* `path` NULL: where it came from (assertion that there is one). */
EnlStatus enl_session_save (EnlSession *session, const char *path, EnlError *err);
const char *enl_session_path (EnlSession *session); /* NULL: never saved */
bool enl_session_unsaved (EnlSession *session);
