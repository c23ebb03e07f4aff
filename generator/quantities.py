"""The catalogue of quantities: name, symbol, unit, decimals, and the document that defines it.

One entry per name of the campaign format. CSV headings, figures, clauses, sheets and the
glossary all take their words from here; a name that is not here does not exist.
"""

from __future__ import annotations

import difflib
from dataclasses import dataclass
from types import MappingProxyType

from generator.language import say

__all__ = [
    "GROUPS",
    "QUANTITIES",
    "Quantity",
    "quantity",
    "suggestion",
]

GROUPS = (
    "photometric",
    "colour",
    "rendering",
    "radiometric",
    "modulation",
    "electrical",
    "harmonics",
    "distribution",
    "ageing",
    "energy",
)


@dataclass(frozen=True, slots=True)
class Quantity:
    """One quantity of the catalogue.

    Parameters
    ----------
    name
        Name used in files and code; ends in the unit where there is one.
    label
        Name in words, a message; British spelling.
    symbol
        Symbol of the defining document, plain text.
    unit
        Unit as printed, a message where it is a word; empty for a dimensionless figure.
    decimals
        Decimals shown where no uncertainty says otherwise.
    group
        One of :data:`GROUPS`.
    source
        Key into ``generator/datasets/sources.toml`` of the defining document.
    """

    name: str
    label: str
    symbol: str
    unit: str
    decimals: int
    group: str
    source: str


