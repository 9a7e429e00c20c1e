"""Demands of a brief that contradict each other whatever the catalogue holds."""

from visionplan.solve.ask import Ask


def contradictions(ask: Ask) -> tuple[str, ...]:
    """Sentences about demands that no rig can meet together.

    A small f-number is wanted by diffraction, a great one by depth: at the best one a depth of about
    β · feature/(1.22 λ) is left on each side of the focus plane.
    """
    brief = ask.brief
    slack = min(map(ask.slack, ask.arrangements))
    most = ask.beta * brief.feature / (1.22 * brief.wavelength)
    deep = max(ask.A, ask.B) + slack
    if deep <= most:
        return ()
    return (
        f"Depth and diffraction contradict each other whatever the lens: {deep:.4g} mm from the focus plane must be "
        f"sharp, and with a blur of {ask.beta:.4g} mm and a feature of {brief.feature:.4g} mm only about "
        f"{most:.4g} mm can be.",
    )
