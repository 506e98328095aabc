/* The matrix of bases: a row a base, a column a substrate, the verdict in every cell by word, shape
 * and colour. */
#pragma once

#include "core/bases/matrix.h"
#include "draw/structure-scene.h"

typedef struct {
  const char *name;       /* plain text */
  const EnlMolecule *mol; /* with layout it is drawn; else, or NULL, the name stands alone */
  const EnlSite *site;    /* asked about; NULL: none */
  uint32_t rank;          /* of the site */
  double pka;
} EnlMatrixColumn;

typedef struct {
  const EnlMatrix *matrix;       /* everything is borrowed while the scene is made */
  const EnlMatrixColumn *column; /* one a substrate of the matrix */
  const EnlBaseTable *bases;
  const EnlConditions *conditions;
  const char *caption; /* plain text below everything, may be NULL */
} EnlMatrixSheet;

/* Cells carry `substrate` = column and `atom` = index of the base. */
EnlScene *enl_matrix_scene (const EnlMatrixSheet *sheet, const EnlTheme *theme) ENL_MUST_USE;
