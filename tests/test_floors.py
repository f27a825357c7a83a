"""Imports run one way, down: F0 <- F1 <- F2 <- F3 <- (F4 rules | F5 engine, report) <- F6. Read with ast."""

import ast
from pathlib import Path

import pytest

ROOT = Path(__file__).parent.parent
FLOOR = {
    "checker": 0, "checker.errors": 0, "checker.findings": 0, "checker.source": 0, "checker.elements": 0,
    "checker.geometry": 0, "checker.tables": 0, "checker.files": 0,
    "checker.model": 1, "checker.deck": 1, "checker.reading": 1,
    "checker.chemistry": 2,
    "checker.facts": 3, "checker.irrep_facts": 3, "checker.registry": 3,
    "rules": 4,
    "checker.engine": 5, "checker.report": 5,
    "checker.api": 6, "checker.explain": 6, "checker.output": 6, "checker.progress": 6,
    "checker.repair": 6, "checker.repair_json": 6, "checker.repair_rows": 6, "checker.repair_toml": 6,
    "checker.repair_xyz": 6,
    "checker.checking": 7,
    "checker.cli": 8,
    "checker.__main__": 9,
}  # fmt: skip
MODULES = sorted([*ROOT.glob("checker/**/*.py"), *ROOT.glob("rules/**/*.py")])


def name_of(path: Path) -> str:
    return ".".join(path.relative_to(ROOT).with_suffix("").parts).removesuffix(".__init__")


def floor_of(module: str) -> int:
    """The floor of a module or of the package that holds it; the modules at the top are listed one by one."""
    package = module if module in FLOOR else module.rpartition(".")[0]
    assert package in FLOOR, f"{module} stands on no floor"
    assert package != "checker" or module == "checker", f"{module} stands on no floor"
    return FLOOR[package]


def imported(path: Path) -> set[str]:
    """The project's own modules that a file imports at run time, lazily or not."""
    found = set()
    for node in ast.walk(ast.parse(path.read_text())):
        if isinstance(node, ast.Import):
            found |= {alias.name for alias in node.names}
        elif isinstance(node, ast.ImportFrom) and node.module:
            found.add(node.module)
            found |= {f"{node.module}.{alias.name}" for alias in node.names}
    return {name for name in found if name.split(".")[0] in {"checker", "rules"} and _is_module(name)}


def _is_module(name: str) -> bool:
    path = ROOT.joinpath(*name.split("."))
    return path.with_suffix(".py").exists() or (path / "__init__.py").exists()


@pytest.mark.parametrize("path", MODULES, ids=name_of)
def test_imports_go_down_or_sideways(path: Path) -> None:
    mine = floor_of(name_of(path))
    above = {name for name in imported(path) if floor_of(name) > mine}
    assert not above


@pytest.mark.parametrize("path", MODULES, ids=name_of)
def test_rules_and_reports_never_meet(path: Path) -> None:
    name = name_of(path)
    if name.startswith("rules."):
        assert not {n for n in imported(path) if n.startswith(("rules", "checker.engine", "checker.report"))}
    if name.startswith(("checker.engine", "checker.report")):
        assert not {n for n in imported(path) if n.startswith("rules")}


@pytest.mark.parametrize("path", MODULES, ids=name_of)
def test_heavy_libraries_are_imported_where_needed(path: Path) -> None:
    """None of them may be imported at the top of a module."""
    heavy = {"scipy", "tomlkit", "tree_sitter", "tree_sitter_toml", "tree_sitter_json", "rich"}
    top = ast.parse(path.read_text()).body
    names = {alias.name.split(".")[0] for node in top if isinstance(node, ast.Import) for alias in node.names}
    names |= {(node.module or "").split(".")[0] for node in top if isinstance(node, ast.ImportFrom)}
    assert not names & heavy


@pytest.mark.parametrize("path", MODULES, ids=name_of)
def test_nothing_of_a_deck_is_executed(path: Path) -> None:
    """No eval, exec, compile or import by name, and no subprocess or unpickling, anywhere in the package."""
    tree = ast.parse(path.read_text())
    called = {n.func.id for n in ast.walk(tree) if isinstance(n, ast.Call) and isinstance(n.func, ast.Name)}
    assert not called & {"eval", "exec", "compile", "__import__"}
    roots = {a.name.split(".")[0] for n in ast.walk(tree) if isinstance(n, ast.Import) for a in n.names}
    assert not roots & {"subprocess", "pickle", "marshal", "runpy"}
