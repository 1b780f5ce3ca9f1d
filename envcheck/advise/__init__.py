"""Above solve and judge: what would bring a line within its limit, how far a drawing may move."""
