"""The one further measurement that parts the best explanations of figures between pins."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import combinations

from gaugelog.physics.defects import ohm
from gaugelog.physics.pin_fit import Figures, model, predict
from gaugelog.physics.pin_trials import APART, Bench, Trial, terminals_of
from gaugelog.physics.suspects import CEILING, Ends
from gaugelog.physics.transfer import Array

RIVAL = 25.0
"""Misfit by which a second answer may be worse and still be a rival: five sigma."""
MOST_NAMED = 3
"""Explanations of one figure that a sentence names."""
NO_HELP = (
    "No further resistance at pins or tabs parts these: loosen the wires at the tabs and measure "
    "each part alone."
)


@dataclass(frozen=True, slots=True)
class NextMeasurement:
    """Where to put the meter next, or None where no resistance helps; and why, in one sentence."""

    between: Ends | None
    sentence: str


def next_measurement(
    bench: Bench, figures: Figures, groups: Sequence[Sequence[Trial]]
) -> NextMeasurement | None:
    """The pair of pins, or else of a pin and a tab, that parts most of the best explanations.

    None where there is but one explanation. Source: the predictions of each explanation, by
    nodal analysis (Kirchhoff's laws).
    """
    rivals = _rivals(groups)
    if len(rivals) < 2:
        return None
    doubt = _relative_doubt(figures)
    # Tabs may be coated already, so pins come first wherever they part anything.
    for choices in _choices(bench, figures):
        found = _best(bench, rivals, choices, doubt)
        if found is not None:
            return found
    return NextMeasurement(None, NO_HELP) if len(groups[0]) > 1 else None


def _rivals(groups: Sequence[Sequence[Trial]]) -> list[Trial]:
    """The first answer's explanations, and the next answer's best where it is close."""
    first = list(groups[0])
    close = [group[0] for group in groups[1:2] if group[0].misfit - first[0].misfit < RIVAL]
    return first + close


def _choices(bench: Bench, figures: Figures) -> tuple[list[Ends], list[Ends]]:
    """Pairs not yet measured: of pins and bare metal, then those that reach to the tabs."""
    done = {frozenset(pair) for pair in figures.ends}
    pairs = [pair for pair in combinations(terminals_of(bench), 2) if frozenset(pair) not in done]
    inner = [pair for pair in pairs if pair[1].endswith(" tab")]
    return [pair for pair in pairs if pair not in inner], inner


def _best(
    bench: Bench, rivals: Sequence[Trial], choices: Sequence[Ends], doubt: float
) -> NextMeasurement | None:
    """The choice that parts most rivals, the closest by most; None where none parts any."""
    import numpy as np

    if not choices:
        return None
    predicted = _predicted(bench, rivals, choices)
    gaps = _gaps(predicted, doubt)
    parted = gaps > APART
    closest = np.where(parted, gaps, np.inf).min(axis=(0, 1))
    best = max(range(len(choices)), key=lambda place: (parted[..., place].sum(), closest[place]))
    if not parted[..., best].any():
        return None
    expected = [(trial, float(each[best])) for trial, each in zip(rivals, predicted, strict=True)]
    return NextMeasurement(choices[best], _sentence(choices[best], expected))


def _predicted(bench: Bench, rivals: Sequence[Trial], choices: Sequence[Ends]) -> Array:
    """What each rival (rows) expects of each choice, ohm."""
    import numpy as np

    suspected = [each.suspect for each in rivals]
    given = model(bench.solved, bench.network, bench.spread, choices, suspected)
    return predict(given, np.array([each.strength for each in rivals]))


def _relative_doubt(figures: Figures) -> float:
    """The meter's usual relative standard uncertainty, from the readings it has given."""
    import numpy as np

    return float(np.median(figures.sigma / np.maximum(figures.ohm, figures.sigma)))


def _gaps(predicted: Array, doubt: float) -> Array:
    """Standard uncertainties between each two rivals in each choice; two overloads are alike."""
    import numpy as np

    shown = np.clip(predicted, 1.0, CEILING)
    low = np.minimum(shown[:, None], shown[None])
    high = np.maximum(shown[:, None], shown[None])
    return (high - low) / (doubt * np.where(high < CEILING, high, low))


def _sentence(pair: Ends, expected: Sequence[tuple[Trial, float]]) -> str:
    meanings: dict[str, list[str]] = {}
    for trial, figure in expected:
        meanings.setdefault(_figure(figure), []).append(trial.defect.sentence)
    named = "; ".join(
        f"{figure} would mean {_short_list(meant)}" for figure, meant in meanings.items()
    )
    return f"Measure between {pair[0]} and {pair[1]}: {named}."


def _short_list(meant: Sequence[str]) -> str:
    rest = len(meant) - MOST_NAMED
    named = " or ".join(meant[:MOST_NAMED])
    return f"{named} or {rest} more" if rest > 0 else named


def _figure(figure: float) -> str:
    return "overload" if figure >= CEILING else f"about {ohm(figure)}"
