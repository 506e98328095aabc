/* Blocks of text and pictures that flow over A4 pages, each page a scene of its own.
 *
 * A block is never cut: where it does not fit it begins a new page. Page numbers and a running line
 * are set when the flow is finished. */
#pragma once

#include "draw/scene.h"

typedef struct EnlFlow EnlFlow;

/* `running` stands at the foot of every page, plain text. */
EnlFlow *enl_flow_new (const EnlTheme *theme, const char *running) ENL_MUST_USE;
void enl_flow_free (EnlFlow *flow);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlFlow, enl_flow_free)

/* Width of the text area, px. */
double enl_flow_width (void);

/* Plain text wrapped to the width less `indent`. */
void enl_flow_paragraph (EnlFlow *flow, const char *plain, double size, bool bold, EnlTone tone,
                         double indent);
/* The same with a short label hanging to the left of it. */
void enl_flow_item (EnlFlow *flow, const char *label, const char *plain, double size, EnlTone tone,
                    double indent);
/* A heading that stays with `below` px of what follows. */
void enl_flow_heading (EnlFlow *flow, const char *plain, double size, double below);
/* A scene as one block; its own coordinates start at the left top corner of the block. */
void enl_flow_block (EnlFlow *flow, const EnlScene *scene);
/* Space, unless a page begins here. */
void enl_flow_gap (EnlFlow *flow, double px);
/* A thin line over the whole width. */
void enl_flow_rule (EnlFlow *flow);
/* What follows begins a new page, unless the present one is empty. */
void enl_flow_break (EnlFlow *flow);

/* The pages (EnlScene, owned by the array), at least one. The flow is spent. */
GPtrArray *enl_flow_finish (EnlFlow *flow) ENL_MUST_USE;
