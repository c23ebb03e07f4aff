"""What a check allows where the data give no uncertainty, and from when on it speaks at all.

Every entry says where it comes from. Entries of status ``convention`` are this room's own
choice; they stand in for an uncertainty that was not given and bind nobody. Entries of status
``from memory, unconfirmed`` are recalled from a standard whose text was not read; a finding that
rests on one says so.
"""

from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal
from types import MappingProxyType

from generator.language import joined, numeral, say, say_as

__all__ = [
    "CONVENTION",
    "GROSS_FACTOR",
    "NO_SOURCE",
    "PERCENT",
    "TOLERANCES",
    "UNCONFIRMED",
    "Tolerance",
    "tolerance",
]

NO_SOURCE = say("common practice, no source")
CONVENTION = say_as("status of a tolerance", "convention")
UNCONFIRMED = say("from memory, unconfirmed")

PERCENT = "%"
"""Unit of a tolerance that is a share of the value compared with."""

GROSS_FACTOR = Decimal(3)
"""Beyond so many default tolerances a doubt becomes a contradiction (convention)."""


@dataclass(frozen=True, slots=True)
class Tolerance:
    """One number of this room.

    Parameters
    ----------
    name
        Name by which checks ask for it.
    value
        The number.
    unit
        ``%`` for a share of the value compared with; else the unit it is absolute in, empty for
        a dimensionless one.
    reason
        Why this number.
    source
        Source key and clause, or ``common practice, no source``.
    status
        :data:`CONVENTION` or :data:`UNCONFIRMED`.
    """

    name: str
    value: Decimal
    unit: str
    reason: str
    source: str = NO_SOURCE
    status: str = CONVENTION

    def allowance(self, value: Decimal) -> Decimal:
        """The tolerance in the unit of the value compared with."""
        return abs(value) * self.value / 100 if self.unit == PERCENT else self.value

    @property
    def words(self) -> str:
        """Number and unit as printed."""
        value = numeral(f"{self.value:f}")
        return joined(" ", (value, self.unit)) if self.unit else value


_TWO_LABORATORIES = say("two ordinary laboratory uncertainties, root sum of squares, rounded up")
_S025 = joined(", ", ("cie_s025", say("tolerance intervals of the test conditions")))

