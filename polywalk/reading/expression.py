"""One line of linear algebra as exact numbers. The text is parsed with ``ast`` and walked, never evaluated."""

from __future__ import annotations

import ast
import warnings
from dataclasses import dataclass, field
from fractions import Fraction

from polywalk.errors import NumberError
from polywalk.exact import LARGEST_EXPONENT, exact
from polywalk.reading.spelling import Spelling, refuse_words

COMPARISONS: dict[type[ast.cmpop], str] = {ast.LtE: "<=", ast.GtE: ">=", ast.Eq: "=="}
LARGEST_BITS = 4 * LARGEST_EXPONENT  # 10**400 has about this many bits: powers end where typed numbers end


@dataclass
class Linear:
    """Coefficients by name, in order of first appearance (zero ones stay), and a constant."""

    terms: dict[str, Fraction] = field(default_factory=dict)
    constant: Fraction = Fraction(0)

    def add(self, other: Linear, factor: Fraction) -> None:
        """Add another expression times a factor, in place."""
        for name, value in other.terms.items():
            self.terms[name] = self.terms.get(name, Fraction(0)) + factor * value
        self.constant += factor * other.constant


def comparison(text: str, where: str) -> tuple[list[Linear], list[str]]:
    """The sides of a comparison and the senses between them; two sides, or three of a chain in one direction.

    Raises
    ------
    AlgebraError
        With the text and the column, where it is no linear comparison.
    """
    spelling = Spelling(text, where)
    tree = _parse(spelling)
    if isinstance(tree, ast.Tuple):
        raise spelling.error(_refusal(tree), tree.elts[-1] if tree.elts else tree, before=bool(tree.elts))
    if not isinstance(tree, ast.Compare):
        raise spelling.error("expected a comparison with <=, >= or ==, got an expression alone", None)
    senses = []
    for kind, after in zip(tree.ops, tree.comparators, strict=True):
        if type(kind) not in COMPARISONS:
            raise spelling.error("strict comparisons cut no closed region; write <=, >= or ==", after, before=True)
        senses.append(COMPARISONS[type(kind)])
    if len(senses) > 2 or (len(senses) == 2 and (senses[0] != senses[1] or senses[0] == "==")):
        raise spelling.error(
            "a chain has two <= or two >= (2 <= x <= 5); write anything else as separate constraints",
            tree.comparators[1],
        )
    return [_guarded(node, spelling) for node in (tree.left, *tree.comparators)], senses


def expression(text: str, where: str) -> Linear:
    """A linear expression, such as an objective.

    Raises
    ------
    AlgebraError
        With the text and the column, where it is not linear.
    """
    spelling = Spelling(text, where)
    tree = _parse(spelling)
    if isinstance(tree, ast.Compare):
        raise spelling.error(
            "expected an expression, got a comparison; move it to the constraints", tree.comparators[0]
        )
    return _guarded(tree, spelling)


def variable(text: object, where: str) -> str:
    """The one spelling of a variable's name: ``x[1, 2]`` is ``x[1,2]``."""
    spelling = Spelling(text, where)
    tree = _parse(spelling)
    if not isinstance(tree, ast.Name | ast.Subscript):
        raise spelling.error("expected the name of a variable, such as pump or pump[7]", tree)
    return _name(tree, spelling)


def _parse(spelling: Spelling) -> ast.expr:
    refuse_words(spelling)
    try:
        with warnings.catch_warnings():
            warnings.simplefilter("ignore")
            return ast.parse(spelling.plain, mode="eval").body
    except SyntaxError as error:
        place = max((error.offset or 1) - 1, 0)
        raise spelling.error(f"not algebra ({error.msg})", place) from None
    except (RecursionError, MemoryError, ValueError):
        raise spelling.error("too long or too deeply nested to read; split it", None) from None


def _guarded(node: ast.expr, spelling: Spelling) -> Linear:
    try:
        return _read(node, spelling)
    except RecursionError:
        raise spelling.error("too deeply nested to read; split it", None) from None


def _read(node: ast.expr, spelling: Spelling) -> Linear:
    total = Linear()
    for factor, term in _summands(node):
        total.add(_term(term, spelling), factor)
    return total


def _summands(node: ast.expr) -> list[tuple[Fraction, ast.expr]]:
    """The terms of a sum from left to right; a loop, since long sums nest deeply to the left."""
    terms: list[tuple[Fraction, ast.expr]] = []
    while isinstance(node, ast.BinOp) and isinstance(node.op, ast.Add | ast.Sub):
        terms.append((Fraction(1 if isinstance(node.op, ast.Add) else -1), node.right))
        node = node.left
    return [(Fraction(1), node), *reversed(terms)]


