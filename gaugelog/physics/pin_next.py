"""The one further measurement that parts the best explanations of figures between pins."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import combinations

from gaugelog.physics.defects import ohm
from gaugelog.physics.pin_fit import CEILING, Ends, Figures, model, predict
from gaugelog.physics.pin_network import ARTICLE, SHIELD
from gaugelog.physics.pin_trials import APART, Bench, Trial, exchanged
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
    choices = _choices(bench, figures)
    predicted = [_predicted(bench, trial, choices) for trial in rivals]
    doubt = _relative_doubt(figures)
    scores = [_score([each[place] for each in predicted], doubt) for place in range(len(choices))]
    best = max(range(len(choices)), key=lambda place: scores[place], default=None)
    if best is None or scores[best][0] == 0:
        return NextMeasurement(None, NO_HELP)
    expected = [(trial, float(each[best])) for trial, each in zip(rivals, predicted, strict=True)]
    return NextMeasurement(choices[best], _sentence(choices[best], expected))


def _rivals(groups: Sequence[Sequence[Trial]]) -> list[Trial]:
    """The first answer's explanations, and the next answer's best where it is close."""
    first = list(groups[0])
    close = [group[0] for group in groups[1:2] if group[0].misfit - first[0].misfit < RIVAL]
    return first + close


def _choices(bench: Bench, figures: Figures) -> list[Ends]:
    """Pairs not yet measured: of pins first, then those that reach to the tabs."""
    terminals = (*bench.pins, ARTICLE, SHIELD)
    tabs = [node for node in bench.network.nodes if node not in bench.pins]
    done = {frozenset(pair) for pair in figures.ends}
    outer = [pair for pair in combinations(terminals, 2) if frozenset(pair) not in done]
    inner = [pair for pair in combinations((*terminals, *tabs), 2) if pair[1] in tabs]
    return outer + inner


def _predicted(bench: Bench, trial: Trial, choices: Sequence[Ends]) -> Array:
    import numpy as np

    ends = exchanged(choices, trial.suspect)
    given = model(bench.solved, bench.network, bench.spread, ends, [trial.suspect])
    return predict(given, np.array([trial.strength]))[:, 0]


def _relative_doubt(figures: Figures) -> float:
    """The meter's usual relative standard uncertainty, from the readings it has given."""
    import numpy as np

    return float(np.median(figures.sigma / np.maximum(figures.ohm, figures.sigma)))


def _score(predicted: Sequence[float], doubt: float) -> tuple[int, float]:
    """How many pairs of explanations a measurement parts, and by how much the closest of them."""
    gaps = [_gap(one, other, doubt) for one, other in combinations(predicted, 2)]
    parted = [gap for gap in gaps if gap > APART]
    return len(parted), min(parted, default=0.0)


def _gap(one: float, other: float, doubt: float) -> float:
    """Standard uncertainties between two expected figures; two that overload are alike."""
    low, high = sorted((max(one, 0.0), max(other, 0.0)))
    if low >= CEILING:
        return 0.0
    return (high - low) / (doubt * max(high if high < CEILING else low, 1.0))


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