_ROWS: tuple[Tolerance, ...] = (
    # two values of one quantity
    Tolerance("luminous_flux_lm", Decimal(6), PERCENT, _TWO_LABORATORIES),
    Tolerance("useful_luminous_flux_lm", Decimal(6), PERCENT, _TWO_LABORATORIES),
    Tolerance("peak_intensity_cd", Decimal(6), PERCENT, _TWO_LABORATORIES),
    Tolerance("efficacy_lm_per_w", Decimal(6), PERCENT, _TWO_LABORATORIES),
    Tolerance("beam_angle_deg", Decimal(10), PERCENT, say("beam edges of lamps are ragged")),
    Tolerance("power_w", Decimal(2), PERCENT, _TWO_LABORATORIES),
    Tolerance("current_a", Decimal(2), PERCENT, _TWO_LABORATORIES),
    Tolerance("voltage_v", Decimal("0.5"), PERCENT, _TWO_LABORATORIES),
    Tolerance("frequency_hz", Decimal("0.5"), PERCENT, _TWO_LABORATORIES),
    Tolerance("power_factor", Decimal("0.02"), "", _TWO_LABORATORIES),
    Tolerance("displacement_factor", Decimal("0.02"), "", _TWO_LABORATORIES),
    Tolerance(
        "thd_current_percent",
        Decimal(5),
        say("percentage points"),
        say("depends on the supply and on the orders counted"),
    ),
    Tolerance("x", Decimal("0.004"), "", _TWO_LABORATORIES),
    Tolerance("y", Decimal("0.004"), "", _TWO_LABORATORIES),
    Tolerance("cct_k", Decimal("2.5"), PERCENT, _TWO_LABORATORIES),
    Tolerance("duv", Decimal("0.003"), "", _TWO_LABORATORIES),
    Tolerance("ra", Decimal("1.5"), "", _TWO_LABORATORIES),
    Tolerance("r9", Decimal(5), "", say("R9 moves about three times as far as Ra")),
    Tolerance(
        "percent_flicker",
        Decimal(5),
        say("percentage points"),
        say("depends on the bandwidth of the recorder and on the supply"),
    ),
    Tolerance("flicker_index", Decimal("0.02"), "", say("as percent flicker")),
    Tolerance("svm", Decimal("0.1"), "", _TWO_LABORATORIES),
    Tolerance("pst_lm", Decimal("0.1"), "", _TWO_LABORATORIES),
    # limits of the possible: how far the two sides may miss one another
    Tolerance(
        "efficacy_above_ler",
        Decimal(0),
        PERCENT,
        say("the numbers then stand as given"),
    ),
    # declarations
    Tolerance(
        "declared_cct_k",
        Decimal("8.5"),
        PERCENT,
        say("no nominal step of the 2008 edition reaches farther from its nominal value"),
        joined(", ", ("ansi_c78_377", say("nominal CCT and tolerance"))),
    ),
    Tolerance(
        "least_units_for_doubt",
        Decimal(3),
        say("units"),
        say("two units on one side of a fair declaration happen once in four"),
    ),
    # modulation
    Tolerance(
        "flicker_frequency_hz",
        Decimal(1),
        PERCENT,
        say("resolution of a record of one second, and drift of the mains"),
    ),
    Tolerance(
        "least_modulation_percent",
        Decimal(1),
        "%",
        say("below it the main frequency is that of the noise"),
    ),
    # conditions
    Tolerance(
        "ambient_set_c", Decimal("25.0"), "°C", say("set value of the standard"), _S025, UNCONFIRMED
    ),
    Tolerance(
        "ambient_temperature_c",
        Decimal("1.2"),
        "°C",
        say("tolerance interval of the standard"),
        _S025,
        UNCONFIRMED,
    ),
    Tolerance(
        "supply_voltage_v",
        Decimal("0.4"),
        PERCENT,
        say("tolerance interval of the standard"),
        _S025,
        UNCONFIRMED,
    ),
    Tolerance(
        "supply_frequency_hz",
        Decimal("0.2"),
        PERCENT,
        say("tolerance interval of the standard"),
        _S025,
        UNCONFIRMED,
    ),
    Tolerance(
        "stabilisation_percent",
        Decimal("0.5"),
        PERCENT,
        say("the standard allows it over 15 min; a shorter record that exceeds it has not settled"),
        _S025,
        UNCONFIRMED,
    ),
    Tolerance("stabilisation_record_s", Decimal(30), "s", say("shorter records show no drift")),
    # dates
    Tolerance(
        "report_before_market_d",
        Decimal(365),
        "d",
        say("testing comes before placing on the market, seldom by more than a year"),
    ),
    # copied data
    Tolerance(
        "identical_quantities",
        Decimal(3),
        "",
        say("fewer agree by chance"),
    ),
    Tolerance(
        "identical_digits",
        Decimal(10),
        "",
        say("that many significant digits in all do not agree by chance"),
    ),
    Tolerance(
        "digits_of_one_value",
        Decimal(3),
        "",
        say("values of fewer significant digits agree by rounding"),
    ),
    Tolerance(
        "same_curve_percent",
        Decimal("0.1"),
        "%",
        say("RMS difference below the noise of two separate measurements, above that of rounding"),
    ),
    Tolerance(
        "near_curve_percent",
        Decimal(1),
        "%",
        say("RMS difference as between units of one batch of emitters"),
    ),
)

TOLERANCES = MappingProxyType({row.name: row for row in _ROWS})


def tolerance(name: str) -> Tolerance:
    """Give one entry of the table.

    Parameters
    ----------
    name
        Name of the entry; for two values of one quantity, the catalogue name of that quantity.

    Returns
    -------
    Tolerance
        The entry.

    Raises
    ------
    KeyError
        If the table has no such entry.
    """
    return TOLERANCES[name]
