"""The rules, one file each. ALL_RULES is their reading order, which is also that of equal findings."""

from checker.registry import Rule
from rules import (
    acceptance_lapsed,
    atom_ground_term,
    axis_convention,
    caution,
    charge_structure,
    close_contact,
    closed_shell_treatment,
    core_potential_count,
    deck_unreadable,
    degenerate_partners,
    electron_count,
    high_spin_default,
    isolated_atom,
    length_unit,
    multiplicity_out_of_reach,
    multiplicity_unstated,
    occupation_capacity,
    occupation_irreps,
    occupation_total,
    open_valence,
    partner_states,
    periodic_cell,
    point_group_mismatch,
    point_group_near_miss,
    rule_failed,
    spin_parity,
    state_symmetry,
    stated_twice,
    unbound_electrons,
)

ALL_RULES: tuple[Rule, ...] = (
    # electron books
    spin_parity.RULE,
    electron_count.RULE,
    multiplicity_unstated.RULE,
    multiplicity_out_of_reach.RULE,
    core_potential_count.RULE,
    charge_structure.RULE,
    unbound_electrons.RULE,
    stated_twice.RULE,
    # shells
    closed_shell_treatment.RULE,
    high_spin_default.RULE,
    atom_ground_term.RULE,
    # occupations
    occupation_irreps.RULE,
    occupation_total.RULE,
    occupation_capacity.RULE,
    axis_convention.RULE,
    degenerate_partners.RULE,
    # symmetry
    point_group_mismatch.RULE,
    point_group_near_miss.RULE,
    state_symmetry.RULE,
    partner_states.RULE,
    # geometry
    close_contact.RULE,
    length_unit.RULE,
    isolated_atom.RULE,
    open_valence.RULE,
    periodic_cell.RULE,
    # not of chemistry
    deck_unreadable.RULE,
    rule_failed.RULE,
    acceptance_lapsed.RULE,
    caution.RULE,
)
