#include "core/acidity/kernel.h"

#include <math.h>
#include <string.h>

EnlSiteSet *
enl_site_set_new (uint32_t n)
{
  EnlSiteSet *set = g_new0 (EnlSiteSet, 1);

  set->n = n;
  set->z = g_new0 (double, (size_t)n *ENL_N_DESCRIPTORS + 1);
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
  g_free (set->z);
  g_free (set->shells);
  g_array_unref (set->marks);
  g_free (set->element);
  g_free (set->solvent);
  g_free (set->linear);
  g_free (set->smooth);
  g_free (set);
}

void
enl_site_set_describe (EnlSiteSet *set, uint32_t index, EnlSurvey *survey, const EnlPi *pi,
                       uint32_t atom, EnlSolvent solvent)
{
  g_assert (index < set->n);
  enl_descriptors_fill (survey, pi, atom, set->z + (size_t)index * ENL_N_DESCRIPTORS);
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

void
enl_site_set_standardise (EnlSiteSet *set, const double *centre, const double *scale)
{
  for (uint32_t i = 0; i < set->n; i++)
    for (uint32_t k = 0; k < ENL_N_DESCRIPTORS; k++) {
      double *z = &set->z[(size_t)i * ENL_N_DESCRIPTORS + k];
      *z = scale[k] > 0 ? (*z - centre[k]) / scale[k] : 0;
      *z = (float)CLAMP (*z, -ENL_DESCRIPTOR_CLIP, ENL_DESCRIPTOR_CLIP);
    }
}

void
enl_site_set_scale (EnlSiteSet *set, const EnlHyper *hyper)
{
  size_t total = (size_t)set->n * ENL_N_DESCRIPTORS;
  double by_linear[ENL_N_DESCRIPTORS], by_smooth[ENL_N_DESCRIPTORS];

  if (!set->linear) {
    set->linear = g_new (double, total + 1);
    set->smooth = g_new (double, total + 1);
  }
  for (int k = 0; k < ENL_N_DESCRIPTORS; k++) {
    by_linear[k] = sqrt (hyper->value[ENL_H_linear_weight + k] / ENL_N_DESCRIPTORS);
    by_smooth[k] = sqrt (hyper->value[ENL_H_smooth_weight + k]);
  }
  for (size_t i = 0; i < total; i++) {
    set->linear[i] = set->z[i] * by_linear[i % ENL_N_DESCRIPTORS];
    set->smooth[i] = set->z[i] * by_smooth[i % ENL_N_DESCRIPTORS];
  }
}

/* Four sums at a time: the compiler may not reorder floating sums by itself. */
static void
products (const double *a, const double *b, const double *c, const double *d, double *dot,
          double *square)
{
  double p[4] = {0}, q[4] = {0};
  int k = 0;

  for (; k + 4 <= ENL_N_DESCRIPTORS; k += 4)
    for (int j = 0; j < 4; j++) {
      double gap = c[k + j] - d[k + j];
      p[j] += a[k + j] * b[k + j];
      q[j] += gap * gap;
    }
  for (; k < ENL_N_DESCRIPTORS; k++) {
    p[0] += a[k] * b[k];
    q[0] += (c[k] - d[k]) * (c[k] - d[k]);
  }
  *dot = p[0] + p[1] + p[2] + p[3];
  *square = q[0] + q[1] + q[2] + q[3];
}

double
enl_kernel_likeness (const EnlHyper *hyper, const double likeness[ENL_N_SHELLS])
{
  double sum = 0, weight = 0;

  for (int d = 0; d < ENL_N_SHELLS; d++) {
    sum += hyper->value[ENL_H_shell + d] * likeness[d];
    weight += hyper->value[ENL_H_shell + d];
  }
  return sum / weight;
}

void
enl_kernel_pair (const EnlSiteSet *a, uint32_t i, const EnlSiteSet *b, uint32_t j,
                 EnlKernelParts *parts)
{
  size_t at = (size_t)i * ENL_N_DESCRIPTORS, bt = (size_t)j * ENL_N_DESCRIPTORS;
  double square;

  products (a->linear + at, b->linear + bt, a->smooth + at, b->smooth + bt, &parts->linear,
            &square);
  parts->distance = sqrt (square);
  parts->likeness = 0;
  parts->same_element = a->element[i] == b->element[j];
  parts->same_solvent = a->solvent[i] == b->solvent[j];
}

void
enl_kernel_parts (const EnlHyper *hyper, const EnlSiteSet *a, uint32_t i, const EnlSiteSet *b,
                  uint32_t j, EnlKernelParts *parts)
{
  double likeness[ENL_N_SHELLS];

  enl_kernel_pair (a, i, b, j, parts);
  if (!parts->same_element)
    return;
  enl_shells_compare (&a->shells[i], &b->shells[j], likeness);
  parts->likeness = enl_kernel_likeness (hyper, likeness);
}

double
enl_kernel_smooth (const EnlHyper *hyper, const EnlKernelParts *parts)
{
  const double *h = hyper->value;
  double share = 1 + (parts->same_solvent ? h[ENL_H_smooth_solvent] : 0);

  return h[ENL_H_smooth] * share * exp (-parts->distance / h[ENL_H_smooth_length]);
}

double
enl_kernel_environment (const EnlHyper *hyper, const EnlKernelParts *parts)
{
  const double *h = hyper->value;
  double share = 1 + (parts->same_solvent ? h[ENL_H_environment_solvent] : 0);

  if (!parts->same_element)
    return 0;
  return h[ENL_H_environment] * share * exp (-(1 - parts->likeness) * h[ENL_H_environment_decay]);
}

double
enl_kernel_value (const EnlHyper *hyper, const EnlKernelParts *parts)
{
  const double *h = hyper->value;
  double same = parts->same_element, both = parts->same_element && parts->same_solvent;
  double linear =
      h[ENL_H_linear_common] + h[ENL_H_linear_element] * same + h[ENL_H_linear_solvent] * both;

  return ENL_OFFSET_VARIANCE * (1 + same + both) + parts->linear * linear +
         enl_kernel_smooth (hyper, parts) + enl_kernel_environment (hyper, parts);
}
