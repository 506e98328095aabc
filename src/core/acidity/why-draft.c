#include "core/acidity/why-draft.h"

#include <string.h>

#include "core/acidity/group.h"

enum { HYDROGEN = 1, CARBON = 6 };

EnlDraft
enl_draft_new (const EnlMolecule *mol, uint32_t site)
{
  EnlDraft whole = {(EnlMolecule *)mol, site};
  EnlDraftEdit edit;

  enl_draft_edit_init (&edit, &whole);
  EnlDraft draft = enl_draft_edit_make (&edit);
  enl_draft_edit_clear (&edit);
  return draft;
}

void
enl_draft_clear (EnlDraft *draft)
{
  enl_molecule_free (draft->mol);
  draft->mol = NULL;
}

static bool
can_end (const EnlMolecule *mol, uint32_t atom)
{
  return enl_molecule_atom (mol, atom)->element > HYDROGEN && !enl_atom_is_metal (mol, atom);
}

bool
enl_draft_can_cut (const EnlDraft *draft, uint32_t bond)
{
  const EnlBond *b = enl_molecule_bond (draft->mol, bond);

  return b->order == 1 && !b->ring && !b->aromatic && can_end (draft->mol, b->from) &&
         can_end (draft->mol, b->to);
}

bool
enl_draft_caps_with_methyl (const EnlDraft *draft, uint32_t atom)
{
  if (atom == draft->site)
    return false;
  if (enl_molecule_atom (draft->mol, atom)->element != CARBON)
    return true;
  for (uint32_t k = 0; k < enl_molecule_degree (draft->mol, atom); k++) {
    uint32_t bond = enl_molecule_bond_at (draft->mol, atom, k);
    uint32_t other = enl_molecule_neighbour (draft->mol, atom, k);
    const EnlBond *b = enl_molecule_bond (draft->mol, bond);
    if (b->order == 2 && !b->aromatic && enl_molecule_atom (draft->mol, other)->element != CARBON)
      return true;
  }
  return false;
}

uint32_t
enl_draft_branch (const EnlDraft *draft, uint32_t inner, uint32_t outer, bool *part)
{
  uint32_t n = enl_molecule_atoms (draft->mol), heavy = 0;
  g_autofree uint32_t *queue = g_new (uint32_t, n + 1);
  uint32_t head = 0, tail = 0;

  memset (part, 0, n * sizeof *part);
  part[outer] = true;
  queue[tail++] = outer;
  while (head < tail) {
    uint32_t atom = queue[head++];
    heavy += enl_molecule_atom (draft->mol, atom)->element != HYDROGEN;
    for (uint32_t k = 0; k < enl_molecule_degree (draft->mol, atom); k++) {
      uint32_t next = enl_molecule_neighbour (draft->mol, atom, k);
      if (part[next] || (atom == outer && next == inner))
        continue;
      part[next] = true;
      queue[tail++] = next;
    }
  }
  return heavy;
}

EnlMolecule *
enl_draft_branch_molecule (const EnlDraft *draft, uint32_t inner, uint32_t outer)
{
  uint32_t n = enl_molecule_atoms (draft->mol);
  g_autofree bool *part = g_new (bool, n + 1);
  g_autofree uint32_t *place = g_new (uint32_t, n + 1);
  EnlMolecule *out = enl_molecule_new ();

  enl_draft_branch (draft, inner, outer, part);
  for (uint32_t a = 0; a < n; a++) {
    place[a] = ENL_NONE;
    if (part[a])
      place[a] = enl_molecule_add_atom (out, enl_molecule_atom (draft->mol, a));
  }
  place[inner] = enl_molecule_add_atom (out, &(EnlAtom){0});
  for (uint32_t i = 0; i < enl_molecule_bonds (draft->mol); i++) {
    const EnlBond *b = enl_molecule_bond (draft->mol, i);
    bool inside = part[b->from] && part[b->to];
    bool stem = (b->from == inner && b->to == outer) || (b->from == outer && b->to == inner);
    if (inside || stem)
      enl_molecule_add_bond (out, place[b->from], place[b->to], b->order);
  }
  enl_molecule_finish (out);
  return out;
}

