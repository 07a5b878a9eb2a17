"""Every number on a worked page is found again by evaluating the printed formula with the printed values."""

from __future__ import annotations

import math
import re

import pytest
from calculated import FAMILIES, blocks, designed, half_unit, within_print, worked_steps

from spanwright.io.calculation.document import document
from spanwright.io.calculation.mathematics import reasons, with_numbers, with_symbols

PRINTED_NUMBER = re.compile(r'"([\d.\u2009]+)"')


@pytest.mark.parametrize("name", FAMILIES)
def test_each_printed_formula_gives_its_printed_value_from_the_printed_values(name: str) -> None:
    members = blocks(document(designed(name), every_member=True), "member")
    assert len(members) == len(designed(name).setting.truss.bar_names)
    seen = 0
    for member in members:
        for step, printed in worked_steps(member):
            if not step["expression"]:
                continue
            value = float(step["value"]["number"])
            apart, allowed = within_print(step["expression"], printed, value)
            told = f"{member['title']}: {step['value']['name']} = {step['expression']} is off by {apart}, print allows"
            assert apart <= allowed, f"{told} {allowed}"
            seen += 1
    assert seen > 10 * len(members)


@pytest.mark.parametrize("name", FAMILIES)
def test_a_pocket_calculator_comes_to_the_utilisation(name: str) -> None:
    """With the printed values the last line of each check differs by less than 1 in 2000."""
    for member in blocks(document(designed(name)), "member"):
        for step, printed in worked_steps(member):
            if step["value"]["name"] == "ratio" and step["expression"] and float(step["value"]["number"]) > 0.01:
                apart, _ = within_print(step["expression"], printed, float(step["value"]["number"]))
                assert apart < float(step["value"]["number"]) / 2000.0


@pytest.mark.parametrize("name", FAMILIES)
def test_the_mathematics_on_the_page_means_what_the_formula_means(name: str) -> None:
    """The typeset line with numbers, read by the usual order of operations, gives the printed value."""
    for member in blocks(document(designed(name)), "member"):
        for step, printed in worked_steps(member):
            if not step["numbers"]:
                continue
            value = float(step["value"]["number"])
            _, allowed = within_print(step["expression"], printed, value)
            assert abs(read(step["numbers"]) - value) <= allowed, step["numbers"]


def read(mathematics: str) -> float:
    """Evaluate typeset mathematics with numbers as a reader would."""
    text = PRINTED_NUMBER.sub(lambda number: number[1].replace("\u2009", ""), mathematics)
    for sign, operator in (("times", "*"), ("slash", "/"), ("^", "**")):
        text = text.replace(sign, operator)
    names = {"frac": lambda a, b: a / b, "sqrt": math.sqrt, "min": min, "max": max, "pi": math.pi}
    return float(eval(text, {"__builtins__": {}}, names))


def test_every_step_has_a_clause_a_meaning_and_a_symbol() -> None:
    for member in blocks(document(designed("pratt_store"), every_member=True), "member"):
        for step, _ in worked_steps(member):
            assert step["value"]["clause"] and step["value"]["meaning"] and step["value"]["symbol"]


@pytest.mark.parametrize("name", FAMILIES)
def test_the_numbers_are_those_that_decided(name: str) -> None:
    """The last step of a check whose own steps end in a ratio is the ratio of that check in the design."""
    found = designed(name)
    works = {member["title"].split(",")[0]: member for member in blocks(document(found), "member")}
    for choice in found.choices:
        governs = found.governing_of(choice)
        member = works[governs.bar]
        place = [found.setting.truss.bar_names[bar] for bar in choice.group.bars].index(governs.bar)
        ratios = {check.name: float(check.ratio[0, place]) for check in choice.checks}
        assert [check["name"] for check in member["checks"] if check["governs"]] == [governs.check]
        assert {check["name"] for check in member["checks"]} | set(member["idle"]) == set(ratios)
        for check in member["checks"]:
            steps = [step for rule in check["rules"] for step in rule["steps"]]
            if steps and steps[-1]["value"]["name"] == "ratio":
                assert float(steps[-1]["value"]["number"]) == pytest.approx(ratios[check["name"]], abs=half_unit(1.0))
            assert check["passes"] == (ratios[check["name"]] <= 1.0)


def test_a_rule_that_two_checks_share_is_worked_once() -> None:
    for member in blocks(document(designed("pratt_store")), "member"):
        effective_areas = [
            step
            for check in member["checks"]
            for rule in check["rules"]
            for step in rule["steps"]
            if step["value"]["name"] == "W_lim"
        ]
        assert len(effective_areas) == 1


@pytest.mark.parametrize(
    ("expression", "typeset"),
    [
        ("phi*A_e*fy", 'phi thin A_"e" thin f_"y"'),
        ("KL/r", "frac(K L, r)"),
        ("sqrt(fy/f_e)", 'sqrt(f_"y" slash f_"e")'),
        ("(a + b)*c_p", '(a + b) thin c_"p"'),
        ("a - (b - d)", "a - (b - d)"),
        ("a - b*d", "a - b thin d"),
        ("-a*b", "-a thin b"),
        ("a*(-b)", "a thin (-b)"),
        ("a/(b/d)", "frac(a, b slash d)"),
        ("(a/b*d)**2", '(frac(a, b) thin d)^("2")'),
        ("lam**(-1/n)", 'lambda^(-"1" slash n)'),
        ("max(a, 1)", 'max(a, "1")'),
        ("where(a <= 2, b, d)", 'cases(b & quad "if" a <= "2", d & quad "else")'),
        (
            "where(a > 2, b, where(a > 1, d, 0))",
            'cases(b & quad "if" a > "2", d & quad "if" a > "1", "0" & quad "else")',
        ),
        ("M_1*r_02**2", 'M_"1" thin (overline(r)_0^2)^("2")'),
        ("E/KL**2", 'frac(E, (K L)^("2"))'),
        ("ratio + limit", '"ratio" + "limit"'),
    ],
)
def test_formulas_are_set_as_a_book_would(expression: str, typeset: str) -> None:
    assert with_symbols(expression) == typeset


def test_numbers_put_in_keep_their_signs_and_show_only_the_choice_that_applies() -> None:
    values = {"a": -2.5, "b": 123456.0, "d": 3e12}
    assert with_numbers("where(a > 0, b, a*b)", values) == '-"2.5" times "123\u2009456"'
    assert with_numbers("b - a", values) == '"123\u2009456" - (-"2.5")'
    assert with_numbers("a**2", values) == '(-"2.5")^("2")'
    assert with_numbers("b/d", values) == 'frac("123\u2009456", "3.0000" times 10^(12))'


@pytest.mark.parametrize(
    ("a", "told"),
    [(0.0, ('"0" <= "2"', '"0" <= "1"')), (1.5, ('"1.5" <= "2"', '"1.5" > "1"')), (3.0, ('"3" > "2"',))],
)
def test_the_conditions_that_chose_a_case_are_told_as_they_hold(a: float, told: tuple[str, ...]) -> None:
    assert reasons("1 + where(a > 2, b, where(a > 1, 5, 0))", {"a": a, "b": 7.0}) == told


@pytest.mark.parametrize("expression", ["__import__('os')", "a if b else c", "a.b", "[a]", "a @ b", "'text'"])
def test_what_is_no_formula_is_refused(expression: str) -> None:
    with pytest.raises((ValueError, AttributeError)):
        with_symbols(expression)
