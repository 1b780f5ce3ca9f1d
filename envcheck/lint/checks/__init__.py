"""The checks, a file for each subject."""
