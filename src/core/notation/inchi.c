/* Structure to InChI. */
#include "core/notation/inchi.h"

#include <string.h>

#include <inchi_api.h>

#include "core/molecule/elements.h"

#define MOST_ATOMS 1023 /* limit of the library */

/* The library keeps state of its own and refuses a second caller. */
static GMutex library_lock;

typedef struct {
  const EnlMolecule *mol;
  inchi_Atom *atom;
  GArray *stereo; /* inchi_Stereo0D */
  EnlError *err;
} Job;

static EnlStatus
atom_fault (Job *job, uint32_t i, const char *advice, const char *fault)
{
  return enl_error_set (job->err, ENL_ERROR_UNSUPPORTED, advice, "atom %u %s", i + 1, fault);
}

static EnlStatus
fill_atom (Job *job, uint32_t i)
{
  const EnlAtom *from = enl_molecule_atom (job->mol, i);
  inchi_Atom *to = &job->atom[i];

  if (from->element == 0)
    return atom_fault (job, i, "give every atom an element", "has no element; InChI needs one");
  if (enl_molecule_degree (job->mol, i) > MAXVAL)
    return atom_fault (job, i, "use another notation", "has more bonds than InChI can hold");
  g_strlcpy (to->elname, enl_element_symbol (from->element), sizeof to->elname);
  to->charge = from->charge;
  to->num_iso_H[0] = (S_CHAR)MIN (from->hydrogens, 100);
  to->isotopic_mass = (AT_NUM)from->isotope;
  to->radical = from->unpaired == 1   ? INCHI_RADICAL_DOUBLET
                : from->unpaired == 2 ? INCHI_RADICAL_TRIPLET
                                      : INCHI_RADICAL_NONE;
  return ENL_OK;
}

static EnlStatus
fill_bond (Job *job, uint32_t b)
{
  const EnlBond *bond = enl_molecule_bond (job->mol, b);

  if (bond->order == 0) /* a contact: InChI breaks bonds to metals in any case */
    return ENL_OK;
  if (bond->order > 3)
    return atom_fault (job, bond->from, "use another notation", "has a quadruple bond");
  inchi_Atom *end = &job->atom[bond->from];
  end->neighbor[end->num_bonds] = (AT_NUM)bond->to;
  end->bond_type[end->num_bonds] = (S_CHAR)bond->order;
  end->num_bonds++;
  return ENL_OK;
}

/* Neighbours in ascending order, an unwritten one first, which InChI writes as the centre itself:
 * the same order and the same point of view as EnlWinding. */
static void
add_centre (Job *job, uint32_t i)
{
  const EnlAtom *atom = enl_molecule_atom (job->mol, i);
  uint32_t degree = enl_molecule_degree (job->mol, i), place = 0;
  inchi_Stereo0D centre = {.central_atom = (AT_NUM)i, .type = INCHI_StereoType_Tetrahedral};

  if (atom->winding == ENL_WINDING_NONE || degree < 3 || degree > 4)
    return;
  if (degree == 3)
    centre.neighbor[place++] = (AT_NUM)i;
  for (uint32_t k = 0; k < degree; k++) {
    uint32_t other = enl_molecule_neighbour (job->mol, i, k), at = place++;
    for (; at > 4 - degree && centre.neighbor[at - 1] > (AT_NUM)other; at--)
      centre.neighbor[at] = centre.neighbor[at - 1];
    centre.neighbor[at] = (AT_NUM)other;
  }
  centre.parity = atom->winding == ENL_WINDING_CLOCKWISE ? INCHI_PARITY_EVEN : INCHI_PARITY_ODD;
  g_array_append_val (job->stereo, centre);
}

static void
add_double_bond (Job *job, uint32_t b)
{
  const EnlBond *bond = enl_molecule_bond (job->mol, b);
  inchi_Stereo0D stereo = {.central_atom = NO_ATOM, .type = INCHI_StereoType_DoubleBond};

  if (bond->side == ENL_SIDE_NONE)
    return;
  stereo.neighbor[0] = (AT_NUM)bond->side_from;
  stereo.neighbor[1] = (AT_NUM)bond->from;
  stereo.neighbor[2] = (AT_NUM)bond->to;
  stereo.neighbor[3] = (AT_NUM)bond->side_to;
  stereo.parity = bond->side == ENL_SIDE_OPPOSITE ? INCHI_PARITY_EVEN : INCHI_PARITY_ODD;
  g_array_append_val (job->stereo, stereo);
}

static EnlStatus
fill (Job *job)
{
  for (uint32_t i = 0; i < enl_molecule_atoms (job->mol); i++) {
    EnlStatus status = fill_atom (job, i);
    if (status != ENL_OK)
      return status;
    add_centre (job, i);
  }
  for (uint32_t b = 0; b < enl_molecule_bonds (job->mol); b++) {
    EnlStatus status = fill_bond (job, b);
    if (status != ENL_OK)
      return status;
    add_double_bond (job, b);
  }
  return ENL_OK;
}

static EnlStatus
make_key (const char *text, char **key, EnlError *err)
{
  char made[32] = "", rest[68], rest2[68];

  if (GetINCHIKeyFromINCHI (text, 0, 0, made, rest, rest2) != INCHIKEY_OK)
    return enl_error_set (err, ENL_ERROR_NUMERIC, "use the InChI itself", "no InChIKey was made");
  *key = g_strdup (made);
  return ENL_OK;
}

static EnlStatus
call_library (Job *job, char **inchi, char **key)
{
  char options[] = "";
  inchi_Input input = {.atom = job->atom, .szOptions = options};
  inchi_Output output = {0};
  EnlStatus status = ENL_OK;

  input.num_atoms = (AT_NUM)enl_molecule_atoms (job->mol);
  input.stereo0D = (inchi_Stereo0D *)(void *)job->stereo->data;
  input.num_stereo0D = (AT_NUM)job->stereo->len;
  g_mutex_lock (&library_lock);
  int result = GetINCHI (&input, &output);
  if ((result != inchi_Ret_OKAY && result != inchi_Ret_WARNING) || !output.szInChI)
    status = enl_error_set (job->err, ENL_ERROR_CHEMISTRY, "check charges and valences",
                            "no InChI exists for this structure (%.100s)",
                            output.szMessage ? output.szMessage : "no reason given");
  else if (key)
    status = make_key (output.szInChI, key, job->err);
  if (status == ENL_OK && inchi)
    *inchi = g_strdup (output.szInChI);
  FreeINCHI (&output);
  g_mutex_unlock (&library_lock);
  return status;
}

EnlStatus
enl_inchi_write (const EnlMolecule *mol, char **inchi, char **key, EnlError *err)
{
  uint32_t n = enl_molecule_atoms (mol);
  Job job = {.mol = mol, .err = err};

  if (inchi)
    *inchi = NULL;
  if (key)
    *key = NULL;
  if (n == 0)
    return enl_error_set (err, ENL_ERROR_EMPTY, "draw or read a structure first", "no atoms");
  if (n > MOST_ATOMS)
    return enl_error_set (err, ENL_ERROR_LIMIT, "use SMILES or a molfile instead",
                          "%u atoms; an InChI holds at most %d", n, MOST_ATOMS);
  g_autofree inchi_Atom *atom = g_new0 (inchi_Atom, n);
  g_autoptr (GArray) stereo = g_array_new (FALSE, FALSE, sizeof (inchi_Stereo0D));
  job.atom = atom;
  job.stereo = stereo;
  EnlStatus status = fill (&job);
  return status == ENL_OK ? call_library (&job, inchi, key) : status;
}
