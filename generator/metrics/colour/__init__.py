"""Colour, colour rendering and radiometric figures of spectra, all for whole batches at once."""

from generator.metrics.colour.chromaticity import chromaticity_uv_prime
from generator.metrics.colour.colour_consistency import declared_centre, nominal_centre, sdcm
from generator.metrics.colour.colour_temperature import planckian_locus_uv, planckian_locus_xy
from generator.metrics.colour.emitter import EmitterSplit, emitter_split
from generator.metrics.colour.figures import REFERENCE_OF_RA, spectral_figures

__all__ = [
    "REFERENCE_OF_RA",
    "EmitterSplit",
    "chromaticity_uv_prime",
    "declared_centre",
    "emitter_split",
    "nominal_centre",
    "planckian_locus_uv",
    "planckian_locus_xy",
    "sdcm",
    "spectral_figures",
]
