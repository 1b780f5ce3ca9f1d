"""Judging: which limit and why, one finding per line, what holds for the whole building.

``select`` finds the limit, ``compare`` is the only place where numbers meet it, ``verdict`` says
what follows for one line, ``building`` what follows for areas and means, ``crosschecks`` looks for
the mistakes that submittals make.
"""
