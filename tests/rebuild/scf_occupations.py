"""Rebuild tests/outside/scf_occupations.csv, occupations by irrep of the G2/97 systems, from the standard output.

Run by hand, three minutes: ``python tests/rebuild/scf_occupations.py > tests/outside/scf_occupations.csv``.
Restricted (open-shell) self-consistent fields in STO-3G by PySCF, in its own frame and abelian group; linear
molecules and atoms in C2v and D2h. Systems without symmetry and fields that do not converge are left out.
"""

from ase import Atoms
from ase.collections import g2
from pyscf import __version__, gto, scf

ABELIAN = {"Coov": "C2v", "Dooh": "D2h", "SO3": "D2h"}


def molecule(atoms: Atoms, group: str | bool = True) -> "gto.Mole":
    rows = list(zip(atoms.get_chemical_symbols(), atoms.positions, strict=True))
    spin = round(sum(atoms.get_initial_magnetic_moments()))
    return gto.M(atom=rows, basis="sto-3g", symmetry=group, spin=spin, verbose=0)


def main() -> None:
    print(f"# Electrons by irrep, ROHF/STO-3G, PySCF {__version__}, geometries of ase.collections.g2. No unit.")
    print("# Made by tests/rebuild/scf_occupations.py. Frame and irreps are those that PySCF chooses.")
    print("name,group,alpha,beta")
    for name in sorted(g2.names):
        found = molecule(g2[name])
        group = ABELIAN.get(found.groupname, found.groupname)
        if group == "C1":
            continue
        field = scf.ROHF(molecule(g2[name], group))
        field.kernel()
        if field.converged:
            counts = {irrep.replace('"', "''"): n for irrep, n in field.get_irrep_nelec().items()}
            by_spin = (" ".join(f"{irrep}:{n[i]:.0f}" for irrep, n in counts.items() if n[i]) for i in (0, 1))
            print(name, group, *by_spin, sep=",")


if __name__ == "__main__":
    main()
