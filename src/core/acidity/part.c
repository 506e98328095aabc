#include "core/acidity/part.h"

static EnlMolecule *
cut_out (const EnlMolecule *mol, const uint32_t *fragment, uint32_t index, uint32_t *renumber)
{
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree bool *remove = g_new0 (bool, n);
  EnlMolecule *part = enl_molecule_copy (mol);

  for (uint32_t a = 0; a < n; a++)
    remove[a] = fragment[a] != index;
  enl_molecule_remove_atoms (part, remove, renumber);
  enl_molecule_finish (part);
  return part;
}

static EnlSite
move_site (const EnlSite *site, const uint32_t *renumber)
{
  EnlSite moved = *site;

  moved.position = NULL;
  moved.atom = g_new (uint32_t, site->n_atoms);
  moved.n_atoms = 0;
  for (uint32_t k = 0; k < site->n_atoms; k++)
    if (renumber[site->atom[k]] != ENL_NONE)
      moved.atom[moved.n_atoms++] = renumber[site->atom[k]];
  return moved;
}

EnlPart *
enl_part_new (const EnlMolecule *mol, const EnlSites *sites, const uint32_t *fragment,
              uint32_t index)
{
  EnlPart *part = g_new0 (EnlPart, 1);
  g_autofree uint32_t *renumber = g_new (uint32_t, enl_molecule_atoms (mol));

  part->mol = cut_out (mol, fragment, index, renumber);
  part->sites.site = g_new0 (EnlSite, sites->n_sites + 1);
  part->site_of = g_new0 (uint32_t, sites->n_sites + 1);
  for (uint32_t i = 0; i < sites->n_sites; i++) {
    if (fragment[sites->site[i].atom[0]] != index)
      continue;
    part->site_of[part->sites.n_sites] = i;
    part->sites.site[part->sites.n_sites++] = move_site (&sites->site[i], renumber);
  }
  return part;
}

void
enl_part_free (EnlPart *part)
{
  if (!part)
    return;
  enl_molecule_free (part->mol);
  for (uint32_t i = 0; i < part->sites.n_sites; i++)
    g_free (part->sites.site[i].atom);
  g_free (part->sites.site);
  g_free (part->site_of);
  g_free (part);
}
