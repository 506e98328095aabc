#include "core/acidity/model.h"

#include <math.h>

#include "core/acidity/validate.h"
#include "resources/model.h"
#include "tests/core/acidity/acidity-help.h"
#include "tests/runner.h"

static EnlReference *acids;
static const char *bytes;
static size_t size;

static void
setup (void)
{
  acids = open_acids ();
  bytes = enl_model ("model.bin", &size);
  ck_assert_ptr_nonnull (bytes);
}

static void
teardown (void)
{
  enl_reference_free (acids);
}

static EnlHyper
built_hyper (void)
{
  g_autofree char *path =
      g_build_filename (g_getenv ("ENL_SOURCE_DIR"), "resources", "estimator.tsv", NULL);
  g_autofree char *text = NULL;
  size_t length = 0;
  EnlHyper hyper;
  EnlError err;

  ck_assert (g_file_get_contents (path, &text, &length, NULL));
  ck_assert_int_eq (enl_hyper_parse (text, length, &hyper, &err), ENL_OK);
  return hyper;
}

START_TEST (embedded_model_is_that_of_the_tables)
{
  EnlHyper hyper = built_hyper ();
  EnlModel *model = NULL;

  ck_assert_int_eq (enl_model_open (acids, bytes, size, &model, NULL), ENL_OK);
  ck_assert_mem_eq (&hyper, &model->hyper, sizeof hyper);
  enl_model_free (model);
}
END_TEST

START_TEST (file_comes_back_the_same)
{
  EnlModel *model = NULL;

  ck_assert_int_eq (enl_model_open (acids, bytes, size, &model, NULL), ENL_OK);
  g_autoptr (GByteArray) again = enl_model_write (model, acids);
  ck_assert_uint_eq (again->len, size);
  ck_assert_mem_eq (again->data, bytes, size);
  enl_model_free (model);
}
END_TEST

static EnlStatus
try_open (const char *data, size_t length)
{
  EnlModel *model = NULL;
  EnlError err;
  EnlStatus status = enl_model_open (acids, data, length, &model, &err);

  ck_assert (status == ENL_OK || (!model && err.text[0] && err.advice[0]));
  enl_model_free (model);
  return status;
}

START_TEST (damage_is_noticed)
{
  g_autofree char *copy = g_memdup2 (bytes, size);

  ck_assert_int_eq (try_open (NULL, 0), ENL_ERROR_FORMAT);
  for (size_t length = 0; length < size; length += 1 + length / 3)
    ck_assert_int_eq (try_open (bytes, length), ENL_ERROR_FORMAT);
  for (size_t at = 0; at < size; at += 1 + at / 4) {
    copy[at] ^= 0x10;
    ck_assert_msg (try_open (copy, size) == ENL_ERROR_FORMAT, "byte %zu", at);
    copy[at] ^= 0x10;
  }
  ck_assert_int_eq (try_open (copy, size), ENL_OK);
}
END_TEST

START_TEST (another_table_is_refused)
{
  size_t length = 0;
  const char *text = enl_resource ("acids.tsv", &length);
  g_autofree char *other = g_strndup (text, length);
  EnlReference *ref = NULL;
  EnlModel *model = NULL;
  EnlError err;

  memcpy (strstr (other, "\t26.5\t"), "\t26.4\t", 6);
  ck_assert_int_eq (enl_reference_new (other, length, &ref, &err), ENL_OK);
  ck_assert_int_eq (enl_model_open (ref, bytes, size, &model, &err), ENL_ERROR_FORMAT);
  enl_reference_free (ref);
}
END_TEST

/* ---- leaving out ---- */

