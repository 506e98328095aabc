/* One step from an acid to a simpler one, in a chemist's words.
 *
 * Order, outer to inner: what is far away; longer alkyl groups; substituents on aromatic rings;
 * fused benzene rings; rings opened; groups on the acidic atom, the weakest first; what hangs on
 * the other side of the group that stays. A step that cannot be made is skipped.
 */
#pragma once

#include "core/acidity/why-frame.h"

/* Each collects a change in `edit` and returns what the present structure has and the simpler one
 * has not ("phenyl on the carbon"), or NULL when it finds nothing to do. Caller: g_free. */

char *enl_why_step_trim (const EnlWhyFrame *frame, EnlDraftEdit *edit) ENL_MUST_USE;
/* The same without what stands one carbon further out and is no alkyl group. */
char *enl_why_step_chains (const EnlWhyFrame *frame, EnlDraftEdit *edit) ENL_MUST_USE;
char *enl_why_step_ring_groups (const EnlWhyFrame *frame, EnlDraftEdit *edit) ENL_MUST_USE;
char *enl_why_step_benzo (const EnlWhyFrame *frame, EnlDraftEdit *edit) ENL_MUST_USE;
char *enl_why_step_groups (const EnlWhyFrame *frame, EnlDraftEdit *edit) ENL_MUST_USE;
char *enl_why_step_far_side (const EnlWhyFrame *frame, EnlDraftEdit *edit) ENL_MUST_USE;

/* Opens a ring with the site or the group that stays in it; repeat until it returns false.
 * `*size` receives its size. */
bool enl_why_step_open_ring (const EnlWhyFrame *frame, EnlDraftEdit *edit, uint32_t *size);
/* Words for the rings of `frame` with the site or the group that stays in them. */
char *enl_why_step_ring_words (const EnlWhyFrame *frame, uint32_t size,
                               uint32_t opened) ENL_MUST_USE;
