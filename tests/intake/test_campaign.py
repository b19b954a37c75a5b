"""The campaign's and the criteria's own rules, beyond what every value keeps."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.intake.conftest import change, lines_of, understood

SHUNT = 'shunt = { value = "100 kohm", arm = 1, between = ["supply-", "signal+"] }\n'


def refusal(plan: Path, file: str, before: str, after: str) -> str:
    """The first line that refuses a change of a file."""
    change(plan / file, before, after)
    return lines_of(lambda: understood(plan))[0]


@pytest.mark.parametrize("ratio", ["0.51", "-1", "3"])
def test_a_poisson_ratio_that_no_solid_has_is_told(plan: Path, ratio: str) -> None:
    line = refusal(plan, "campaign.toml", "poisson_ratio = 0.3", f"poisson_ratio = {ratio}")
    assert line.startswith("campaign.toml, article[1].material.poisson_ratio: ")


def test_a_modulus_in_ksi_is_converted(plan: Path) -> None:
    change(plan / "campaign.toml", '"206 GPa"', '"29900 ksi"')
    modulus = understood(plan).campaign.articles[0].material.modulus
    assert pytest.approx(206.15e9, rel=1e-4) == modulus.si()


def test_a_shunt_names_two_pins_by_their_functions(plan: Path) -> None:
    shunt = 'shunt = { value = "59.88 kohm", arm = 2, between = ["signal+", "supply-"] }\n'
    change(plan / "campaign.toml", SHUNT, shunt)
    found = understood(plan).campaign.modules[0].channels[0].shunt
    assert found is not None
    assert ("signal+", "supply-") == found.between


@pytest.mark.parametrize(
    "between", ['["signal+"]', '["signal+", "signal+"]', '["signal+", "J1"]', '"signal+"', "[]"]
)
def test_a_shunt_between_anything_else_is_told(plan: Path, between: str) -> None:
    shunt = f'shunt = {{ value = "59.88 kohm", arm = 2, between = {between} }}\n'
    line = refusal(plan, "campaign.toml", SHUNT, shunt)
    assert line.startswith("campaign.toml, module[1].channel[1].shunt.between: ")


def test_a_pin_of_unknown_function_is_told(plan: Path) -> None:
    line = refusal(plan, "campaign.toml", '"supply-" = "1"', '"minus" = "1"')
    assert "module[1].channel[1].pins: “minus” is not one of supply+" in line


@pytest.mark.parametrize(
    ("supply", "kind"), [("2.5 V", "constant current"), ("5 mA", "d.c."), ("5 mA", "carrier")]
)
def test_a_current_is_given_in_milliampere_and_only_a_current(
    plan: Path, supply: str, kind: str
) -> None:
    excitation = f'excitation = "{supply}"\n  excitation_kind = "{kind}"'
    line = refusal(plan, "campaign.toml", 'excitation = "2.5 V"', excitation)
    assert f"of the kind {kind} is given in" in line


def test_a_plan_without_an_article_is_told(plan: Path) -> None:
    text = (plan / "campaign.toml").read_text(encoding="utf-8")
    start, end = text.index("[[article]]"), text.index("[[module]]")
    (plan / "campaign.toml").write_text(text[:start] + text[end:], encoding="utf-8")
    assert "campaign.toml, article: is missing." in lines_of(lambda: understood(plan))


@pytest.mark.parametrize("coverage", ["1", "1.645", "2", "3"])
def test_the_coverage_is_kept_with_its_digits(plan: Path, coverage: str) -> None:
    change(plan / "criteria.toml", "coverage = 2", f"coverage = {coverage}")
    assert coverage == understood(plan).criteria.coverage


@pytest.mark.parametrize("coverage", ["0.9", "3.1", '"two"', "nan"])
def test_a_coverage_out_of_bounds_is_told(plan: Path, coverage: str) -> None:
    line = refusal(plan, "criteria.toml", "coverage = 2", f"coverage = {coverage}")
    assert line.startswith("criteria.toml, decision.coverage: ")


@pytest.mark.parametrize(
    ("kind", "lines", "told"),
    [
        ("resistance", 'at_most = "0.3 %"\nexpected = "0.4 %"', "expected: lies above at_most"),
        ("resistance", 'at_most = "0.3 %"\nexpected = "1 ohm"', "expected: mixes per cent"),
        ("insulation", 'at_least = "10 Gohm"\nexpected = "9 Gohm"', "expected: lies below"),
        (
            "resistance",
            'physics = ["lot tolerance"]\nexpected = "350 ohm"',
            "expected: stands beside one limit",
        ),
    ],
)
def test_what_is_expected_lies_on_the_good_side_of_one_limit(
    plan: Path, kind: str, lines: str, told: str
) -> None:
    check = f'[[check]]\nkind = "{kind}"\nstage = "periodic"\n{lines}\nsource = "s"\n\n[decision]'
    assert told in refusal(plan, "criteria.toml", "[decision]", check)


def test_limits_upside_down_or_mixed_are_told(plan: Path) -> None:
    upside = 'at_most = "0.3 %"\nat_least = "0.5 %"'
    assert "lies below at_least" in refusal(plan, "criteria.toml", 'at_most = "0.3 %"', upside)
    mixed = 'at_least = "349 ohm"'
    assert "mixes per cent" in refusal(plan, "criteria.toml", 'at_least = "0.5 %"', mixed)


def test_an_insulation_floor_in_milli_or_mega_is_asked(plan: Path) -> None:
    line = refusal(plan, "criteria.toml", '"10 Gohm"', '"10 mohm"')
    assert "milli or mega?" in line


def test_every_figure_of_the_demos_criteria_names_its_source(plan: Path) -> None:
    sources = [check.source for check in understood(plan).criteria.checks]
    assert 15 == len(sources)
    assert all(source.startswith(("common practice", "lot certificate")) for source in sources)
