#include "core/bases/equilibrium.h"

#include <math.h>

#include "core/bases/balance.h"

double
enl_equal_mixture (double gap)
{
  return 1.0 / (1.0 + pow (10.0, -0.5 * gap));
}

EnlAcceptor
enl_acceptor_bare (double amount, double pkah)
{
  return (EnlAcceptor){.amount = amount, .steps = 1, .pka = {pkah}};
}

EnlStatus
enl_equilibrium_solve (const EnlEquilibrium *problem, EnlComposition *out, EnlError *err)
{
  EnlStatus status = enl_balance_check (problem, err);
  double low, high;

  if (status != ENL_OK)
    return status;
  enl_balance_bracket (problem, &low, &high);
  enl_balance_compose (problem, enl_balance_root (problem, low, high), out);
  return ENL_OK;
}
