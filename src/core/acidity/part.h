/* One fragment of a salt or mixture as a molecule of its own, with its sites.
 *
 * Acidities were measured for ions and molecules, not for the salts and hydrates they are drawn as:
 * a counter-ion beside the acid says nothing about it.
 */
#pragma once

#include "core/acidity/site.h"

typedef struct {
  EnlMolecule *mol;  /* owned, finished */
  EnlSites sites;    /* owned; atoms numbered as in mol */
  uint32_t *site_of; /* for each site here its index among the sites of the whole */
} EnlPart;

/* The part made of the atoms with fragment[atom] == index. A site that is spread over several alike
 * fragments belongs to that of its first atom. `sites->no_enol` is not carried over. Caller:
 * enl_part_free. */
EnlPart *enl_part_new (const EnlMolecule *mol, const EnlSites *sites, const uint32_t *fragment,
                       uint32_t index) ENL_MUST_USE;
void enl_part_free (EnlPart *part);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlPart, enl_part_free)
