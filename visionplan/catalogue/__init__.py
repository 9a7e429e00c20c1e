"""The catalogue: lenses, cameras and spacer rings, their columns, and reading them from files."""
