"""Laws of geometrical optics, diffraction and light: pure functions on floats and numpy arrays that broadcast.

Lengths in mm, wavelengths too, times in s, angles in rad. Magnification is the modulus: the image is inverted. Light
travels from the part to the lens; distances before the lens count from its front principal plane towards the part. A
telecentric lens is one whose focal length and pupil ratio are infinite. NaN stands for what is not known, and comes
out wherever it goes in.
"""

from typing import Any, TypeAlias

Numbers: TypeAlias = Any
"""A float, or a numpy array of floats, broadcast against the other arguments; the result has the shape of them all."""
