"""The brief: what a cell asks for, and its file."""
