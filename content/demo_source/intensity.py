"""Forward model of the luminous intensity distribution of a reflector lamp."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

__all__ = ["Beam"]

Array = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Beam:
    """A beam with a flat-topped or pointed core and a weak spill towards the side.

    Parameters
    ----------
    angle_deg
        Beam angle at half the centre-beam intensity, mean over the planes [degrees].
    flatness
        Exponent of the core; 2 is a Gaussian, more is flatter.
    spill
        Share of the centre-beam intensity that falls off with the cosine only.
    ellipticity
        Half the relative difference between the widest and the narrowest plane.
    c_step_deg, gamma_step_deg
        Steps of the goniophotometer [degrees].
    """

    angle_deg: float
    flatness: float = 2.2
    spill: float = 0.01
    ellipticity: float = 0.02
    c_step_deg: float = 15.0
    gamma_step_deg: float = 2.5

    def relative(self, c_deg: Array, gamma_deg: Array) -> Array:
        """Intensity relative to the centre of the beam, (planes, angles)."""
        half = self.angle_deg / 2.0
        level = (0.5 - self.spill * np.cos(np.radians(half))) / (1.0 - self.spill)
        scale = half / (-np.log2(level)) ** (1.0 / self.flatness)
        stretch = 1.0 + self.ellipticity * np.cos(2.0 * np.radians(c_deg))
        core = np.exp2(-((gamma_deg[None, :] / (scale * stretch[:, None])) ** self.flatness))
        front = np.maximum(np.cos(np.radians(gamma_deg)), 0.0)
        light = (1.0 - self.spill) * core + self.spill * front[None, :]
        return np.where(gamma_deg[None, :] <= 90.0, light, 0.0)

    def flux_per_candela(self, cone_deg: float = 360.0) -> float:
        """Flux inside a cone of a full angle [degrees] per candela at the centre [lm/cd]."""
        step = np.radians(0.1)
        gamma_deg = np.arange(0.05, min(cone_deg / 2.0, 90.0), 0.1)
        mean = self.relative(np.arange(0.0, 360.0, 5.0), gamma_deg).mean(axis=0)
        return float(2.0 * np.pi * np.sum(mean * np.sin(np.radians(gamma_deg))) * step)

    def grid(self) -> tuple[Array, Array]:
        """Planes and angles of the goniophotometer [degrees]."""
        c_deg = np.arange(0.0, 360.0, self.c_step_deg)
        return c_deg, np.arange(0.0, 180.0 + self.gamma_step_deg / 2.0, self.gamma_step_deg)
