"""The box as it stands: from a project to the plain numbers physics needs, made once and shared by all that compute."""

from coldbox.scene.types import Air, Body, Scene, Surface, Weather

__all__ = ["Air", "Body", "Scene", "Surface", "Weather"]
