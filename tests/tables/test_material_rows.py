"""Materials against figures that other documents give, and against what matter allows."""

from __future__ import annotations

import CoolProp.CoolProp as coolprop
import pytest
from ht.insulation import ASHRAE, building_materials

from coldbox.tables import load

MATERIALS = load.rows("materials")


def test_there_are_enough_of_them():
    assert len(MATERIALS) >= 60
    assert {row["kind"] for row in MATERIALS.values()} >= {
        "foam", "insulation", "evacuated", "metal", "masonry", "wood",
        "plastic", "packaging", "glass", "ground", "other",
    }  # fmt: skip


@pytest.mark.parametrize(
    "name", ["steel sheet", "PIR foam", "PUR foam", "EPS foam", "concrete", "polyethylene", "corrugated board"]
)
def test_the_names_a_project_uses(name):
    assert load.row("materials", name)["conductivity"] > 0


# W/mK at 10 °C mean, kg/m³ (lowest, highest), by kind: no row may be out by a power of ten.
RANGES = {
    "foam": (0.018, 0.050, 15, 150),
    "insulation": (0.012, 0.12, 15, 400),
    "evacuated": (0.002, 0.010, 120, 300),
    "metal": (15, 400, 2500, 11500),
    "masonry": (0.10, 4.0, 400, 2900),
    "wood": (0.10, 0.25, 350, 900),
    "plastic": (0.10, 0.6, 850, 2000),
    "packaging": (0.03, 0.2, 20, 1000),
    "glass": (0.7, 1.5, 2100, 2600),
    "ground": (0.3, 4.0, 1200, 2800),
    "other": (0.01, 2.4, 1, 1200),
}


@pytest.mark.parametrize("name", MATERIALS)
def test_every_material_lies_within_its_kind(name):
    row = MATERIALS[name]
    low, high, light, heavy = RANGES[row["kind"]]
    assert low <= row["conductivity"] <= high
    assert light <= row["density"] <= heavy
    assert ("edge_psi" in row) == (row["kind"] == "evacuated")
    if row["kind"] == "metal":
        assert row["specific_heat"] < 900
        assert row["temperature_factor"] == 0
    elif name not in ("argon", "water"):
        assert 700 <= row["specific_heat"] <= 2400
    assert 0 <= row["temperature_factor"] <= 0.007


@pytest.mark.parametrize(
    ("name", "watts_per_mk"),
    [
        ("brick", 0.72), ("face brick", 1.3), ("plaster", 0.72), ("softwood", 0.12), ("corkboard", 0.043),
        ("EPS foam", 0.036), ("PUR foam", 0.025), ("mineral wool", 0.039), ("glass wool", 0.036),
        ("sawdust", 0.065), ("wood fibre", 0.043),
    ],
)  # fmt: skip
def test_cold_store_walls_of_the_handbooks(name, watts_per_mk):
    """Conductivities that handbooks list for cold-store walls; within 5 %."""
    assert load.row("materials", name)["conductivity"] == pytest.approx(watts_per_mk, rel=0.05)


@pytest.mark.parametrize(
    ("name", "thickness", "conductance"),
    [("concrete block", 0.2, 5.11), ("cinder block", 0.2, 3.29), ("hollow clay tile", 0.2, 3.07)],
)
def test_hollow_blocks_as_one_layer(name, thickness, conductance):
    """Conductances of whole blocks that handbooks list, W/m²K; within 1 %."""
    assert load.row("materials", name)["conductivity"] / thickness == pytest.approx(conductance, rel=0.01)


@pytest.mark.parametrize(
    ("name", "fluid", "at_c", "rel"),
    [("water", "Water", 10, 0.04), ("still air", "Air", 10, 0.02), ("argon", "Argon", 10, 0.04)],
)
def test_fluids_against_a_property_library(name, fluid, at_c, rel):
    row = MATERIALS[name]
    for column, letter in (("conductivity", "L"), ("density", "D"), ("specific_heat", "C")):
        there = coolprop.PropsSI(letter, "T", at_c + 273.15, "P", 101325.0, fluid)
        assert row[column] == pytest.approx(there, rel=rel)


