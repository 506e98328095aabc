#include "tests/draw/sample.h"

#include <check.h>
#include <string.h>

#include "core/layout/layout.h"
#include "core/molecule/symmetry.h"
#include "core/notation/smiles.h"
#include "draw/plane.h"

static EnlMolecule *
read_smiles (const char *smiles)
{
  EnlMolecule *mol = NULL;
  EnlError err;

  EnlStatus status = enl_smiles_parse (smiles, strlen (smiles), &mol, &err);
  ck_assert_msg (status == ENL_OK, "%s: %s", smiles, err.text);
  return mol;
}

EnlMolecule *
sample_molecule (const char *smiles)
{
  EnlMolecule *mol = read_smiles (smiles);
  EnlError err;

  ck_assert_msg (enl_layout (mol, &err) == ENL_OK, "%s: %s", smiles, err.text);
  return mol;
}

EnlMolecule *
sample_placed (const char *smiles, const SampleSpot *spot)
{
  EnlMolecule *mol = read_smiles (smiles);

  for (uint32_t i = 0; i < enl_molecule_atoms (mol); i++) {
    enl_molecule_edit_atom (mol, i)->x = spot[i].x;
    enl_molecule_edit_atom (mol, i)->y = spot[i].y;
  }
  enl_molecule_set_has_layout (mol, true);
  return mol;
}

static bool
accepts (const EnlMolecule *mol, uint32_t atom)
{
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++) {
    const EnlAtom *next = enl_molecule_atom (mol, enl_molecule_neighbour (mol, atom, k));
    uint32_t order = enl_molecule_bond (mol, enl_molecule_bond_at (mol, atom, k))->order;
    if (order > 1 && (next->element == 8 || next->element == 7))
      return true;
  }
  return false;
}

static bool
acidic (const EnlMolecule *mol, uint32_t atom)
{
  const EnlAtom *a = enl_molecule_atom (mol, atom);

  if (a->hydrogens == 0)
    return false;
  if (a->element == 8 || a->element == 7 || a->element == 16)
    return true;
  if (a->element != 6 || enl_molecule_order_sum (mol, atom) != enl_molecule_degree (mol, atom))
    return false;
  for (uint32_t k = 0; k < enl_molecule_degree (mol, atom); k++)
    if (accepts (mol, enl_molecule_neighbour (mol, atom, k)))
      return true;
  return false;
}

static void
add_site (SampleSites *sample, const EnlMolecule *mol, const uint32_t *class_of, uint32_t first)
{
  EnlSite *site = &sample->sites.site[sample->sites.n_sites++];

  site->atom = g_new (uint32_t, enl_molecule_atoms (mol));
  site->position = g_strdup ("beside an acceptor of the tests");
  for (uint32_t i = first; i < enl_molecule_atoms (mol); i++)
    if (class_of[i] == class_of[first]) {
      site->atom[site->n_atoms++] = i;
      site->hydrogens += enl_molecule_atom (mol, i)->hydrogens;
    }
}

SampleSites *
sample_sites (const EnlMolecule *mol)
{
  SampleSites *sample = g_new0 (SampleSites, 1);
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree uint32_t *class_of = g_new (uint32_t, n);
  g_autofree bool *seen = g_new0 (bool, n);

  enl_symmetry_classes (mol, true, class_of);
  sample->sites.site = g_new0 (EnlSite, n);
  sample->estimate = g_new0 (EnlEstimate, n);
  sample->rank = g_new0 (uint32_t, n);
  for (uint32_t i = 0; i < n; i++)
    if (acidic (mol, i) && !seen[class_of[i]]) {
      seen[class_of[i]] = true;
      add_site (sample, mol, class_of, i);
    }
  for (uint32_t s = 0; s < sample->sites.n_sites; s++) {
    double value = 9.3 + 3.7 * s;
    sample->rank[s] = s;
    sample->estimate[s] = (EnlEstimate){.value = value,
                                        .low = value - 2.1,
                                        .high = value + 2.4,
                                        .basis = (EnlBasis)(s % ENL_N_BASES_OF_VALUE)};
  }
  return sample;
}

void
sample_sites_free (SampleSites *sample)
{
  if (!sample)
    return;
  for (uint32_t s = 0; s < sample->sites.n_sites; s++) {
    g_free (sample->sites.site[s].atom);
    g_free (sample->sites.site[s].position);
  }
  g_free (sample->sites.site);
  g_free (sample->estimate);
  g_free (sample->rank);
  g_free (sample);
}

static double
line_in_box (const EnlShape *line, EnlRect box)
{
  double length = 0;

  if (line->kind == ENL_SHAPE_LINE)
    return enl_segment_inside (line->point[0], line->point[1], box);
  if (line->kind == ENL_SHAPE_POLYGON)
    for (uint32_t i = 0; i < line->n_points; i++)
      length += enl_segment_inside (line->point[i], line->point[(i + 1) % line->n_points], box);
  return length;
}

static bool
is_badge (const EnlShape *shape)
{
  return (shape->kind == ENL_SHAPE_DISC || shape->kind == ENL_SHAPE_RECT) && shape->opacity > 0 &&
         shape->site != ENL_NONE &&
         (shape->tone == ENL_TONE_SITE || shape->tone == ENL_TONE_ACTIVE);
}

char *
sample_collisions (const EnlScene *scene)
{
  GString *out = g_string_new (NULL);

  for (uint32_t i = 0; i < enl_scene_shapes (scene); i++) {
    const EnlShape *text = enl_scene_shape (scene, i);
    if (text->kind != ENL_SHAPE_TEXT)
      continue;
    for (uint32_t j = 0; j < enl_scene_shapes (scene); j++) {
      const EnlShape *other = enl_scene_shape (scene, j);
      bool same = other->site != ENL_NONE && other->site == text->site;
      if (line_in_box (other, enl_rect_grow (text->box, -0.5)) > 1)
        g_string_append_printf (out, "a line runs %.1f px through \"%s\"\n",
                                line_in_box (other, text->box), text->text);
      if (is_badge (other) && !same && enl_rect_overlap (other->box, text->box) > 1)
        g_string_append_printf (out, "a badge covers \"%s\"\n", text->text);
    }
  }
  return g_string_free (out, out->len == 0);
}
