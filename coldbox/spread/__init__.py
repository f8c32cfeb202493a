"""How sure an answer is: draws of every unsure input through the same account and timeline, and what they come to.

1. An input with a ± is normal, ± being the half-width that holds 95 of 100 cases, cut at the bounds of its field; a
   range is evenly likely. Where the file gives no ±, the factors of `[spreads]` hold, each one draw for the whole
   project.
2. Latin hypercube: each input has one draw in each of as many equally likely strata as there are draws, in an order of
   its own that only the seed, the count and the input's key path decide. Order in the file, blocks and processes change
   nothing.
3. Draw 0 has every input at its middle. It gives the single figures and is no part of a percentile.
4. The capacity's percentiles leave the safety allowance out: it stands for the same thing.
"""
