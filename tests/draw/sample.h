/* Molecules for the tests of pictures. */
#pragma once

#include "draw/structure-scene.h"

typedef struct {
  double x, y; /* bond lengths, y up */
} SampleSpot;

/* Reads and lays out; the test fails when that is not possible. */
EnlMolecule *sample_molecule (const char *smiles);
/* Reads and takes hand-set coordinates, one an atom, so that pictures do not depend on the layout
 * engine. */
EnlMolecule *sample_placed (const char *smiles, const SampleSpot *spot);

/* Sites by a rule of thumb of the tests' own (O-H, N-H, S-H, and C-H beside C=O, C#N and NO2, one
 * class per symmetry class) with invented values that use every basis in turn. */
typedef struct {
  EnlSites sites;
  EnlEstimate *estimate;
  uint32_t *rank;
} SampleSites;

SampleSites *sample_sites (const EnlMolecule *mol);
void sample_sites_free (SampleSites *sample);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (SampleSites, sample_sites_free)

/* Sentences about lines and badges that run through texts they do not belong to; NULL when none.
 * (enl_scene_faults looks at texts and the frame only.) */
char *sample_collisions (const EnlScene *scene);
