/* The child process: InChI text on standard input, an answer (inchi-answer.h) on standard output.
 * Whatever the library does to it, the program itself is safe. */
#include "core/notation/inchi.h"

#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <sys/resource.h>

#include <inchi_api.h>

#define LONGEST_TEXT  (64 * 1024)
#define CPU_SECONDS   5
#define ADDRESS_BYTES (1024UL * 1024 * 1024)

static void
limit (__rlimit_resource_t what, rlim_t value)
{
  struct rlimit both = {value, value};
  (void)setrlimit (what, &both); /* a stricter limit that is already there is as good */
}

static void
set_limits (void)
{
  limit (RLIMIT_CORE, 0);
  limit (RLIMIT_CPU, CPU_SECONDS);
#if !defined(__SANITIZE_ADDRESS__) /* its shadow memory alone is larger */
#if defined(__has_feature)
#if !__has_feature(address_sanitizer)
  limit (RLIMIT_AS, ADDRESS_BYTES);
#endif
#else
  limit (RLIMIT_AS, ADDRESS_BYTES);
#endif
#endif
}

static void
print_atom (const inchi_Atom *atom)
{
  printf ("atom %s %d %d %d %d %d %d %d\n", atom->elname, atom->charge, atom->num_iso_H[0],
          atom->num_iso_H[1], atom->num_iso_H[2], atom->num_iso_H[3], atom->isotopic_mass,
          atom->radical);
}

/* The library may list a bond at one of its ends or at both. */
static int
is_listed_before (const inchi_Atom *atom, int from, int to)
{
  if (to > from)
    return 0;
  for (int k = 0; k < atom[to].num_bonds; k++)
    if (atom[to].neighbor[k] == from)
      return 1;
  return 0;
}

static void
print_bonds (const inchi_OutputStruct *made)
{
  for (int i = 0; i < made->num_atoms; i++)
    for (int k = 0; k < made->atom[i].num_bonds; k++) {
      int to = made->atom[i].neighbor[k];
      if (to >= 0 && to < made->num_atoms && !is_listed_before (made->atom, i, to))
        printf ("bond %d %d %d\n", i, to, made->atom[i].bond_type[k]);
    }
}

static void
print_stereo (const inchi_Stereo0D *stereo)
{
  const AT_NUM *n = stereo->neighbor;

  if (stereo->parity != INCHI_PARITY_ODD && stereo->parity != INCHI_PARITY_EVEN)
    return;
  if (stereo->type == INCHI_StereoType_Tetrahedral)
    printf ("centre %d %d %d %d %d %d\n", stereo->parity, stereo->central_atom, n[0], n[1], n[2],
            n[3]);
  else if (stereo->type == INCHI_StereoType_DoubleBond)
    printf ("double %d %d %d %d %d\n", stereo->parity, n[0], n[1], n[2], n[3]);
}

static void
print_fault (const char *message)
{
  printf ("fault ");
  for (const char *p = message && *message ? message : "a layer is damaged"; *p; p++)
    putchar ((unsigned char)*p < ' ' ? ' ' : *p);
  putchar ('\n');
}

static void
print_structure (const inchi_OutputStruct *made)
{
  printf ("enolith-inchi 1\n");
  for (int i = 0; i < made->num_atoms; i++)
    print_atom (&made->atom[i]);
  print_bonds (made);
  for (int i = 0; i < made->num_stereo0D; i++)
    print_stereo (&made->stereo0D[i]);
  printf ("end\n");
}

int
enl_inchi_worker_main (void)
{
  static char text[LONGEST_TEXT + 1];
  char options[] = "";
  inchi_OutputStruct made = {0};

  set_limits ();
  size_t size = fread (text, 1, LONGEST_TEXT, stdin);
  text[size] = '\0';
  inchi_InputINCHI input = {text, options};
  int result = GetStructFromINCHI (&input, &made);
  if ((result == inchi_Ret_OKAY || result == inchi_Ret_WARNING) && made.atom)
    print_structure (&made);
  else
    print_fault (made.szMessage);
  FreeStructFromINCHI (&made);
  return fflush (stdout) == 0 ? EXIT_SUCCESS : EXIT_FAILURE;
}
