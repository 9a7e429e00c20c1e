"""As built: from targets in the picture to where the rig stands, what is off, and the move that sets it right.

In focus the magnification is that of the conjugates, m = f/(s − f): it tells the distance where the focal length is
known, and the focal length where the distance is taped. A spacer ring doesn't change it, only what the focus ring can
reach: e ≤ f m ≤ e + x.
"""

from collections.abc import Sequence
from dataclasses import dataclass, replace
from itertools import product
from math import inf, isnan, sqrt

from visionplan.faults import Fault, InputError
from visionplan.solve.case import Case
from visionplan.solve.rig import Rig
from visionplan.solve.suspects import lenses_like, stacks_reaching
from visionplan.solve.target import Measured, Reading, Target, Tilt, out_of_square, read
from visionplan.solve.tolerance import focal_tolerance
from visionplan.solve.variant import variant

TAPE = 1.0
"""How far off a taped distance may be, mm."""


@dataclass(frozen=True)
class Cause:
    """One thing that would explain what was measured."""

    kind: str
    """distance, focal length, lens or rings"""
    off: Measured | None = None
    """Of a distance how much too far, mm; of a focal length how much too long, a fraction."""
    ids: tuple[str, ...] = ()
    """Lenses, or rings in stacks ("A + B"), that would explain it."""
    allowed: bool = False
    """Whether that much is within the lens's stated tolerance."""


@dataclass(frozen=True)
class AsBuilt:
    """What targets in the picture tell of a rig."""

    planned: Rig
    targets: tuple[Target, ...]
    height: float
    """Of the targets over the reference plane, mm."""
    taped: float | None
    """Working distance, mm."""
    at_target: Measured
    """Magnification where the targets lie."""
    magnification: Measured
    """At the focus plane."""
    distance: Measured
    """Working distance: as taped, else what follows with the lens as stated; mm."""
    focal_length: Measured | None
    """That follows from the taped distance, mm; None without, or for a telecentric lens."""
    tilts: tuple[Tilt, ...]
    causes: tuple[Cause, ...]
    """What would explain that it isn't as planned: all of it together when `certain`, else any one alone."""
    certain: bool
    found: Rig
    """Judged where it stands."""
    move: Measured
    """Away from the part (below 0: towards it), mm, to the working point of `corrected`; refocus after it."""
    corrected: Rig
    """After the move, squared up, with `corrected.spacers` on."""

    @property
    def broken(self) -> tuple[str, ...]:
        """The demands and gates that it misses where it stands."""
        return tuple(verdict.name for verdict in self.found.demands if verdict.verdict == "missed")


def as_built(planned: Rig, targets: Sequence[Target], distance: float | None = None, height: float = 0.0) -> AsBuilt:
    """Diagnose a rig.

    Parameters
    ----------
    planned : as it was to be built, with its working point
    targets : what they span, each in one picture that is in focus
    distance : working distance as taped, mm
    height : of the plane that the targets lie on over the reference plane, mm

    Raises
    ------
    InputError
        Where a target can't span what is said, or nothing can be said of the rig.
    """
    case = planned.case
    check(planned, targets, distance)
    sides = {"width": case.w, "height": case.h}
    raised = height - case.z

    def focused(m: float) -> float:
        return _at_focus(case, m, raised)

    seen = read(targets, case.P, sides, lambda m: inf if case.telecentric else float(case.u(focused(m))) - raised)
    there = seen.magnification
    m = Measured(*(focused(value) for value in (there.value, there.low, there.high)))
    if case.telecentric:
        return _telecentric(planned, tuple(targets), height, distance, seen, m)
    implied = Measured(*(float(case.WD(value)) for value in (m.value, m.high, m.low)))
    focal = None if distance is None else _focal_length(case, m, distance)
    other = focal is not None and not _as_stated(case, focal)
    causes = _causes(planned, m, implied, distance, focal)
    lens = _with_focal_length(case, focal.value) if focal and other else None
    now = distance if distance is not None else implied.value
    found = variant(planned, _tilted(planned, seen), at=now if other else implied.value, lens=lens)
    corrected = planned if lens is None else variant(planned, lens=lens)
    if not corrected.fits and lens:
        free = variant(planned, rings="best", lens=lens)
        corrected = free if free.fits else corrected
    return AsBuilt(
        planned,
        tuple(targets),
        height,
        distance,
        there,
        m,
        implied if distance is None else Measured(distance, distance - TAPE, distance + TAPE),
        focal,
        seen.tilts,
        causes,
        distance is not None,
        found,
        _move(case.f if focal is None or not other else focal, m, corrected),
        corrected,
    )


def check(planned: Rig, targets: Sequence[Target], distance: float | None) -> None:
    """Raise InputError where `as_built` would."""
    case, faults = planned.case, []

    def fault(found: str, expected: str) -> None:
        faults.append(Fault("", found, expected, column="target"))

    if planned.magnification is None:
        fault("no magnification meets what the brief asks of this rig, so nothing is planned", "another rig")
    if not targets:
        fault("there is no target", "a length and the pixels it spans")
    for target in targets:
        most = {"width": case.w, "height": case.h}[target.along] / case.P
        if not target.length > 0:
            fault(f"a target of {target.length:g} mm", "a length greater than 0")
        elif not 10 <= target.pixels <= most + 0.5:
            if case.line and most < 10:
                fault(f"a target along the {target.along}, across the row", "one along the row")
            else:
                fault(
                    f"a target that spans {target.pixels:g} pixels along the {target.along}",
                    f"from 10 to the {most:.0f} that the camera has there",
                )
    if distance is not None and not case.telecentric and distance + case.a - case.D - case.z <= 0:
        fault(f"a working distance of {distance:g} mm", "more than the layers take")
    if faults:
        raise InputError(faults)


