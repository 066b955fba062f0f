"""What the style page asks of the code and no linter checks: sizes, and where the fixed numbers live."""

from __future__ import annotations

import ast
from collections.abc import Iterator
from pathlib import Path

import builder

ROOT = Path(builder.__file__).parent
MODULES = sorted(ROOT.rglob("*.py"))
MOST_LINES = 300
MOST_FUNCTION_LINES = 60
HOMES_OF_NUMBERS = {"constants.py", "plan_rules.py"}
PLAIN_NUMBERS = {0, 1, 2}


def _numbers(source: str) -> Iterator[tuple[int, float]]:
    for node in ast.walk(ast.parse(source)):
        if isinstance(node, ast.Constant) and type(node.value) in (int, float, complex):
            yield node.lineno, node.value


def _long_functions(source: str) -> Iterator[tuple[int, str, int]]:
    for node in ast.walk(ast.parse(source)):
        if isinstance(node, ast.FunctionDef | ast.AsyncFunctionDef):
            first = min([node.lineno, *[d.lineno for d in node.decorator_list]])
            lines = (node.end_lineno or first) - first + 1
            # A docstring explains; it is not what makes a function hard to follow.
            docstring = ast.get_docstring(node, clean=False)
            code = lines - (docstring.count("\n") + 1 if docstring else 0)
            if code > MOST_FUNCTION_LINES:
                yield first, node.name, code


def test_fixed_numbers_of_the_engine_live_in_one_place() -> None:
    """Numbers other than 0, 1, 2 stand in constants.py or plan_rules.py, with their meaning and source."""
    engine = [path for path in MODULES if path.parent.name == "engine" and path.name not in HOMES_OF_NUMBERS]
    assert len(engine) > 15
    found = [
        f"{path.name}:{line}: {value}"
        for path in engine
        for line, value in _numbers(path.read_text(encoding="utf-8"))
        if value not in PLAIN_NUMBERS
    ]
    assert not found, "\n".join(found)


def test_every_fixed_number_is_explained() -> None:
    """Each constant is followed by a sentence, or stands in a group that ends with one."""
    for name in sorted(HOMES_OF_NUMBERS):
        body = ast.parse((ROOT / "engine" / name).read_text(encoding="utf-8")).body
        assert isinstance(body[-1], ast.Expr), f"{name}: the last constant has no sentence"
        runs_without = 0
        for node in body:
            runs_without = runs_without + 1 if isinstance(node, ast.Assign | ast.AnnAssign) else 0
            assert runs_without <= 4, f"{name}:{node.lineno}: too many constants without a sentence"


def test_no_module_is_too_long() -> None:
    """A module keeps to 300 lines: beyond that it holds two things."""
    lengths = {path: len(path.read_text(encoding="utf-8").splitlines()) for path in MODULES}
    too_long = [f"{path.relative_to(ROOT)}: {n}" for path, n in lengths.items() if n > MOST_LINES]
    assert not too_long, "\n".join(too_long)


def test_no_function_is_too_long() -> None:
    """A function keeps to 60 lines of code."""
    too_long = [
        f"{path.relative_to(ROOT)}:{line}: {name} has {lines} lines"
        for path in MODULES
        for line, name, lines in _long_functions(path.read_text(encoding="utf-8"))
    ]
    assert not too_long, "\n".join(too_long)


def test_the_checks_see_what_they_look_for() -> None:
    """A stray number and a long function are noticed."""
    assert list(_numbers("def f(x):\n    return 1.645 * x + 2")) in (
        [(2, 1.645), (2, 2)],
        [(2, 2), (2, 1.645)],
    )
    long = "def f():\n" + "    x = 1\n" * 61
    assert [name for _, name, _ in _long_functions(long)] == ["f"]
