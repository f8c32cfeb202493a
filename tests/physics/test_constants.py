"""Constants carry their unit and a source that exists, and their values are those of a reference library."""

from __future__ import annotations

import tomllib
from pathlib import Path

import pytest
import scipy.constants

import coldbox
from coldbox.physics import constants
from coldbox.physics.constants import Constant

ALL = {name: value for name, value in vars(constants).items() if isinstance(value, Constant)}
SOURCES = tomllib.loads((Path(coldbox.__file__).parent / "tables" / "sources.toml").read_text(encoding="utf-8"))


def test_none_can_be_made_without_unit_and_source():
    for wanting in ({}, {"unit": "K"}, {"source": "si-2019"}):
        with pytest.raises(TypeError):
            Constant(1.0, **wanting)
    for empty in ({"unit": "", "source": "si-2019"}, {"unit": "K", "source": ""}):
        with pytest.raises(TypeError):
            Constant(1.0, **empty)


@pytest.mark.parametrize("name", ALL)
def test_sources_resolve(name):
    assert ALL[name].source in SOURCES
    assert ALL[name].unit


def test_a_constant_is_a_number():
    assert constants.ZERO_CELSIUS + 1.0 == 274.15
    assert "si-2019" in repr(constants.ZERO_CELSIUS)


def test_against_a_reference_library():
    assert scipy.constants.zero_Celsius == constants.ZERO_CELSIUS
    assert scipy.constants.g == constants.GRAVITY
    assert scipy.constants.atm == constants.STANDARD_PRESSURE
    assert pytest.approx(scipy.constants.Stefan_Boltzmann, rel=1e-9) == constants.STEFAN_BOLTZMANN
    # The handbook's gas constant is 8314.472 / 28.966, of an older mole.
    assert pytest.approx(scipy.constants.R / 28.966e-3, rel=1e-5) == constants.GAS_CONSTANT_DRY_AIR
    assert pytest.approx(18.015268 / 28.966, rel=1e-5) == constants.WATER_TO_AIR_MASS


def test_water_against_a_reference_library():
    from CoolProp.CoolProp import PropsSI

    boiling = PropsSI("H", "T", 273.16, "Q", 1, "Water") - PropsSI("H", "T", 273.16, "Q", 0, "Water")
    assert pytest.approx(boiling, rel=1e-3) == constants.LATENT_EVAPORATION
    assert pytest.approx(PropsSI("C", "T", 293.15, "P", 101325, "Water"), rel=2e-3) == constants.SPECIFIC_HEAT_WATER
