"""A sample that stands outside the lab's records (a file, or data built by a command) to a `Sample`."""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from pathlib import Path

from builder.checking.rules_samples import OUTLINE_RULES, SAMPLE_RULES, Known, SampleNames
from builder.checking.sample_outline import outline_of
from builder.checking.schema import check_shape
from builder.checking.schema_files import Schemas
from builder.problems import Problem, has_errors, sorted_problems
from builder.reading.lab_tree import Kind, find_shipped
from builder.reading.raw import Raw
from builder.reading.yaml_files import read_yaml
from builder.records.samples import Sample
from builder.records.terms import Origin


def check_sample(
    path: Path, records: SampleNames, file: str | None = None, *, unjudged: frozenset[str] = frozenset()
) -> tuple[Sample | None, Sequence[Problem]]:
    """
    Read and check one sample file (YAML or JSON); `file` is the name shown, by default the path.

    Names of the kinds `unjudged` are not looked up: where a lab's recipes and tools are left out, a
    sample may still name them. Returns the sample (None if a problem is an error) and every problem, sorted.
    """
    raw, problems = read_yaml(path, str(path) if file is None else file)
    if raw is None:
        return None, sorted_problems(problems)
    sample, found = check_sample_data(raw, records, unjudged=unjudged)
    found = sorted_problems([*problems, *found])
    return None if has_errors(found) else sample, found


def check_sample_data(
    raw: Raw, records: SampleNames, *, unjudged: frozenset[str] = frozenset()
) -> tuple[Sample | None, Sequence[Problem]]:
    """Check a sample that was read already, or made from the words of a command, as `check_sample`."""
    problems = check_shape(Kind.SAMPLES, raw, Schemas(find_shipped().schemas))
    has_shape = not problems and not raw.unreadable
    problems += _outline_problems(raw, records, unjudged)
    if not has_shape or not isinstance(raw.data, Mapping):
        return None, sorted_problems(problems)
    sample = Sample.from_raw(raw.data, raw.file, Origin.LAB)
    problems += _number_problems(raw, sample)
    return None if has_errors(problems) else sample, sorted_problems(problems)


def _outline_problems(raw: Raw, records: SampleNames, unjudged: frozenset[str]) -> Iterator[Problem]:
    known = Known(records, is_broken=lambda kind, _name: kind in unjudged)
    outline = outline_of(raw.data)
    for rule in OUTLINE_RULES:
        for pointer, message, hint in rule.find(outline, known):
            yield raw.problem(pointer, rule.name, message, hint=hint)


def _number_problems(raw: Raw, sample: Sample) -> Iterator[Problem]:
    for rule in SAMPLE_RULES:
        for pointer, message, hint in rule.find(sample):
            yield raw.problem(pointer, rule.name, message, hint=hint)
