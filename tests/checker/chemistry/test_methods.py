"""Names of methods as people write them; common practice, no source."""

import pytest

from checker.chemistry.methods import Kind, kind_of


@pytest.mark.parametrize(
    ("names", "kind"),
    [
        pytest.param("HF RHF UHF ROHF GHF SCF DFT KS UKS MP2 RMP2 RI-MP2 MP4 CCSD CCSD(T) UCCSD(T) DLPNO-CCSD(T) "
                     "CCSD(T)-F12 CC2 CC3 CISD QCISD(T) "
                     "B3LYP UB3LYP RO-B3LYP PBE PBE0 revPBE-D3 TPSSh M06-2X "
                     "wB97X-D ωB97X-V BP86 BLYP CAM-B3LYP B2PLYP SVWN r2SCAN-3c SCS-MP2", "single determinant",
                     id="one_determinant"),
        pytest.param("CASSCF CASSCF(8,6) CASPT2 RASSCF RASPT2 MCSCF MC-SCF NEVPT2 MRCI MR-CISD MRCI+Q SA-CASSCF "
                     "DMRG-CASSCF CASSCF/NEVPT2 FCI full-CI GVB MC-PDFT Mk-MRCC casscf(2,2)",
                     "multiconfigurational",
                     id="several_configurations"),
        pytest.param("CIS CIS(D) TDDFT TD-DFT TD-B3LYP TDA EOM-CCSD EOM-EE-CCSD ADC(2) SF-TDDFT LR-CCSD "
                     "STEOM-CCSD IP-EOM-CCSD", "excited states", id="excited_states"),
        pytest.param("ours house-special semiempirical 12345", None, id="not_recognised"),
    ],
)  # fmt: skip
def test_kinds(names: str, kind: Kind | None) -> None:
    assert {name: kind_of(name) for name in names.split()} == dict.fromkeys(names.split(), kind)


def test_a_reference_with_a_correction_is_what_the_reference_is() -> None:
    assert kind_of("CASSCF/MP2") == "multiconfigurational"
    assert kind_of("full CI") == "multiconfigurational"
    assert kind_of("") is None
