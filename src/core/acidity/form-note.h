/* What stabilises an anion without a contributing structure. */
#pragma once

#include "core/acidity/form.h"

/* "also stabilised by induction and polarisation: S(=O)2, P+", a new string (g_free), or NULL.
 * Looks at the neighbours of every atom that carries the charge in some form. */
char *enl_form_note (const EnlForms *forms) ENL_MUST_USE;
