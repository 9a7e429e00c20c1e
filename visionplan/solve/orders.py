"""The orders a ranking can be asked for in."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from visionplan.solve.case import Case
from visionplan.solve.checks import far_depth, near_depth
from visionplan.solve.figures import signal_to_noise_at
from visionplan.solve.rigs import Rigs


@dataclass(frozen=True, eq=False)
class Order:
    """A figure to order rigs by, at each stop's working point; the smaller the better once the sign is on."""

    figure: Callable[[Rigs], np.ndarray]
    sign: int
    symbols: tuple[str, ...] = ()
    """Camera symbols that the figure tells apart beyond what the demands do."""


def _at_point(figure: Callable[[Case, np.ndarray], np.ndarray]) -> Callable[[Rigs], np.ndarray]:
    def of(rigs: Rigs) -> np.ndarray:
        with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
            return figure(rigs.case, rigs.point)

    return of


ORDERS: dict[str, Order | None] = {
    "value": None,
    "latitude": Order(lambda rigs: rigs.room, -1),
    "depth": Order(_at_point(lambda case, m: near_depth(case, m) + far_depth(case, m)), -1),
    "snr": Order(_at_point(signal_to_noise_at), -1, ("eta", "variance", "saturation")),
    "price": None,
    "sampling": Order(_at_point(lambda case, m: case.P / m), 1),
    "yield": Order(lambda rigs: rigs.share, -1),
    "length": Order(_at_point(lambda case, m: case.length(m)), 1, ("camera_length",)),
}
"""Name → its figure. value goes by grade, then what is known, then price, then latitude; price by the price."""
