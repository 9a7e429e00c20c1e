"""Catalogue intake: other people's sheets, taken into a catalogue through a column map."""
