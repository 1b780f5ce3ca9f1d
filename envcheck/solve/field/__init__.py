"""Two-dimensional conduction of a drawn section, bounded from both sides.

Two resistor networks on one grid enclose the exact value of the drawn model: the cell-centred one
is never too high, the node-centred one never too low. Only this room imports numpy and scipy, and
nothing imports this room until a section is asked for.
"""
