"""One file per physical element or prescribed way to wire them.

Each file has the formula with its source above a pure function, and a tuple ``METHODS`` of records
(:class:`envcheck.solve.registry.Method`). A file in this folder is found; there is no list to keep.
"""
