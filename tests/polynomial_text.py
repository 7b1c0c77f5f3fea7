"""A reader of the polynomials that published tables print, in any of their several syntaxes."""

from __future__ import annotations

import re

Terms = dict[tuple[int, ...], int]

_TOKEN = re.compile(r"\s*([0-9]+|[A-Za-z][A-Za-z0-9]*|[-+*/^()])")


def parse_polynomial(text: str, variables: tuple[str, ...]) -> list[list[int]]:
    """The Laurent polynomial as sorted terms [exponents..., coefficient], without zeros.

    Reads sums and products of integers, the variables and brackets, with powers ``x^3``,
    ``x^(-3)`` and division by monomials ``1/(v^3*z)``; anything else raises ValueError.
    """
    reader = _Reader(_tokens(text), variables)
    terms = reader.read_sum()
    reader.expect_end()
    return sorted([*exponents, c] for exponents, c in terms.items() if c)


def _tokens(text: str) -> list[str]:
    tokens, position = [], 0
    while text[position:].strip():
        match = _TOKEN.match(text, position)
        if match is None:
            raise ValueError(f"unexpected {text[position:]!r} in {text!r}")
        tokens.append(match.group(1))
        position = match.end()
    return tokens


class _Reader:
    """Recursive descent: a sum of products of powers."""

    def __init__(self, tokens: list[str], variables: tuple[str, ...]) -> None:
        self.tokens = [*tokens, ""]
        self.variables = variables
        self.place = 0

    def take(self, *wanted: str) -> str:
        """The next token, passed over if it is one of those wanted; otherwise ''."""
        token = self.tokens[self.place]
        if token and token in wanted:
            self.place += 1
            return token
        return ""

    def expect_end(self) -> None:
        if self.tokens[self.place]:
            raise ValueError(f"unexpected {self.tokens[self.place :]}")

    def read_sum(self) -> Terms:
        total: Terms = {}
        sign = self.take("+", "-") or "+"
        while sign:
            for exponents, c in self.read_product().items():
                total[exponents] = total.get(exponents, 0) + (c if sign == "+" else -c)
            sign = self.take("+", "-")
        return total

    def read_product(self) -> Terms:
        result = self.read_power()
        while operation := self.take("*", "/"):
            factor = self.read_power()
            result = _multiply(result, factor if operation == "*" else _invert(factor))
        return result

    def read_power(self) -> Terms:
        base = self.read_atom()
        if not self.take("^"):
            return base
        exponent = self.read_exponent()
        if exponent < 0:
            base, exponent = _invert(base), -exponent
        result: Terms = {(0,) * len(self.variables): 1}
        for _ in range(exponent):
            result = _multiply(result, base)
        return result

    def read_exponent(self) -> int:
        bracket = self.take("(")
        sign = -1 if self.take("-") else 1
        value = sign * int(self.tokens[self.place])
        self.place += 1
        if bracket and not self.take(")"):
            raise ValueError("an exponent's bracket is not closed")
        return value

    def read_atom(self) -> Terms:
        if self.take("("):
            inner = self.read_sum()
            if not self.take(")"):
                raise ValueError("a bracket is not closed")
            return inner
        token = self.tokens[self.place]
        self.place += 1
        if token.isdigit():
            return {(0,) * len(self.variables): int(token)}
        if token not in self.variables:
            raise ValueError(f"unexpected {token!r}: expected one of {self.variables}")
        return {tuple(int(token == variable) for variable in self.variables): 1}


def _multiply(left: Terms, right: Terms) -> Terms:
    result: Terms = {}
    for first, c in left.items():
        for second, d in right.items():
            exponents = tuple(map(int.__add__, first, second))
            result[exponents] = result.get(exponents, 0) + c * d
    return result


def _invert(terms: Terms) -> Terms:
    if len(terms) != 1 or abs(next(iter(terms.values()))) != 1:
        raise ValueError(f"division by {terms}: expected a monomial with coefficient 1 or -1")
    ((exponents, c),) = terms.items()
    return {tuple(-exponent for exponent in exponents): c}
