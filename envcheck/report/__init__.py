"""From judged lines to a page: one view that holds every word and figure, laid out by formats.

``view.build`` makes the view of a check, ``explain.build`` that of one element or assembly. A
format in ``formats/`` only lays out what stands in the view, so that all carry the same figures.
"""
