"""Drawings in character cells: the unfolded box, the day in bars. Figures in, styled cells out; no terminal known."""
