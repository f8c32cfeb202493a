"""Everything that moves, on one timeline: how warm air, walls, goods and packs are, hour by hour.

Rules of the engine (a step of Δt takes the state from old to new; "new" in a flow means it is solved for):

1. Walls are chains of cells, C dT/dt = Σ G (T_next - T). The outside surface holds no heat: film (T_air - T_s) + gain
   - σ radiating T_s⁴ = G_0 (T_s - T_0), `gain` being the sun it absorbs and the long-wave from sky and ground.
2. Floors are walls whose outermost layers are ground.
3. The air holds heat and water: M dh/dt and M dW/dt, with the dry mass M of the start, h = 1006 t + W (2 501 000 +
   1860 t). Leaks and doors bring m (h' - h) and m (W' - W); doors after Gosney and Olama with the densities of now.
   Water settles at the coldest of innermost wall cells, surfaces of goods and packs, as fast as films carry heat
   (Lewis): β (W - W_s(t_coldest)) where that is positive, β = Σ of all conductances to the air ÷ 1006. It leaves the
   air's books with the enthalpy of ice (below 0 °C) or water at that temperature; its latent heat so stays in the air.
4. A lot is N cells from core to surface, share dh/dt = Σ face (Φ_next - Φ) + share respiration(T), Φ = ∫ k dT the
   conduction potential, its surface behind film and wrap to the air. T and Φ follow from h by the goods' own curve.
   Implicit, and solved in rounds until h, T and Φ at the end of the step agree: what only warms never cools.
5. A pack is one lump with a curve of two lines and a plateau. Dry ice stays at -78.5 °C, its exchange falls with
   (mass left)^⅔; 571 kJ/kg go into gas, which warms from there to the room's temperature, keeps as much leakage out as
   it has volume, and leaves with the room air: carbon dioxide in and out is kept as a balance of its own.
6. Machine: takes out what holds its set point, at most its capacity; all heat of water it dries out included.
7. What came in less what is stored is 0: `heat_balance_error` is that difference over the sum of all flows.

One call does it: `solver.run(network, drivers, plan, state=None) -> Trace`; `solver.start(network, conditions)` makes
the state with the walls steady under given conditions, and `Trace.state` lets the next run go on where one ended.
"""
