#include "core/acidity/kernel.h"

#include <math.h>
#include <string.h>

EnlSiteSet *
enl_site_set_new (uint32_t n)
{
  EnlSiteSet *set = g_new0 (EnlSiteSet, 1);

  set->n = n;
  set->z = set->owned_z = g_new0 (float, (size_t)n *ENL_N_DESCRIPTORS + 1);
  set->shells = g_new0 (EnlShells, n + 1);
  set->marks = g_array_new (FALSE, FALSE, sizeof (EnlMark));
  set->element = g_new0 (uint8_t, n + 1);
  set->solvent = g_new0 (uint8_t, n + 1);
  return set;
}

void
enl_site_set_free (EnlSiteSet *set)
{
  if (!set)
    return;
  g_free (set->owned_z);
  g_free (set->shells);
  g_array_unref (set->marks);
  g_free (set->element);
  g_free (set->solvent);
  g_free (set);
}

void
enl_site_set_describe (EnlSiteSet *set, uint32_t index, EnlSurvey *survey, const EnlPi *pi,
                       uint32_t atom, EnlSolvent solvent)
{
  double value[ENL_N_DESCRIPTORS];

  g_assert (index < set->n && set->owned_z);
  enl_descriptors_fill (survey, pi, atom, value);
  for (size_t k = 0; k < ENL_N_DESCRIPTORS; k++)
    set->owned_z[(size_t)index * ENL_N_DESCRIPTORS + k] = (float)value[k];
  enl_shells_collect (survey, atom, set->marks, &set->shells[index]);
  set->element[index] = enl_molecule_atom (enl_survey_molecule (survey), atom)->element;
  set->solvent[index] = (uint8_t)solvent;
}

void
enl_site_set_link (EnlSiteSet *set)
{
  uint32_t at = 0;

  for (uint32_t i = 0; i < set->n; i++) {
    set->shells[i].mark = (const EnlMark *)(void *)set->marks->data + at;
    at += set->shells[i].start[ENL_N_SHELLS];
  }
  g_assert (at == set->marks->len);
}

static void
copy_entries (EnlSiteSet *to, uint32_t at, const EnlSiteSet *from)
{
  memcpy (to->owned_z + (size_t)at * ENL_N_DESCRIPTORS, from->z,
          (size_t)from->n * ENL_N_DESCRIPTORS * sizeof *from->z);
  memcpy (to->shells + at, from->shells, from->n * sizeof *from->shells);
  memcpy (to->element + at, from->element, from->n);
  memcpy (to->solvent + at, from->solvent, from->n);
  g_array_append_vals (to->marks, from->marks->data, from->marks->len);
}

EnlSiteSet *
enl_site_set_join (const EnlSiteSet *a, const EnlSiteSet *b)
{
  EnlSiteSet *set = enl_site_set_new (a->n + b->n);

  copy_entries (set, 0, a);
  copy_entries (set, a->n, b);
  enl_site_set_link (set);
  return set;
}

void
enl_site_set_standardise (EnlSiteSet *set, const double *centre, const double *scale)
{
  for (uint32_t i = 0; i < set->n; i++)
    for (uint32_t k = 0; k < ENL_N_DESCRIPTORS; k++) {
      float *z = &set->owned_z[(size_t)i * ENL_N_DESCRIPTORS + k];
      double standard = scale[k] > 0 ? ((double)*z - centre[k]) / scale[k] : 0;
      *z = (float)CLAMP (standard, -ENL_DESCRIPTOR_CLIP, ENL_DESCRIPTOR_CLIP);
    }
}

void
enl_relevance_init (EnlRelevance *relevance, const EnlHyper *hyper)
{
  for (int k = 0; k < ENL_N_DESCRIPTORS; k++)
    relevance->smooth[k] = (float)hyper->value[ENL_H_relevance + k];
}

/* Product and weighted squared distance. Sums are double, so that both ends of a pair and every
 * machine agree; four strands of each: the compiler may not reorder a floating sum by itself. */
static void
products (const EnlRelevance *relevance, const float *a, const float *b, double *dot,
          double *square)
{
  const float *smooth = relevance->smooth;
  double p[4] = {0}, q[4] = {0};
  int k = 0;

  for (; k + 4 <= ENL_N_DESCRIPTORS; k += 4)
    for (int j = 0; j < 4; j++) {
      double x = a[k + j], y = b[k + j], gap = x - y;
      p[j] += x * y;
      q[j] += smooth[k + j] * gap * gap;
    }
  for (; k < ENL_N_DESCRIPTORS; k++) {
    double x = a[k], y = b[k], gap = x - y;
    p[0] += x * y;
    q[0] += smooth[k] * gap * gap;
  }
  *dot = (p[0] + p[1]) + (p[2] + p[3]);
  *square = (q[0] + q[1]) + (q[2] + q[3]);
}

void
enl_kernel_pair (const EnlRelevance *relevance, const EnlSiteSet *a, uint32_t i,
                 const EnlSiteSet *b, uint32_t j, EnlKernelParts *parts)
{
  size_t at = (size_t)i * ENL_N_DESCRIPTORS, bt = (size_t)j * ENL_N_DESCRIPTORS;

  products (relevance, a->z + at, b->z + bt, &parts->linear, &parts->square);
  parts->linear /= ENL_N_DESCRIPTORS;
  parts->same_element = a->element[i] == b->element[j];
  parts->same_solvent = a->solvent[i] == b->solvent[j];
}

double
enl_kernel_linear_share (const EnlHyper *hyper, const EnlKernelParts *parts)
{
  const double *h = hyper->value;

  return h[ENL_H_linear_common] + (parts->same_element ? h[ENL_H_linear_element] : 0) +
         (parts->same_element && parts->same_solvent ? h[ENL_H_linear_solvent] : 0);
}

double
enl_kernel_smooth_share (const EnlHyper *hyper, const EnlKernelParts *parts)
{
  const double *h = hyper->value;

  return (h[ENL_H_smooth_common] + (parts->same_element ? h[ENL_H_smooth_element] : 0)) *
         (1 + (parts->same_solvent ? h[ENL_H_smooth_solvent] : 0));
}

double
enl_kernel_smooth (const EnlHyper *hyper, const EnlKernelParts *parts)
{
  double length = hyper->value[ENL_H_smooth_length], shape = hyper->value[ENL_H_smooth_shape];
  double u = 1 + parts->square / (2 * shape * length * length);

  return enl_kernel_smooth_share (hyper, parts) * exp (-shape * log (u));
}

double
enl_kernel_linear (const EnlHyper *hyper, const EnlKernelParts *parts)
{
  double same = parts->same_element, both = parts->same_element && parts->same_solvent;

  return ENL_OFFSET_VARIANCE * (1 + same + both) +
         parts->linear * enl_kernel_linear_share (hyper, parts);
}

double
enl_kernel_value (const EnlHyper *hyper, const EnlKernelParts *parts)
{
  return enl_kernel_linear (hyper, parts) + enl_kernel_smooth (hyper, parts);
}
