"""Formulas of the rules, which are Python expressions, as Typst mathematics: with symbols, or with numbers put in.

What comes out holds only operators, our own symbols and numbers, so the template may evaluate it.
"""

from __future__ import annotations

import ast
import math
import re
from collections.abc import Iterator, Mapping

from spanwright.io.calculation.symbols import BRACED, symbol
from spanwright.io.text import figures

FUNCTIONS = {
    "sqrt": math.sqrt,
    "min": min,
    "max": max,
    "abs": abs,
    "sin": math.sin,
    "cos": math.cos,
    "tan": math.tan,
    "log": math.log,
    "atan": math.atan,
    "floor": math.floor,
    "ceil": math.ceil,
    "where": lambda condition, yes, no: yes if condition else no,
}
"""What a formula may call; see `spanwright.design.steps`."""

CONSTANTS = {"pi": math.pi}

_SUM, _SIGNED, _QUOTIENT, _PRODUCT, _POWER, _ATOM = range(6)
"""How tightly parts bind; a signed one begins with a minus, a quotient is written with a stroke."""

_THIN = "\u2009"


def evaluate(expression: str, values: Mapping[str, float]) -> float:
    """Return the value of a formula of our own rules."""
    code = compile(expression, "<formula>", "eval")
    return float(eval(code, {"__builtins__": {}}, {**FUNCTIONS, **CONSTANTS, **values}))


def with_symbols(expression: str) -> str:
    """Return a formula as mathematics."""
    return _Symbols().written(expression)


def with_numbers(expression: str, values: Mapping[str, float], *, flat: bool = False) -> str:
    """Return a formula as mathematics with printed numbers in place of its symbols; of a choice only what applies.

    flat : without fractions, so that a line may break anywhere.
    """
    writer = _Numbers(values)
    writer.within_fraction = flat
    return writer.written(expression)


def reasons(expression: str, values: Mapping[str, float]) -> tuple[str, ...]:
    """Return the conditions that chose among the cases of a formula, each as it holds, with printed numbers put in."""
    return tuple(_decided(ast.parse(expression, mode="eval").body, values))


def _decided(node: ast.expr, values: Mapping[str, float]) -> Iterator[str]:
    match node:
        case ast.Call(func=ast.Name(id="where"), args=[ast.Compare(left, [operator], [right]) as condition, yes, no]):
            holds = evaluate(ast.unparse(condition), values)
            kind = type(operator) if holds else _OPPOSITE[type(operator)]
            yield _Numbers(values).part(ast.Compare(left, [kind()], [right]))[0]
            yield from _decided(yes if holds else no, values)
        case _:
            for inner in ast.iter_child_nodes(node):
                if isinstance(inner, ast.expr):
                    yield from _decided(inner, values)


def signs(mathematics: str) -> int:
    """Return about how many signs wide a piece of mathematics is."""
    return len(re.sub(r'frac|times|slash|[" ]', "", mathematics))


def symbols_in(expression: str) -> tuple[str, ...]:
    """Return the symbols that a formula uses, each once."""
    names = [node.id for node in ast.walk(ast.parse(expression, mode="eval")) if isinstance(node, ast.Name)]
    return tuple(dict.fromkeys(name for name in names if name not in FUNCTIONS and name not in CONSTANTS))


def number(value: float) -> str:
    """Return a number as mathematics, as `figures` prints it: thousands apart, powers of ten raised."""
    text = figures(abs(value))
    mantissa, _, exponent = text.partition("e")
    sign = "-" if value < 0 and text != "0" else ""
    power = f" times 10^({int(exponent)})" if exponent else ""
    return f'{sign}"{grouped(mantissa)}"{power}'


def grouped(text: str) -> str:
    """Return a plain number with thin spaces between thousands, from five digits on."""
    whole, point, decimals = text.partition(".")
    digits = whole.lstrip("-")
    if len(digits) < 5:
        return text
    return f"{whole[: -len(digits)]}{int(digits):,}".replace(",", _THIN) + point + decimals


