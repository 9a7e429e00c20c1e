"""The numbers of the rigs under judgement, by symbol: what the demands are functions of.

A case gathers a symbol's values from the catalogue only when a formula first asks for it, so judging a million rigs
costs no more arrays than the demands need. Camera and lens symbols broadcast to (rigs, 1), the f-number to
(rigs, stops); the row of a single rig is a case of scalars.
"""

from typing import Any

import numpy as np

from visionplan.optics.conjugates import object_distance
from visionplan.solve.ask import Arrangement, Ask
from visionplan.solve.problem import Problem

SYMBOLS: dict[str, tuple[str, str]] = {
    "W": ("width that one camera must cover", "mm"),
    "H": ("height that one camera must cover", "mm"),
    "q": ("sampling asked for on the part", "mm"),
    "A": ("part above the focus plane", "mm"),
    "B": ("part below the focus plane", "mm"),
    "z": ("height of the focus plane over the reference plane", "mm"),
    "g": ("slack of the depth, on both sides", "mm"),
    "D": ("shift of the layers", "mm"),
    "beta": ("blur of focus allowed on the part", "mm"),
    "beta_v": ("blur of motion allowed on the part", "mm"),
    "v": ("speed of the part", "mm/s"),
    "lam": ("wavelength", "mm"),
    "feature": ("smallest feature", "mm"),
    "f": ("focal length", "mm"),
    "N": ("f-number as marked", ""),
    "p": ("pupil ratio, exit over entrance", ""),
    "a": ("lens front to front principal plane", "mm"),
    "x": ("travel of the focus ring", "mm"),
    "M": ("the one magnification of a telecentric lens, or of a rig that stands already", ""),
    "WD_stated": ("working distance of a telecentric lens", "mm"),
    "WD_room": ("its tolerance", "mm"),
    "telecentricity": ("greatest angle of a chief ray to the axis", "rad"),
    "tau": ("transmittance of the lens", "1"),
    "detail": ("resolution of the lens on the sensor", "lp/mm"),
    "lens_length": ("length of the lens", "mm"),
    "lens_diameter": ("diameter of the lens", "mm"),
    "circle": ("image circle", "mm"),
    "P": ("pixel pitch", "mm"),
    "w": ("sensor along the field's width", "mm"),
    "h": ("sensor along the field's height", "mm"),
    "kappa": ("mosaic factor of the camera", ""),
    "eta": ("quantum efficiency", "1"),
    "variance": ("noise without light, squared", "e²"),
    "saturation": ("saturation capacity", "e"),
    "t_min": ("shortest exposure", "s"),
    "line_rate": ("line rate of the camera", "1/s"),
    "camera_length": ("length of the camera", "mm"),
    "d": ("camera flange distance less that of the lens", "mm"),
    "rings": ("length of the spacer stack", "mm"),
    "y": ("travel of the helicoids in the spacer stack", "mm"),
    "e": ("least extension: flange difference and spacers", "mm"),
}
"""Symbol → what it is, and its unit."""

_OF_ASK = ("q", "A", "B", "z", "D", "beta", "beta_v", "v")

_FOLLOWING = {"f": ("phi",), "p": ("psi",), "d": ("e",), "rings": ("e",)}
"""Symbol → those that follow from it."""


