/* Undo and redo: whole sets before each change, without limit. */
#pragma once

#include "core/workset/workset.h"

typedef struct EnlHistory EnlHistory;

EnlHistory *enl_history_new (void) ENL_MUST_USE;
void enl_history_free (EnlHistory *history);
void enl_history_clear (EnlHistory *history);

/* Remembers `set` as it is before a change and forgets what could be redone. Changes in a row with
 * the same `join` word (typing in one field) are one step; NULL is always a step of its own. */
void enl_history_push (EnlHistory *history, const EnlWorkset *set, const char *join);
/* Takes back the last push: the change did not happen. */
void enl_history_drop (EnlHistory *history);

bool enl_history_can_undo (const EnlHistory *history);
bool enl_history_can_redo (const EnlHistory *history);
/* The set to go to, owned by the caller, or NULL at the end; `now` is remembered for the way back.
 */
EnlWorkset *enl_history_undo (EnlHistory *history, const EnlWorkset *now);
EnlWorkset *enl_history_redo (EnlHistory *history, const EnlWorkset *now);
