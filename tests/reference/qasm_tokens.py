"""Tokens of OpenQASM 3, by the lexer grammar of the specification (qasm3Lexer.g4).

Tokens are tuples (kind, text, line). The longest match wins, as in the grammar: "1 s" is one
duration literal and never the number 1 followed by a name.
"""

import re
import unicodedata


class QasmError(Exception):
    """The text is no OpenQASM 3, or lies outside the subset that is read here."""

    def __init__(self, line, message):
        super().__init__(f"line {line}: {message}")
        self.line = line


# Names that the lexer grammar takes away from identifiers.
KEYWORDS = frozenset(
    """OPENQASM include defcalgrammar def cal defcal gate extern box let break continue if else end
    return for while in switch case default nop pragma input output const readonly mutable qreg
    qubit creg bool bit int uint float angle complex array void duration stretch gphase inv pow
    ctrl negctrl durationof delay reset measure barrier true false im""".split()
)

_DECIMAL = r"[0-9](?:_?[0-9])*"
_EXPONENT = rf"[eE][+-]?{_DECIMAL}"
_FLOAT = (
    rf"(?:{_DECIMAL}{_EXPONENT}"
    rf"|\.{_DECIMAL}(?:{_EXPONENT})?"
    rf"|{_DECIMAL}\.(?:{_DECIMAL})?(?:{_EXPONENT})?)"
)
# In the order of trial; each rule stands before those that match only a beginning of it.
_RULES = (
    ("newline", r"\r\n|\n|\r"),
    ("comment", r"//[^\r\n]*"),
    ("block_comment", r"/\*[\s\S]*?\*/"),
    ("duration", rf"(?:{_FLOAT}|{_DECIMAL})[ \t]*(?:dt|ns|us|µs|ms|s)"),
    ("imaginary", rf"(?:{_FLOAT}|{_DECIMAL})[ \t]*im"),
    ("float", _FLOAT),
    ("based", r"0[xX][0-9a-fA-F](?:_?[0-9a-fA-F])*|0o[0-7](?:_?[0-7])*|0[bB][01](?:_?[01])*"),
    ("integer", _DECIMAL),
    ("physical", r"\$[0-9]+"),
    ("string", r"\"[^\"\r\t\n]+\"|'[^'\r\t\n]+'"),
    ("name", r"[A-Za-z_\u0080-\U0010ffff][A-Za-z0-9_\u0080-\U0010ffff]*"),
    ("sign", r"\*\*|->|\+\+|[-+*/(){}\[\];,:=]"),
)
_MASTER = re.compile(r"[ \t]*(?:" + "|".join(f"(?P<{kind}>{rule})" for kind, rule in _RULES) + ")")
_LETTER_CATEGORIES = {"Lu", "Ll", "Lt", "Lm", "Lo", "Nl"}
_REFUSED = {"duration": "a duration literal", "imaginary": "an imaginary literal"}


def _check_name(text, line):
    """Letters beyond ASCII must be of the categories that the grammar names."""
    for character in text:
        if ord(character) > 127 and unicodedata.category(character) not in _LETTER_CATEGORIES:
            raise QasmError(line, f"character {character!r} may not stand in a name")


def tokenize(text):
    """Splits a text.

    Returns (tokens, comments): tokens as tuples (kind, text, line), closed by ("end", "", line);
    comments as tuples (line, text without the slashes, number of tokens before it). A name that is
    a keyword gets the kind "keyword". Block comments are skipped.
    """
    tokens, comments = [], []
    text = text.rstrip(" \t")
    line, position = 1, 0
    while position < len(text):
        match = _MASTER.match(text, position)
        if match is None:
            character = text[position:].lstrip(" \t")[0]
            raise QasmError(line, f"character {character!r} is not expected here")
        kind = match.lastgroup
        word = match.group(kind)
        position = match.end()
        if kind == "newline":
            line += 1
        elif kind == "comment":
            comments.append((line, word[2:], len(tokens)))
        elif kind == "block_comment":
            line += len(re.findall(r"\r\n|\n|\r", word))
        elif kind in _REFUSED:
            raise QasmError(line, f"{word!r} is {_REFUSED[kind]}, which is outside the subset")
        elif kind == "name":
            if word in KEYWORDS:
                kind = "keyword"
            elif not word.isascii():
                _check_name(word, line)
            tokens.append((kind, word, line))
        else:
            tokens.append((kind, word, line))
    tokens.append(("end", "", line))
    return tokens, comments