def _term(node: ast.expr, spelling: Spelling) -> Linear:
    if isinstance(node, ast.Constant):
        return Linear(constant=_number(node, spelling))
    if isinstance(node, ast.Name | ast.Subscript):
        return Linear({_name(node, spelling): Fraction(1)})
    if isinstance(node, ast.UnaryOp) and isinstance(node.op, ast.UAdd | ast.USub):
        return _scaled(_read(node.operand, spelling), Fraction(1 if isinstance(node.op, ast.UAdd) else -1))
    if isinstance(node, ast.BinOp):
        return _binary(node, spelling)
    raise spelling.error(_refusal(node), node)


def _binary(node: ast.BinOp, spelling: Spelling) -> Linear:
    if not isinstance(node.op, ast.Add | ast.Sub | ast.Mult | ast.Div | ast.Pow):
        raise spelling.error(_refusal(node), node.right, before=True)
    left, right = _read(node.left, spelling), _read(node.right, spelling)
    if isinstance(node.op, ast.Add | ast.Sub):
        left.add(right, Fraction(1 if isinstance(node.op, ast.Add) else -1))
        return left
    if isinstance(node.op, ast.Mult):
        return _product(left, right, node, spelling)
    if right.terms:
        raise spelling.error("not linear: a variable may not divide or be an exponent", node.right)
    if isinstance(node.op, ast.Pow):
        return Linear(constant=_power(left, right.constant, node, spelling))
    if not right.constant:
        raise spelling.error("division by zero", node.right)
    return _scaled(left, 1 / right.constant)


def _product(left: Linear, right: Linear, node: ast.BinOp, spelling: Spelling) -> Linear:
    if left.terms and right.terms:
        raise spelling.error("not linear: a product of variables; one factor must be a number", node.right)
    if right.terms:
        return _scaled(right, left.constant)
    return _scaled(left, right.constant)


def _power(base: Linear, exponent: Fraction, node: ast.BinOp, spelling: Spelling) -> Fraction:
    if base.terms:
        raise spelling.error("not linear: a power of a variable", node)
    if exponent.denominator != 1:
        raise spelling.error(f"expected a whole number as exponent, got {exponent}", node.right)
    value, times = base.constant, exponent.numerator
    if times < 0 and not value:
        raise spelling.error("division by zero", node.left)
    bits = max(value.numerator.bit_length(), value.denominator.bit_length())
    if (bits if bits > 1 else 0) * abs(times) > LARGEST_BITS or abs(times) > LARGEST_EXPONENT:
        raise spelling.error("the power is too large; scale the unit instead", node.right)
    return value**times


def _scaled(value: Linear, factor: Fraction) -> Linear:
    return Linear({name: factor * number for name, number in value.terms.items()}, factor * value.constant)


def _number(node: ast.Constant, spelling: Spelling) -> Fraction:
    if isinstance(node.value, bool) or not isinstance(node.value, int | float):
        raise spelling.error(f"expected a number or a variable's name, got {node.value!r}", node)
    try:
        return exact(spelling.source(node))  # the digits as typed: 0.1 is 1/10
    except NumberError as error:
        raise spelling.error(str(error).rstrip("."), node) from None


def _name(node: ast.Name | ast.Subscript, spelling: Spelling) -> str:
    if isinstance(node, ast.Name):
        return node.id
    if not isinstance(node.value, ast.Name):
        raise spelling.error("expected an index after a name, such as pump[7] or x[1,2]", node)
    parts = node.slice.elts if isinstance(node.slice, ast.Tuple) else [node.slice]
    return f"{node.value.id}[{','.join(_index(part, spelling) for part in parts)}]"


def _index(node: ast.expr, spelling: Spelling) -> str:
    if isinstance(node, ast.UnaryOp) and isinstance(node.op, ast.USub):
        return "-" + _index(node.operand, spelling)
    if isinstance(node, ast.Constant) and isinstance(node.value, int) and not isinstance(node.value, bool):
        return str(node.value)
    if isinstance(node, ast.Name):
        return node.id
    raise spelling.error("expected whole numbers or plain names as indices, such as pump[7] or x[north,2]", node)


def _refusal(node: ast.AST) -> str:
    if isinstance(node, ast.Call):
        called = node.func.id if isinstance(node.func, ast.Name) else ""
        return f"functions such as {called} are not linear; write * where a product is meant" if called else "write *"
    if isinstance(node, ast.Tuple):
        return "a comma is no part of algebra; decimals are written with a point"
    if isinstance(node, ast.Compare):
        return "a comparison inside an expression; a constraint has one, outside all parentheses"
    if isinstance(node, ast.Attribute):
        return "a dot inside a name; write it as an index (plant[pump]) or with _"
    if isinstance(node, ast.BinOp) and isinstance(node.op, ast.BitXor):
        return "powers are written **, and a power of a variable is not linear"
    return "only + - * / ** and parentheses join numbers and variables"
