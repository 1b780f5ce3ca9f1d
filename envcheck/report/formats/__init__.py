"""One file per format; see :mod:`envcheck.report.registry` for what a file must have."""
