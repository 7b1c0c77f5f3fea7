"""A small checker of LaTeX fragments: braces, brackets of environments, and math mode."""

from __future__ import annotations

import re

_TOKENS = re.compile(
    r"\\begin\{(?P<begin>[a-z*]+)\}|\\end\{(?P<end>[a-z*]+)\}|\\(?P<command>[A-Za-z]+|.)"
    r"|(?P<character>[{}$#&^_%~])",
    re.DOTALL,
)
_KNOWN = {
    *("item", "hskip", "labelsep", "textbf", "itshape", "lambda", "rho", "sigma", "emph", "text"),
    *("allowbreak", "bigl", "bigr", "underline", "cdot", "hline", "linewidth", "textbackslash"),
    *("textasciitilde", "textasciicircum", ",", "\\", '"', "#", "$", "%", "&", "_", "[", "]"),
    *("{", "}"),
}
"""Commands of LaTeX itself and of amsmath; any other is a mistake."""

_TABULAR = {"array", "tabular"}
_ENVIRONMENTS = {"trivlist", "proof", "enumerate", "array", "center", "tabular", "description"}


def check_latex(text: str) -> None:
    """Raise AssertionError unless a plain article with amsmath and amsthm can hold the text.

    Checked: that it is ASCII, braces and environments pair up, dollars and display brackets
    alternate, ^ and _ stand in math mode, & in tables, and no command is unknown.
    """
    assert text.isascii()
    stack: list[str] = []
    for match in _TOKENS.finditer(text):
        if match["begin"]:
            assert match["begin"] in _ENVIRONMENTS, match["begin"]
            stack.append(match["begin"])
        elif match["end"]:
            assert stack.pop() == match["end"], match[0]
        elif match["command"]:
            _check_command(match["command"], stack)
        else:
            _check_character(match["character"], stack)
    assert stack == []


def _check_command(command: str, stack: list[str]) -> None:
    assert command in _KNOWN, command
    if command == "[":
        assert not _is_math(stack)
        stack.append("[")
    elif command == "]":
        assert stack.pop() == "["
    elif command in ("sigma", "lambda", "rho", "cdot", "bigl", "bigr", ","):
        assert _is_math(stack), command


def _check_character(character: str, stack: list[str]) -> None:
    if character == "{":
        stack.append("{")
    elif character == "}":
        assert stack.pop() == "{"
    elif character == "$" and "$" in stack:
        assert stack.pop() == "$"
    elif character == "$":
        stack.append("$")
    elif character == "&":
        assert stack[-1] in _TABULAR, stack
    else:
        assert character in "^_", character
        assert _is_math(stack), stack


def _is_math(stack: list[str]) -> bool:
    return bool({"$", "[", "array"} & set(stack))
