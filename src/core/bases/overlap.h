/* Where the negative charge of an anion can go, and whether two anions of one molecule would share
 * that room: then the second deprotonation is far harder than a charge elsewhere makes it. */
#pragma once

#include "core/acidity/site.h"

typedef struct EnlChargeRoom EnlChargeRoom;

/* The atoms that the charge reaches from every site by moving along conjugated paths, and the
 * acceptors beside the acidic atoms. Borrows nothing after the call. Caller: enl_charge_room_free.
 */
EnlChargeRoom *enl_charge_room_new (const EnlMolecule *mol, const EnlSites *sites) ENL_MUST_USE;
void enl_charge_room_free (EnlChargeRoom *room);
G_DEFINE_AUTOPTR_CLEANUP_FUNC (EnlChargeRoom, enl_charge_room_free)

/* The anions of atom number `one` of site `a` and atom number `other` of site `b` share an atom.
 * Both numbers count within EnlSite.atom. */
bool enl_charge_room_shared (const EnlChargeRoom *room, const EnlSites *sites, uint32_t a,
                             uint32_t one, uint32_t b, uint32_t other);
