"""What kind of wave function a method has, as far as its name is one that the trade knows.

Names are compared by their parts, whatever stands between them: ``UCCSD(T)``, ``RO-B3LYP``, ``MR-CISD``. A name
with a part of each kind, such as ``CASSCF/MP2``, is multiconfigurational. What is not recognised is None.

Source: T. Helgaker, P. Jorgensen, J. Olsen, Molecular Electronic-Structure Theory (2000), for the methods; the
list of names is common practice, no source.
"""

import re
from typing import Literal

Kind = Literal["single determinant", "multiconfigurational", "excited states"]

_MULTICONFIGURATIONAL = re.compile(
    r"CAS|RAS|GAS(?:SCF|PT)|MC-?SCF|MC-?PDFT|MR-?(?:CI|CC|PT|AQCC|ACPF|MP)|NEVPT|PT2F|DMRG|FCI|FULL-?CI|GVB|SELECTED-?CI"
)
_EXCITED = re.compile(
    r"\bCIS(?!D)|TD-?(?:DFT|HF|A\b|B|P|W|C)|\bTD\b|TDA|EOM|ADC|\bLR-|SF-|\bQRPA|RPA-?EX|CC2-?LR|\bSAC-?CI|IP-|EA-"
)
_SINGLE_DETERMINANT = re.compile(
    r"\b(?:R|U|RO|G|DH?F-?|)(?:HF|SCF|KS|DFT)\b|MP[2-4]|CCSD|CCD\b|CC2|CC3|QCISD|CISD|CEPA|BD\(T\)|DH?FT|"
    r"LYP|PBE|TPSS|B97|M0[56]|M11|PW91|BP86|X3LYP|SCAN|LDA|LSDA|SVWN|BLYP|OPBE|REVPBE|WB97|B2PLYP|MN1[25]"
)


def kind_of(method: str) -> Kind | None:
    """Return what kind of states a method describes, None where its name is not recognised.

    >>> kind_of("CCSD(T)"), kind_of("CASSCF(8,6)"), kind_of("EOM-CCSD"), kind_of("ours")
    ('single determinant', 'multiconfigurational', 'excited states', None)
    """
    text = re.sub(r"[\s_]+", "-", method.upper().replace("ω", "W").replace("Ω", "W"))
    if _MULTICONFIGURATIONAL.search(text):
        return "multiconfigurational"
    if _EXCITED.search(text):
        return "excited states"
    return "single determinant" if _SINGLE_DETERMINANT.search(text) else None
