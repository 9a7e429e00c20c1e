"""Rankings and rigs as text: tables, drawings, files. Knows no interface."""
