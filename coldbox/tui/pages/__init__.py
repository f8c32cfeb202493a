"""The pages: what fills the screen between its first line and its last three."""