def _catalogue() -> dict[str, Quantity]:
    rows: list[tuple[str, str, str, str, int, str, str]] = [
        # photometric
        ("luminous_flux_lm", say("luminous flux"), "Φ", "lm", 0, "photometric", "cie_s025"),
        (
            "useful_luminous_flux_lm",
            say("useful luminous flux"),
            "Φuse",
            "lm",
            0,
            "photometric",
            "eu_2019_2015",
        ),
        ("efficacy_lm_per_w", say("luminous efficacy"), "η", "lm/W", 1, "photometric", "cie_s025"),
        # colour
        ("x", say("chromaticity x"), "x", "", 4, "colour", "cie_15"),
        ("y", say("chromaticity y"), "y", "", 4, "colour", "cie_15"),
        ("u_prime", say("chromaticity u′"), "u′", "", 4, "colour", "iso_cie_11664_5"),
        ("v_prime", say("chromaticity v′"), "v′", "", 4, "colour", "iso_cie_11664_5"),
        ("cct_k", say("correlated colour temperature"), "CCT", "K", 0, "colour", "ohno_2014"),
        ("duv", say("distance from the Planckian locus"), "Duv", "", 4, "colour", "ohno_2014"),
        ("sdcm", say("colour consistency"), "SDCM", say("steps"), 1, "colour", "iec_60081"),
        ("peak_wavelength_nm", say("peak wavelength"), "λp", "nm", 0, "colour", "cie_eilv"),
        ("centroid_wavelength_nm", say("centroid wavelength"), "λc", "nm", 1, "colour", "cie_eilv"),
        ("dominant_wavelength_nm", say("dominant wavelength"), "λd", "nm", 1, "colour", "cie_15"),
        ("excitation_purity", say("excitation purity"), "pe", "", 3, "colour", "cie_15"),
        # rendering
        ("ra", say("general colour rendering index"), "Ra", "", 1, "rendering", "cie_13_3"),
        *(
            (
                f"r{i}",
                say("special colour rendering index R{number}", number=i),
                f"R{i}",
                "",
                0,
                "rendering",
                "cie_13_3" if i <= 14 else "jis_z_8726",
            )
            for i in range(1, 16)
        ),
        ("rf", say("colour fidelity index"), "Rf", "", 1, "rendering", "ies_tm_30_18"),
        ("rg", say("colour gamut index"), "Rg", "", 1, "rendering", "ies_tm_30_18"),
        *(
            (
                f"rcs_h{j}",
                say("local chroma shift, hue bin {number}", number=j),
                f"Rcs,h{j}",
                "%",
                1,
                "rendering",
                "ies_tm_30_18",
            )
            for j in range(1, 17)
        ),
        *(
            (
                f"rhs_h{j}",
                say("local hue shift, hue bin {number}", number=j),
                f"Rhs,h{j}",
                "rad",
                3,
                "rendering",
                "ies_tm_30_18",
            )
            for j in range(1, 17)
        ),
        *(
            (
                f"rf_h{j}",
                say("local colour fidelity, hue bin {number}", number=j),
                f"Rf,h{j}",
                "",
                0,
                "rendering",
                "ies_tm_30_18",
            )
            for j in range(1, 17)
        ),
        # radiometric
        ("radiant_flux_w", say("radiant flux"), "Φe", "W", 3, "radiometric", "cie_s025"),
        (
            "ler_lm_per_w",
            say("luminous efficacy of radiation"),
            "K",
            "lm/W",
            1,
            "radiometric",
            "cie_eilv",
        ),
        ("radiant_efficiency", say("radiant efficiency"), "ηe", "", 3, "radiometric", "cie_eilv"),
        (
            "scotopic_photopic_ratio",
            say("scotopic to photopic ratio"),
            "S/P",
            "",
            2,
            "radiometric",
            "cie_191",
        ),
        (
            "melanopic_der",
            say("melanopic daylight efficacy ratio"),
            "melDER",
            "",
            3,
            "radiometric",
            "cie_s026",
        ),
        (
            "kb_v_w_per_lm",
            say("blue-light-hazard efficacy of luminous radiation"),
            "K_B,v",
            "W/lm",
            6,
            "radiometric",
            "iec_62471",
        ),
        (
            "blue_light_threshold_lx",
            say("illuminance at the blue-light risk group 1/2 border"),
            "Ethr",
            "lx",
            0,
            "radiometric",
            "iec_62471_7",
        ),
        (
            "emitter_peak_nm",
            say("blue emitter peak wavelength"),
            "λem",
            "nm",
            1,
            "radiometric",
            "lampassay_methods",
        ),
        (
            "emitter_photon_energy_ev",
            say("blue emitter photon energy"),
            "Eem",
            "eV",
            3,
            "radiometric",
            "lampassay_methods",
        ),
        (
            "emitter_fraction",
            say("share of radiant flux from the blue emitter"),
            "fem",
            "",
            3,
            "radiometric",
            "lampassay_methods",
        ),
        # modulation
        (
            "flicker_frequency_hz",
            say("frequency of the light modulation"),
            "f",
            "Hz",
            1,
            "modulation",
            "cie_eilv",
        ),
        (
            "percent_flicker",
            say("percent flicker (modulation depth)"),
            "PF",
            "%",
            1,
            "modulation",
            "cie_eilv",
        ),
        ("flicker_index", say("flicker index"), "FI", "", 3, "modulation", "iec_60050_845"),
        ("svm", say("stroboscopic visibility measure"), "SVM", "", 2, "modulation", "iec_tr_63158"),
        (
            "pst_lm",
            say("short-term flicker of light"),
            "PstLM",
            "",
            2,
            "modulation",
            "iec_tr_61547_1",
        ),
        *(
            (
                f"pam_{hz}hz_percent",
                say("percent amplitude modulation below {frequency} Hz", frequency=hz),
                f"AM{hz}",
                "%",
                1,
                "modulation",
                "ca_ja10",
            )
            for hz in (40, 90, 200, 400, 1000)
        ),
        (
            "low_risk_modulation_percent",
            say("modulation at the low-risk line"),
            "Mlow",
            "%",
            1,
            "modulation",
            "ieee_1789",
        ),
        # electrical
        ("voltage_v", say("RMS voltage"), "U", "V", 1, "electrical", "iec_60050_131"),
        ("current_a", say("RMS current"), "I", "A", 4, "electrical", "iec_60050_131"),
        ("frequency_hz", say("mains frequency"), "fm", "Hz", 2, "electrical", "iec_60050_131"),
        ("power_w", say("active power"), "P", "W", 2, "electrical", "iec_60050_131"),
        ("apparent_power_va", say("apparent power"), "S", "VA", 2, "electrical", "iec_60050_131"),
        ("power_factor", say("power factor"), "λ", "", 3, "electrical", "iec_60050_131"),
        (
            "displacement_factor",
            say("displacement factor"),
            "cos φ1",
            "",
            3,
            "electrical",
            "eu_2019_2020",
        ),
        (
            "thd_current_percent",
            say("current THD, orders 2 to 40"),
            "THDi",
            "%",
            1,
            "electrical",
            "iec_61000_3_2",
        ),
        (
            "thd_current_all_percent",
            say("current THD, all orders"),
            "THDi,all",
            "%",
            1,
            "electrical",
            "iec_60050_551",
        ),
        (
            "crest_factor",
            say("crest factor of the current"),
            "CF",
            "",
            2,
            "electrical",
            "iec_60050_103",
        ),
        (
            "dc_current_percent",
            say("direct component of the current"),
            "I0",
            "%",
            2,
            "electrical",
            "iec_60050_131",
        ),
        (
            "current_start_deg",
            say("angle at which the current reaches 5 % of its peak"),
            "φstart",
            "°",
            1,
            "electrical",
            "iec_61000_3_2",
        ),
        (
            "current_last_peak_deg",
            say("angle of the last peak of the current"),
            "φpeak",
            "°",
            1,
            "electrical",
            "iec_61000_3_2",
        ),
        (
            "current_end_deg",
            say("angle at which the current falls below 5 % of its peak"),
            "φend",
            "°",
            1,
            "electrical",
            "iec_61000_3_2",
        ),
        ("standby_power_w", say("standby power"), "Psb", "W", 2, "electrical", "iec_62301"),
        (
            "networked_standby_power_w",
            say("networked standby power"),
            "Pnet",
            "W",
            2,
            "electrical",
            "iec_62301",
        ),
        (
            "ambient_temperature_c",
            say("ambient temperature"),
            "ta",
            "°C",
            1,
            "electrical",
            "cie_s025",
        ),
        *(
            (
                f"h{n}_percent",
                say("harmonic {order} of the current", order=n),
                f"h{n}",
                "%",
                1,
                "harmonics",
                "iec_61000_3_2",
            )
            for n in range(2, 41)
        ),
        *(
            (
                f"h{n}_ma_per_w",
                say("harmonic {order} of the current per watt", order=n),
                f"h{n}",
                "mA/W",
                2,
                "harmonics",
                "iec_61000_3_2",
            )
            for n in range(2, 41)
        ),
        # distribution
        ("beam_angle_deg", say("beam angle"), "α", "°", 0, "distribution", "eu_2019_2020"),
        (
            "peak_intensity_cd",
            say("peak luminous intensity"),
            "Imax",
            "cd",
            0,
            "distribution",
            "eu_2019_2020",
        ),
        (
            "flux_90deg_lm",
            say("luminous flux in a 90° cone"),
            "Φ90",
            "lm",
            0,
            "distribution",
            "eu_2019_2015",
        ),
        (
            "flux_120deg_lm",
            say("luminous flux in a 120° cone"),
            "Φ120",
            "lm",
            0,
            "distribution",
            "eu_2019_2015",
        ),
        (
            "flux_120deg_fraction",
            say("share of the flux in a 120° cone"),
            "Φ120/Φ",
            "",
            3,
            "distribution",
            "eu_2019_2015",
        ),
        (
            "luminance_cd_per_mm2",
            say("average luminance towards the peak intensity"),
            "L",
            "cd/mm²",
            1,
            "distribution",
            "eu_2019_2020",
        ),
        (
            "light_emitting_area_mm2",
            say("projected light-emitting area"),
            "A",
            "mm²",
            1,
            "distribution",
            "eu_2019_2015",
        ),
        ("length_mm", say("overall length"), "l", "mm", 0, "distribution", "us_10_cfr_430"),
        # ageing
        (
            "lumen_maintenance_factor",
            say("lumen maintenance factor"),
            "XLMF",
            "",
            3,
            "ageing",
            "eu_2019_2020",
        ),
        ("survival_factor", say("survival factor"), "SF", "", 2, "ageing", "eu_2019_2020"),
        (
            "l70_projected_h",
            say("projected time to 70 % of the initial flux"),
            "L70",
            "h",
            0,
            "ageing",
            "ies_tm_21",
        ),
        ("l70b50_h", say("declared lifetime"), "L70B50", "h", 0, "ageing", "eu_2019_2020"),
        (
            "chromaticity_shift",
            say("chromaticity shift in u′v′"),
            "Δu′v′",
            "",
            4,
            "ageing",
            "ies_tm_21",
        ),
        # energy
        (
            "energy_efficiency_class",
            say("energy efficiency class"),
            "",
            "",
            0,
            "energy",
            "eu_2019_2015",
        ),
        (
            "total_mains_efficacy_lm_per_w",
            say("total mains efficacy"),
            "ηTM",
            "lm/W",
            1,
            "energy",
            "eu_2019_2015",
        ),
        ("max_power_w", say("maximum allowed power"), "Pon,max", "W", 2, "energy", "eu_2019_2020"),
        (
            "energy_kwh_per_1000h",
            say("energy use per 1000 h"),
            "E",
            "kWh/1000 h",
            0,
            "energy",
            "eu_2019_2015",
        ),
        (
            "equivalent_power_w",
            say("power of the lamp it claims to replace"),
            "Peq",
            "W",
            0,
            "energy",
            "eu_2019_2015",
        ),
    ]
    return {row[0]: Quantity(*row) for row in rows}


QUANTITIES = MappingProxyType(_catalogue())


def quantity(name: str) -> Quantity:
    """Give the catalogue entry of a quantity.

    Parameters
    ----------
    name
        Name of the campaign format, for instance ``luminous_flux_lm``.

    Returns
    -------
    Quantity
        The entry.

    Raises
    ------
    KeyError
        If the catalogue has no such name; the text carries the nearest one.
    """
    try:
        return QUANTITIES[name]
    except KeyError:
        near = suggestion(name)
        hint = f"; did you mean {near}?" if near else ""
        raise KeyError(f"no quantity is called {name!r}{hint}") from None


def suggestion(name: str) -> str | None:
    """Give the catalogue name nearest to a mistyped one, or ``None``.

    Parameters
    ----------
    name
        What was written.

    Returns
    -------
    str or None
        The nearest catalogue name where one is near enough.
    """
    near = difflib.get_close_matches(name.lower(), QUANTITIES, n=1, cutoff=0.6)
    return near[0] if near else None