def test_heat_capacity_of_soils_agrees_between_tables():
    for material, soil in (("clay soil", "clay"), ("sand", "sand"), ("rock", "rock")):
        row, ground = MATERIALS[material], load.row("soils", soil)
        assert row["conductivity"] == ground["conductivity"]
        assert row["density"] * row["specific_heat"] == pytest.approx(ground["heat_capacity"], rel=0.01)


# Rows against the design values of EN 12524 (ISO 10456 took them over) as a heat-transfer library holds them.
STANDARD = {
    "steel sheet": "Metals, steel",
    "aluminium": "Metals, aluminium alloys",
    "copper": "Metals, copper",
    "brass": "Metals, brass",
    "cast iron": "Metals, iron, cast",
    "lead": "Metals, lead",
    "zinc": "Metals, zinc",
    "concrete": "Concrete, medium density 2200 kg/m^3",
    "dense concrete": "Concrete, high density",
    "reinforced concrete": "Concrete, reinforced with 1% steel",
    "light concrete": "Concrete, medium density 1800 kg/m^3",
    "gypsum plaster": "Plasters and renders, gypsum plastering, 1300 kg/m^3",
    "plasterboard": "Gypsum, plasterboard",
    "ceramic tiles": "Tiles, ceramic or porcelain",
    "granite": "Stone, granite",
    "limestone": "Stone, limestone, hard",
    "sandstone": "Stone, sandstone (silica)",
    "asphalt": "Asphalt",
    "bitumen felt": "Bitumen, felt or sheet",
    "hardwood": "Timber, 700 kg/m^3",
    "plywood": "Wood, plywood 500 kg/m^3",
    "film-faced plywood": "Wood, plywood 700 kg/m^3",
    "particle board": "Wood, particleboard, 600 kg/m^3",
    "OSB": "Wood, oriented strand board",
    "fibreboard": "Wood, fibreboard, 600 kg/m^3",
    "polyethylene": "Plastics, polyethylene / polythene, high density",
    "low-density polyethylene": "Plastics, polyethylene / polythene, low density",
    "polypropylene": "Plastics, polypropylene",
    "PVC": "Plastics, Polyvinylchloride (PVC)",
    "soft PVC": "Sealant, polyvinylchloride (PVC) flexible, with 40% softner",
    "polystyrene": "Plastics, polystyrene",
    "acrylic": "Plastics, polymethylmethacrylate (PMMA)",
    "polycarbonate": "Plastics, polycarbonates",
    "polyamide": "Plastics, polyamide (nylon)",
    "epoxy": "Plastics, epoxy resin",
    "rubber": "Floor covering, rubber",
    "EPDM": "Rubber, ethylene propylene diene monomer (EPDM)",
    "linoleum": "Floor covering, Linoleum",
    "glass": "Glass, soda lime",
    "quartz glass": "Glass, quartz",
    "ice": "Water, ice at 0 °C",
    "snow": "Water, snow, slightly compacted (70 mm to 100 mm)",
    "water": "Water at 10°C",
    "still air": "Gases, air",
    "argon": "Gases, argon",
}


@pytest.mark.parametrize("name", STANDARD)
def test_design_values_of_the_standard(name):
    row, there = MATERIALS[name], building_materials[STANDARD[name]]
    assert (row["density"], row["conductivity"], row["specific_heat"]) == there


# W/mK, within the share: the ASHRAE table of the same library, for what the European standard does not list.
AMERICAN = {
    "EPS foam": ("Expanded polystyrene, molded beads", 0.03),
    "PIR foam": ("Polyisocyanurate, aged, unfaced", 0.03),
    "sprayed PUR foam": ("Spray-applied Polyurethane foam, 40 kg/m^3", 0.08),
    "glass wool": ("Glass fiber board", 0.01),
    "mineral wool": ("Slag wool, 120 kg/m^3", 0.01),
    "cellular glass": ("Cellular glass", 0.07),
    "cement plaster": ("Cement plaster, sand aggregate", 0.01),
    "expanded perlite": ("Loose fill, Perlite, expanded, 100 kg/m^3", 0.05),
    "softwood": ("Hem/fir, spruce/pine/fir", 0.01),
    "hardwood": ("Oak", 0.06),
}


@pytest.mark.parametrize("name", AMERICAN)
def test_insulation_and_wood_of_the_handbook(name):
    key, share = AMERICAN[name]
    assert MATERIALS[name]["conductivity"] == pytest.approx(ASHRAE[key][2], rel=share)