/* The table of acids with `shift` added to all rows of one compound. */
static char *
changed_table (const char *key, double shift)
{
  GString *text = g_string_new ("name\tsmiles\tpka\tsolvent\tsigma\tsource\n");

  for (uint32_t i = 0; i < enl_reference_rows (acids); i++) {
    const EnlReferenceRow *row = enl_reference_row (acids, i);
    char pka[G_ASCII_DTOSTR_BUF_SIZE], sigma[G_ASCII_DTOSTR_BUF_SIZE];
    g_ascii_dtostr (pka, sizeof pka, row->pka + (strcmp (row->key, key) == 0 ? shift : 0));
    g_ascii_dtostr (sigma, sizeof sigma, row->sigma);
    g_string_append_printf (text, "%s\t%s\t%s\t%s\t%s\tacids.tsv\n", row->name, row->smiles, pka,
                            enl_solvent_id (row->solvent), sigma);
  }
  return g_string_free (text, FALSE);
}

static EnlLeftOut *
left_out (const char *text, EnlFold fold)
{
  EnlHyper hyper = built_hyper ();
  EnlReference *ref = NULL;
  EnlModel *model = NULL;
  EnlLeftOut *out = NULL;
  EnlError err;

  ck_assert_int_eq (enl_reference_new (text, strlen (text), &ref, &err), ENL_OK);
  ck_assert_int_eq (enl_model_build (ref, &hyper, &model, &err), ENL_OK);
  g_autoptr (GByteArray) file = enl_model_write (model, ref);
  ck_assert_int_eq (enl_validate_rows (ref, (const char *)file->data, file->len, fold, &out, &err),
                    ENL_OK);
  enl_model_free (model);
  enl_reference_free (ref);
  return out;
}

/* Compounds of several kinds: alone in its family, in a crowd, and measured in two solvents. */
static const char *const changed_compound[] = {"acetone", "acetylacetone", "4-chlorophenol",
                                               "hydrogen cyanide"};

/* Key of the compound and its first row. */
static const char *
key_of (const char *name)
{
  for (uint32_t i = 0; i < enl_reference_rows (acids); i++)
    if (strcmp (enl_reference_row (acids, i)->name, name) == 0)
      return enl_reference_row (acids, i)->key;
  ck_abort_msg ("%s is not in the table", name);
  return NULL;
}

/* The proof that a left-out row is never seen: another value for a compound changes nothing about
 * its own left-out predictions and intervals, but does change those of others. */
START_TEST (left_out_rows_are_not_seen)
{
  const char *key = key_of (changed_compound[_i / 2]);
  EnlFold fold = _i % 2 ? ENL_FOLD_CLUSTER : ENL_FOLD_COMPOUND;
  g_autofree char *wild = changed_table (key, 5);
  g_autofree EnlLeftOut *a = NULL;
  g_autofree EnlLeftOut *b = left_out (wild, fold);
  uint32_t own = 0;
  double most = 0;
  EnlError err;

  ck_assert_int_eq (enl_validate_rows (acids, bytes, size, fold, &a, &err), ENL_OK);
  for (uint32_t i = 0; i < enl_reference_rows (acids); i++) {
    if (strcmp (enl_reference_row (acids, i)->key, key) != 0) {
      most = fmax (most, fabs (a[i].predicted - b[i].predicted));
      continue;
    }
    own++;
    ck_assert_double_eq_tol (a[i].predicted, b[i].predicted, 1e-9);
    ck_assert_double_eq_tol (a[i].sd, b[i].sd, 1e-9);
    ck_assert_double_eq_tol (a[i].half, b[i].half, 1e-9);
  }
  ck_assert_uint_gt (own, 0);
  ck_assert_double_gt (most, 0.1);
}
END_TEST

static Suite *
model_suite (void)
{
  Suite *suite = suite_create ("acidity model");
  TCase *tc = tcase_create ("all");

  tcase_set_timeout (tc, 120);
  tcase_add_unchecked_fixture (tc, setup, teardown);
  tcase_add_test (tc, embedded_model_is_that_of_the_tables);
  tcase_add_test (tc, file_comes_back_the_same);
  tcase_add_test (tc, damage_is_noticed);
  tcase_add_test (tc, another_table_is_refused);
  tcase_add_loop_test (tc, left_out_rows_are_not_seen, 0, 2 * (int)ENL_COUNT (changed_compound));
  suite_add_tcase (suite, tc);
  return suite;
}

ENL_TEST_MAIN (model_suite)