class Case:
    """One rig, or many at once, before the demands."""

    def __init__(self, problem: Problem, cameras=None, lenses=None, **given: Any):
        """Rigs of the given rows of cameras and lenses; either may be left out where no formula asks for it.

        `given` holds what the catalogue doesn't: W, H, g, portrait, rings, and the like.
        """
        self.problem = problem
        self.ask: Ask = problem.ask
        self.brief = problem.brief
        self.cameras: Any = cameras
        self.lenses: Any = lenses
        self.least_contrast: Any = None
        """The least of the three contrasts, once it is worked out."""
        self.share: Any = None
        """The yield, once it is worked out; NaN where nothing is stated that may be off."""
        self.__dict__.update({name: getattr(self.ask, name) for name in _OF_ASK})
        self.lam, self.feature = self.brief.wavelength, self.brief.feature
        self.__dict__.update(given)

    def __getattr__(self, symbol: str) -> Any:
        """Gather a symbol for these rigs, once."""
        if symbol.startswith("__"):
            raise AttributeError(symbol)
        if self.lenses is not None and symbol in self.problem.lens:
            values = self.problem.lens[symbol][self.lenses]
            values = values if symbol == "N" else _column(values)
        elif self.cameras is not None and symbol in self.problem.camera:
            values = _column(self.problem.camera[symbol][self.cameras])
        elif symbol in _DERIVED:
            values = _DERIVED[symbol](self)
        else:
            raise AttributeError(f"no {symbol} in this case")
        self.__dict__[symbol] = values
        return values

    def u(self, m):
        """From the focus plane to the entrance pupil, mm; infinite for telecentric lenses."""
        with np.errstate(divide="ignore"):
            return self.nu(m) / self.phi

    def nu(self, m):
        """u over the focal length: 1/m + 1/p; of a telecentric lens the limit, 1/m."""
        return 1 / m + self.psi

    def N_w(self, m):
        """Working f-number."""
        return self.N * (1 + m * self.psi)

    def WD(self, m):
        """Working distance from the lens front to the reference plane, mm.

        Of a telecentric lens the stated one, moved towards the allowed range by what its tolerance lets it.
        """
        near, far = self.brief.working_distance
        nominal = self.WD_stated + self.D + self.z
        room = self.WD_room
        stated = np.clip(np.clip(nominal, near, far), nominal - room, nominal + room)
        with np.errstate(divide="ignore", invalid="ignore"):
            focused = object_distance(self.f, m) - self.a + self.D + self.z
        return np.where(self.telecentric, stated, focused)

    def length(self, m):
        """From the reference plane to the camera back, without the cable, mm."""
        with np.errstate(invalid="ignore"):
            extension = np.where(self.telecentric, self.rings, self.f * m - self.d)
        return self.WD(m) + self.lens_length + extension + self.camera_length

    def pick(self, arrangement: Arrangement, rows: np.ndarray, stops: np.ndarray) -> "Case":
        """The case of some rigs of one arrangement, each at one stop: arrays of shape (picked, 1)."""
        rings, y = (own[rows] if np.ndim(own) else own for own in (self.rings, self.y))
        cameras, lenses, N = self.cameras[rows], self.lenses[rows], self.N[rows, stops][:, None]
        return case_of(self.problem, arrangement, cameras, lenses, N=N, rings=rings, y=y)

    def varied(self, **given: Any) -> "Case":
        """This case with other values of some symbols, arrays that broadcast against the rest."""
        other = Case(self.problem)
        stale = {name for symbol in given for name in _FOLLOWING.get(symbol, ())}
        other.__dict__.update({name: value for name, value in self.__dict__.items() if name not in stale})
        other.__dict__.update(given)
        return other

    def rows(self) -> list["Case"]:
        """Cases of one rig each, of scalars; only where every symbol is (rigs, 1) or the same for all."""
        count = len(self.cameras)
        symbols = {*SYMBOLS, *_DERIVED, *self.problem.lens, *self.problem.camera, *self.__dict__}
        own = [Case(self.problem, int(camera), int(lens)) for camera, lens in zip(self.cameras, self.lenses)]
        for symbol in symbols - {"problem", "ask", "brief", "cameras", "lenses"}:
            values = np.asarray(getattr(self, symbol))
            column = np.broadcast_to(values.reshape(-1) if values.ndim else values, count).tolist()
            for one, value in zip(own, column):
                one.__dict__[symbol] = value
        return own


def _column(values: np.ndarray) -> np.ndarray:
    return values[:, None] if np.ndim(values) else values


def _flange_difference(case: Case):
    cameras, lenses = case.problem.flange
    camera_unknown, lens_unknown = case.problem.flange_unknown
    camera_mount, lens_mount = case.problem.mount
    equal = (
        camera_unknown[case.cameras]
        & lens_unknown[case.lenses]
        & (camera_mount[case.cameras] == lens_mount[case.lenses])
    )
    return _column(np.where(equal, 0.0, cameras[case.cameras] - lenses[case.lenses]))


def _same_thread(case: Case):
    camera_thread, lens_thread, _ = case.problem.thread
    return _column(camera_thread[case.cameras] == lens_thread[case.lenses])


def _inverse_focal_length(case: Case):
    return 1 / case.f


def _inverse_pupil_ratio(case: Case):
    return 1 / case.p


def case_of(problem: Problem, arrangement: Arrangement, cameras=None, lenses=None, **given) -> Case:
    """The case of rigs that all stand in one arrangement."""
    W, H = problem.ask.covered(arrangement)
    fixed: dict[str, Any] = {"W": W, "H": H, "g": problem.ask.slack(arrangement), "portrait": arrangement.portrait}
    if cameras is not None:
        fixed["w"], fixed["h"] = (_column(side[cameras]) for side in problem.sides(arrangement))
    return Case(problem, cameras, lenses, **fixed, nx=arrangement.nx, ny=arrangement.ny, **given)


_DERIVED = {
    "d": _flange_difference,
    "phi": _inverse_focal_length,
    "psi": _inverse_pupil_ratio,
    "e": lambda case: case.d + case.rings,
    "joined": _same_thread,
}