def _at_focus(case: Case, there: float, raised: float) -> float:
    """Magnification at the focus plane from that on a plane raised over it: m u/(u − raised) = there, for m."""
    if case.telecentric or not raised:
        return there
    square, linear = case.f * case.psi, case.f - there * (case.f * case.psi - raised)
    return 2 * there * case.f / (linear + sqrt(linear**2 + 4 * square * there * case.f))


def _focal_length(case: Case, m: Measured, taped: float) -> Measured:
    """f = m s/(1 + m), s the taped distance from the front principal plane as the lens states it."""
    s, room = taped + case.a - case.D - case.z, TAPE + _principal_room(case)
    low, high = m.low / (1 + m.low) * (s - room), m.high / (1 + m.high) * (s + room)
    return Measured(m.value / (1 + m.value) * s, low, high)


def _principal_room(case: Case) -> float:
    """How far off the front principal plane may be: half the lens where the catalogue leaves all open, mm."""
    lenses = case.problem.catalogue.lenses
    stated = (lenses[name][case.lenses] for name in ("front principal", "nearest magnification"))
    if not all(isnan(value) for value in stated):
        return 0.0
    return case.f if isnan(case.lens_length) else case.lens_length / 2


def _as_stated(case: Case, focal: Measured) -> bool:
    room = case.f * (focal_tolerance(case) or 0.0)
    return focal.low <= case.f + room and focal.high >= case.f - room


def _causes(
    planned: Rig, m: Measured, implied: Measured, taped: float | None, focal: Measured | None
) -> tuple[Cause, ...]:
    case, causes = planned.case, []
    plan = planned.working_distance or 0.0
    if focal is None and not m.holds(planned.magnification or 0.0):
        causes.append(Cause("distance", _less(implied, plan)))
        needed = _focal_length(case, m, plan)
        causes.append(_focal_cause(case, needed))
        causes += _lens_cause(case, m, plan)
    if taped is not None and focal is not None:
        stated, vague = _as_stated(case, focal), _principal_room(case) > 0
        if stated and vague:
            if not m.holds(planned.magnification or 0.0):
                causes.append(Cause("distance", _less(implied, plan)))
        elif abs(taped - plan) > TAPE:
            causes.append(Cause("distance", Measured(taped - plan, taped - plan - TAPE, taped - plan + TAPE)))
        if not stated:
            causes.append(_focal_cause(case, focal))
            causes += _lens_cause(case, m, taped)
    f = case.f if focal is None or _as_stated(case, focal) else focal.value
    if not isnan(case.e + case.x) and (f * m.high < case.e or f * m.low > case.e + case.x + case.y):
        causes.append(Cause("rings", ids=stacks_reaching(planned, f * m.value)))
    return tuple(causes)


def _focal_cause(case: Case, needed: Measured) -> Cause:
    off = Measured(*(value / case.f - 1 for value in (needed.value, needed.low, needed.high)))
    tolerance = focal_tolerance(case)
    return Cause("focal length", off, allowed=tolerance is not None and min(abs(off.low), abs(off.high)) <= tolerance)


def _lens_cause(case: Case, m: Measured, distance: float) -> list[Cause]:
    alike = lenses_like(case, m, (distance - TAPE, distance + TAPE))
    return [Cause("lens", ids=alike)] if alike else []


def _less(measured: Measured, value: float) -> Measured:
    return Measured(measured.value - value, measured.low - value, measured.high - value)


def _with_focal_length(case: Case, focal_length: float) -> dict[str, float]:
    """The lens's columns with another focal length, its principal plane and its ring's travel as they were."""
    columns = {"focal length": focal_length, "front principal": case.a}
    return columns if isnan(case.x) else columns | {"nearest magnification": case.x / focal_length}


def _tilted(planned: Rig, seen: Reading):
    """The brief with the tilt that was found, where it is more than the brief's own."""
    brief = planned.case.brief
    found = out_of_square(seen.tilts)
    return replace(brief, tilt=found) if found > brief.tilt else brief


def _move(focal: float | Measured, m: Measured, corrected: Rig) -> Measured:
    """f (1/m* − 1/m): the principal plane, layers and heights cancel."""
    goal = corrected.magnification or m.value
    f = Measured(focal, focal, focal) if isinstance(focal, float) else focal
    ends = [length * (1 / goal - 1 / there) for length, there in product((f.low, f.high), (m.low, m.high))]
    return Measured(f.value * (1 / goal - 1 / m.value), min(ends), max(ends))


def _telecentric(
    planned: Rig, targets: tuple[Target, ...], height: float, taped: float | None, seen: Reading, m: Measured
) -> AsBuilt:
    """Its magnification doesn't tell the distance: only a tape does."""
    case, plan = planned.case, planned.working_distance or 0.0
    stands = plan if taped is None else taped
    room = case.WD_room + TAPE
    causes = []
    other = not m.holds(case.M)
    if other:
        causes.append(Cause("lens", ids=lenses_like(case, m, (stands - room, stands + room))))
    off = stands - plan
    nominal = case.WD_stated + case.D + case.z
    if abs(stands - nominal) > room:
        causes.append(Cause("distance", Measured(off, off - TAPE, off + TAPE)))
    found = variant(planned, _tilted(planned, seen), lens={"magnification": m.value} if other else None)
    move = -off if abs(stands - nominal) > room else 0.0
    return AsBuilt(
        planned,
        targets,
        height,
        taped,
        seen.magnification,
        m,
        Measured(stands, stands - TAPE, stands + TAPE),
        None,
        seen.tilts,
        tuple(causes),
        True,
        found,
        Measured(move, move - TAPE, move + TAPE) if move else Measured(0.0, 0.0, 0.0),
        planned,
    )
