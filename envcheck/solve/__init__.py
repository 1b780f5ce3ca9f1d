"""Physics: from an assembly and a setting to a value, a bracket and a worksheet.

``network`` knows resistors and nothing of buildings; ``wiring`` connects drawn blocks in the two
classical ways; ``methods/`` holds one file per physical element; ``assembly`` asks them.
"""
