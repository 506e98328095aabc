#include "core/acidity/model.h"

#include <math.h>
#include <string.h>

#include "core/acidity/checksum.h"
#include "core/acidity/gaussian.h"

#define MAGIC           "ENLMODEL"
#define VERSION         1u
#define BYTE_ORDER_MARK 0x01020304u

typedef struct {
  char magic[8];
  uint32_t version, byte_order;
  uint32_t n_rows, n_descriptors, n_hyper, n_marks;
  uint64_t reference; /* checksum of the table of acids */
  uint64_t body_size, body;
} Header;

static void
append (GByteArray *out, const void *data, size_t size)
{
  g_byte_array_append (out, data, (guint)size);
}

static void
append_rows (GByteArray *out, const EnlSiteSet *rows)
{
  for (uint32_t i = 0; i < rows->n; i++) {
    append (out, rows->shells[i].start, sizeof rows->shells[i].start);
    append (out, rows->shells[i].total, sizeof rows->shells[i].total);
  }
  append (out, rows->marks->data, rows->marks->len * sizeof (EnlMark));
  append (out, rows->z, (size_t)rows->n * ENL_N_DESCRIPTORS * sizeof (float));
  append (out, rows->element, rows->n);
  append (out, rows->solvent, rows->n);
}

GByteArray *
enl_model_write (const EnlModel *model, const EnlReference *ref)
{
  const EnlSiteSet *rows = model->rows;
  g_autoptr (GByteArray) body = g_byte_array_new ();
  GByteArray *out = g_byte_array_new ();

  append (body, &model->hyper, sizeof model->hyper);
  append (body, model->centre, sizeof model->centre);
  append (body, model->scale, sizeof model->scale);
  append (body, model->width, sizeof model->width);
  append (body, model->alpha, rows->n * sizeof (double));
  append (body, model->factor, ENL_PACKED (rows->n, 0) * sizeof (double));
  append_rows (body, rows);
  Header header = {
      .version = VERSION,
      .byte_order = BYTE_ORDER_MARK,
      .n_rows = rows->n,
      .n_descriptors = ENL_N_DESCRIPTORS,
      .n_hyper = ENL_N_HYPER,
      .n_marks = rows->marks->len,
      .reference = enl_reference_checksum (ref),
      .body_size = body->len,
      .body = enl_checksum (body->data, body->len),
  };
  memcpy (header.magic, MAGIC, sizeof header.magic);
  append (out, &header, sizeof header);
  append (out, body->data, body->len);
  return out;
}

/* ---- reading ---- */

typedef struct {
  const char *at;
  size_t left;
} Cursor;

static bool
take (Cursor *cursor, void *to, size_t size)
{
  if (cursor->left < size)
    return false;
  memcpy (to, cursor->at, size);
  cursor->at += size;
  cursor->left -= size;
  return true;
}

static EnlStatus
damaged (EnlError *err, const char *what)
{
  return enl_error_set (err, ENL_ERROR_FORMAT, "make the model again with 'enolith-fit build'",
                        "the fitted model cannot be used: %s", what);
}

static EnlStatus
check_header (const Header *header, const EnlReference *ref, const Cursor *body, EnlError *err)
{
  if (memcmp (header->magic, MAGIC, sizeof header->magic) != 0)
    return damaged (err, "it is no model file");
  if (header->byte_order != BYTE_ORDER_MARK)
    return damaged (err, "it was made on a machine with another byte order");
  if (header->version != VERSION || header->n_descriptors != ENL_N_DESCRIPTORS ||
      header->n_hyper != ENL_N_HYPER)
    return damaged (err, "it was made by another version of the program");
  if (header->reference != enl_reference_checksum (ref) ||
      header->n_rows != enl_reference_rows (ref))
    return damaged (err, "it was made from another table of acids");
  if (header->body_size != body->left || header->body != enl_checksum (body->at, body->left))
    return damaged (err, "its contents are damaged");
  return ENL_OK;
}

/* An array that stays in the file, or a copy of it in `*owned` (freed before) when it does not
 * stand on the boundary that its type needs. */
static const void *
take_array (Cursor *cursor, size_t size, size_t boundary, void **owned)
{
  const char *at = cursor->at;

  g_clear_pointer (owned, g_free);
  if (cursor->left < size)
    return NULL;
  cursor->at += size;
  cursor->left -= size;
  if ((uintptr_t)at % boundary == 0)
    return at;
  return *owned = g_memdup2 (at, size);
}

static bool
take_shells (Cursor *cursor, EnlSiteSet *rows, uint32_t n_marks)
{
  uint64_t sum = 0;

  for (uint32_t i = 0; i < rows->n; i++) {
    EnlShells *shells = &rows->shells[i];
    if (!take (cursor, shells->start, sizeof shells->start) ||
        !take (cursor, shells->total, sizeof shells->total) || shells->start[0] != 0)
      return false;
    for (int d = 0; d < ENL_N_SHELLS; d++)
      if (shells->start[d + 1] < shells->start[d])
        return false;
    sum += shells->start[ENL_N_SHELLS];
  }
  if (sum != n_marks || cursor->left / sizeof (EnlMark) < n_marks)
    return false;
  g_array_set_size (rows->marks, n_marks);
  return take (cursor, rows->marks->data, n_marks * sizeof (EnlMark));
}

static bool
take_rows (Cursor *cursor, EnlSiteSet *rows, uint32_t n_marks)
{
  if (!take_shells (cursor, rows, n_marks))
    return false;
  rows->z = take_array (cursor, (size_t)rows->n * ENL_N_DESCRIPTORS * sizeof (float),
                        _Alignof(float), (void **)&rows->owned_z);
  if (!rows->z || !take (cursor, rows->element, rows->n) || !take (cursor, rows->solvent, rows->n))
    return false;
  enl_site_set_link (rows);
  return true;
}

static bool
take_body (Cursor *cursor, EnlModel *model, const Header *header)
{
  uint32_t n = header->n_rows;

  if (!take (cursor, &model->hyper, sizeof model->hyper) ||
      !take (cursor, model->centre, sizeof model->centre) ||
      !take (cursor, model->scale, sizeof model->scale) ||
      !take (cursor, model->width, sizeof model->width))
    return false;
  model->alpha = take_array (cursor, n * sizeof (double), _Alignof(double), &model->owned_alpha);
  model->factor = take_array (cursor, ENL_PACKED (n, 0) * sizeof (double), _Alignof(double),
                              &model->owned_factor);
  if (!model->alpha || !model->factor)
    return false;
  model->rows = enl_site_set_new (n);
  return take_rows (cursor, model->rows, header->n_marks) && cursor->left == 0;
}

EnlStatus
enl_model_open (const EnlReference *ref, const char *bytes, size_t size, EnlModel **out,
                EnlError *err)
{
  g_autoptr (EnlModel) model = g_new0 (EnlModel, 1);
  Cursor cursor = {bytes, size};
  Header header;
  EnlStatus status;

  *out = NULL;
  if (!bytes || !take (&cursor, &header, sizeof header))
    return damaged (err, "it is too short");
  if ((status = check_header (&header, ref, &cursor, err)) != ENL_OK)
    return status;
  if (!take_body (&cursor, model, &header))
    return damaged (err, "its parts do not fit together");
  enl_relevance_init (&model->relevance, &model->hyper);
  *out = g_steal_pointer (&model);
  return ENL_OK;
}
