"""visionplan finds the camera, lens and spacer rings that meet everything a machine-vision cell asks for."""

__version__ = "0.1.0"