/* ---- edits ---- */

void
enl_draft_edit_init (EnlDraftEdit *edit, const EnlDraft *draft)
{
  uint32_t n = enl_molecule_atoms (draft->mol), n_bonds = enl_molecule_bonds (draft->mol);

  *edit = (EnlDraftEdit){
      .draft = draft,
      .gone = g_new0 (bool, n + 1),
      .broken = g_new0 (bool, n_bonds + 1),
      .order = g_new0 (uint8_t, n_bonds + 1),
      .hydrogens = g_new0 (int, n + 1),
      .methyls = g_new0 (int, n + 1),
  };
  for (uint32_t i = 0; i < n_bonds; i++)
    edit->order[i] = enl_molecule_bond (draft->mol, i)->order;
}

void
enl_draft_edit_clear (EnlDraftEdit *edit)
{
  g_free (edit->gone);
  g_free (edit->broken);
  g_free (edit->order);
  g_free (edit->hydrogens);
  g_free (edit->methyls);
}

static void
cap (EnlDraftEdit *edit, uint32_t atom)
{
  if (enl_draft_caps_with_methyl (edit->draft, atom))
    edit->methyls[atom]++;
  else
    edit->hydrogens[atom]++;
}

void
enl_draft_edit_cut (EnlDraftEdit *edit, uint32_t inner, uint32_t outer)
{
  uint32_t n = enl_molecule_atoms (edit->draft->mol);
  g_autofree bool *part = g_new (bool, n + 1);

  enl_draft_branch (edit->draft, inner, outer, part);
  g_assert (!part[edit->draft->site] && !part[inner]);
  for (uint32_t a = 0; a < n; a++)
    edit->gone[a] |= part[a];
  cap (edit, inner);
  edit->any = true;
}

void
enl_draft_edit_open (EnlDraftEdit *edit, uint32_t bond)
{
  const EnlBond *b = enl_molecule_bond (edit->draft->mol, bond);

  edit->broken[bond] = true;
  cap (edit, b->from);
  cap (edit, b->to);
  edit->any = true;
}

static void
add_methyls (EnlMolecule *out, uint32_t atom, int n)
{
  for (int i = 0; i < n; i++) {
    uint32_t carbon = enl_molecule_add_atom (out, &(EnlAtom){.element = CARBON, .hydrogens = 3});
    enl_molecule_add_bond (out, atom, carbon, 1);
  }
}

EnlDraft
enl_draft_edit_make (const EnlDraftEdit *edit)
{
  const EnlMolecule *mol = edit->draft->mol;
  uint32_t n = enl_molecule_atoms (mol);
  g_autofree uint32_t *place = g_new (uint32_t, n + 1);
  EnlDraft out = {enl_molecule_new (), ENL_NONE};

  for (uint32_t a = 0; a < n; a++) {
    EnlAtom atom = *enl_molecule_atom (mol, a);
    atom.winding = ENL_WINDING_NONE;
    atom.map = 0;
    atom.hydrogens = (uint8_t)(atom.hydrogens + edit->hydrogens[a]);
    place[a] = edit->gone[a] ? ENL_NONE : enl_molecule_add_atom (out.mol, &atom);
  }
  for (uint32_t i = 0; i < enl_molecule_bonds (mol); i++) {
    const EnlBond *b = enl_molecule_bond (mol, i);
    if (!edit->gone[b->from] && !edit->gone[b->to] && !edit->broken[i])
      enl_molecule_add_bond (out.mol, place[b->from], place[b->to], edit->order[i]);
  }
  for (uint32_t a = 0; a < n; a++)
    if (!edit->gone[a])
      add_methyls (out.mol, place[a], edit->methyls[a]);
  enl_molecule_finish (out.mol);
  out.site = place[edit->draft->site];
  return out;
}
