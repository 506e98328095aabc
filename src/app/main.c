#include <string.h>

#include <gsl/gsl_errno.h>

#include "app/application.h"
#include "core/notation/inchi.h"

int
main (int argc, char **argv)
{
  if (argc == 2 && strcmp (argv[1], ENL_INCHI_WORKER) == 0)
    return enl_inchi_worker_main ();
  gsl_set_error_handler_off ();
  g_autoptr (EnlApplication) application = enl_application_new ();
  return g_application_run (G_APPLICATION (application), argc, argv);
}
