"""Errors that reach the user as plain lines, and the exit codes they carry."""

from __future__ import annotations

from dataclasses import dataclass

EXIT_GOOD = 0
EXIT_LIMIT = 1
EXIT_INPUT = 2


class CombustorError(Exception):
    """Root of every error this package raises on purpose."""

    exit_code = EXIT_INPUT


@dataclass(frozen=True)
class Problem:
    """One thing wrong with a user's input.

    Parameters
    ----------
    what : str
        The fact, in one plain sentence part ("unknown key", "pressure in a gauge unit").
    file, line, key, value :
        Where it stands and what was given; ``None`` where not known.
    allowed : str
        What is allowed and what to do.
    nearest : str or None
        The nearest valid spelling, for a misspelt key or name.
    """

    what: str
    allowed: str = ""
    key: str | None = None
    value: object | None = None
    file: str | None = None
    line: int | None = None
    nearest: str | None = None

    def __str__(self) -> str:
        place = ""
        if self.file is not None:
            place = f"{self.file}:{self.line}: " if self.line is not None else f"{self.file}: "
        key = f"{self.key}: " if self.key else ""
        value = f" (got {self.value!r})" if self.value is not None else ""
        text = f"{place}{key}{self.what}{value}"
        if self.allowed:
            text += f"; {self.allowed}"
        if self.nearest:
            text += f"; did you mean {self.nearest!r}?"
        return text


class InputError(CombustorError):
    """The input cannot be used; every problem found is carried."""

    exit_code = EXIT_INPUT

    def __init__(self, problems: str | Problem | list[Problem] | tuple[Problem, ...]) -> None:
        if isinstance(problems, str):
            problems = Problem(problems)
        if isinstance(problems, Problem):
            problems = [problems]
        self.problems: tuple[Problem, ...] = tuple(problems)
        super().__init__("\n".join(str(problem) for problem in self.problems))


class InfeasibleError(CombustorError):
    """No design meets the targets; carries the chain of causes, first cause first."""

    exit_code = EXIT_LIMIT

    def __init__(self, chain: list[str] | tuple[str, ...], advice: str = "") -> None:
        self.chain: tuple[str, ...] = tuple(chain)
        self.advice = advice
        super().__init__("; therefore ".join(self.chain) + (f". {advice}" if advice else ""))


class NotConvergedError(CombustorError):
    """A solve ended without an answer that can be trusted."""

    exit_code = EXIT_LIMIT