class _Writer:
    """Writes one expression; `part` returns its mathematics and how tightly it binds."""

    times = " thin "
    within_fraction = False

    def written(self, expression: str) -> str:
        return self.part(ast.parse(expression, mode="eval").body)[0]

    def leaf(self, name: str) -> tuple[str, int]:
        raise NotImplementedError

    def choice(self, condition: ast.expr, yes: ast.expr, no: ast.expr) -> tuple[str, int]:
        raise NotImplementedError

    def part(self, node: ast.expr) -> tuple[str, int]:
        match node:
            case ast.Constant(value=float() | int() as value):
                return _bound(number(value))
            case ast.Name(id=name):
                return (name, _ATOM) if name in CONSTANTS else self.leaf(name)
            case ast.UnaryOp(op=ast.USub(), operand=operand):
                return f"-{self.held(operand, _PRODUCT)}", _SIGNED
            case ast.BinOp(left=left, op=operator, right=right):
                return self.joined(left, operator, right)
            case ast.Compare(left=left, ops=[operator], comparators=[right]):
                return f"{self.part(left)[0]} {_COMPARED[type(operator)]} {self.part(right)[0]}", _SUM
            case ast.Call(func=ast.Name(id="where"), args=[condition, yes, no]):
                return self.choice(condition, yes, no)
            case ast.Call(func=ast.Name(id="sqrt"), args=[ast.BinOp(op=ast.Div()) as quotient]):
                return f"sqrt({self.on_one_line(quotient)})", _ATOM
            case ast.Call(func=ast.Name(id=name), args=arguments):
                return f"{name}({', '.join(self.part(argument)[0] for argument in arguments)})", _ATOM
        raise ValueError(f"a formula may not hold {ast.unparse(node)}")

    def joined(self, left: ast.expr, operator: ast.operator, right: ast.expr) -> tuple[str, int]:
        match operator:
            case ast.Add():
                return f"{self.part(left)[0]} + {self.held(right, _QUOTIENT)}", _SUM
            case ast.Sub():
                return f"{self.part(left)[0]} - {self.held(right, _QUOTIENT)}", _SUM
            case ast.Mult():
                first, binding = self.first(left)
                return f"{first}{self.times}{self.held(right, _PRODUCT)}", min(binding, _PRODUCT)
            case ast.Div() if self.within_fraction:
                first, binding = self.first(left)
                return f"{first} slash {self.held(right, _POWER)}", _SUM if binding == _SIGNED else _QUOTIENT
            case ast.Div():
                return f"frac({self.on_one_line(left)}, {self.on_one_line(right)})", _POWER
            case ast.Pow():
                return f"{self.held(left, _ATOM)}^({self.on_one_line(right)})", _POWER
        raise ValueError(f"a formula may not hold {type(operator).__name__}")

    def held(self, node: ast.expr, least: int) -> str:
        """Return a part in brackets where it binds less tightly than it must."""
        text, binding = self.part(node)
        return text if binding >= least else f"({text})"

    def first(self, node: ast.expr) -> tuple[str, int]:
        """Return the first part of a product or quotient, where a sign needs no brackets."""
        text, binding = self.part(node)
        return (text, _SIGNED) if binding == _SIGNED else (self.held(node, _PRODUCT), _PRODUCT)

    def on_one_line(self, node: ast.expr) -> str:
        """Return an exponent, a part of a fraction or what stands under a root: a fraction there would be small."""
        outside, self.within_fraction = self.within_fraction, True
        text = self.part(node)[0]
        self.within_fraction = outside
        return text


class _Symbols(_Writer):
    def leaf(self, name: str) -> tuple[str, int]:
        return symbol(name), _POWER if name in BRACED else _ATOM

    def choice(self, condition: ast.expr, yes: ast.expr, no: ast.expr) -> tuple[str, int]:
        rows = []
        while True:
            rows.append(f'{self.part(yes)[0]} & quad "if" {self.part(condition)[0]}')
            match no:
                case ast.Call(func=ast.Name(id="where"), args=[condition, yes, no]):
                    continue
            break
        rows.append(f'{self.part(no)[0]} & quad "else"')
        return f"cases({', '.join(rows)})", _PRODUCT


class _Numbers(_Writer):
    times = " times "

    def __init__(self, values: Mapping[str, float]) -> None:
        self.values = values

    def leaf(self, name: str) -> tuple[str, int]:
        return _bound(number(self.values[name]))

    def choice(self, condition: ast.expr, yes: ast.expr, no: ast.expr) -> tuple[str, int]:
        return self.part(yes if evaluate(ast.unparse(condition), self.values) else no)


def _bound(text: str) -> tuple[str, int]:
    """Return a number with how tightly it binds: a sign or a power of ten asks for brackets."""
    if text.startswith("-"):
        return text, _SIGNED
    return text, _PRODUCT if "times" in text else _ATOM


_OPPOSITE: dict[type[ast.cmpop], type[ast.cmpop]] = {ast.LtE: ast.Gt, ast.Gt: ast.LtE, ast.Lt: ast.GtE, ast.GtE: ast.Lt}
_COMPARED = {ast.LtE: "<=", ast.Lt: "<", ast.GtE: ">=", ast.Gt: ">"}

__all__ = ["evaluate", "grouped", "number", "reasons", "symbols_in", "with_numbers", "with_symbols"]
