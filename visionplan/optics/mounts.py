"""What joins lens and camera."""

FLANGE_DISTANCE = {"C": 17.526, "CS": 12.526, "F": 46.5}
"""From the mounting flange to the sensor, mm, of mounts that have one standard value.

C: ISO 10935; CS 5 mm less, and F: common practice.
"""


def thread(mount: str) -> str:
    """What must be alike for a lens to go on a camera: C and CS share a thread, any other mount is its own."""
    return "C" if mount == "CS" else mount
