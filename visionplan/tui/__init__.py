"""The terminal interface: a state that knows no Textual, rows drawn from it, and the widgets that show them."""
