/* The list for the balance as pages to print. */
#pragma once

#include "core/bases/weigh-list.h"
#include "draw/scene.h"

/* The pages (EnlScene, owned by the array), at least one, with boxes to tick and a line for what
 * was really taken. */
GPtrArray *enl_weigh_pages (const EnlWeighList *list, const EnlTheme *theme) ENL_MUST_USE;
