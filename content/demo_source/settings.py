"""The text of ``campaign.toml``."""

__all__ = ["CAMPAIGN_TOML"]

CAMPAIGN_TOML = """\
# Demo campaign. Every name, place, lamp and figure in it is invented.
# Made by content/make_demo.py; change it there.

[campaign]
title = "Relamping of three harbour schools"
reference = "AST-2026-07"
client = "Aldermoor Schools Trust (invented)"
purpose = "Comparison of the lamps offered, before the award; no type approval."
language = "en"
assessment_date = 2026-03-02
spectra_unit = "W/nm"

[laboratory]
name = "Tarnfield Photometric Laboratory (invented)"
address = "1 Gauge Lane, Tarnfield (invented)"
accreditation = "invented accreditation T-000"
methods = [
    "2 m integrating sphere with array spectroradiometer, 4 pi geometry, auxiliary lamp correction",
    "near-horizontal goniophotometer, C-gamma planes",
    "photodetector and digitiser: 20 kHz for one second; 2 kHz behind a low-pass for long records",
    "power analyser on a stabilised supply, total harmonic content of the voltage below 1 %",
    "endurance: 150 min on, 30 min off, 25 degrees C ambient",
]

# Place of work and condition of the items are left out: the sheets list what a report lacks.
[report]
number = "TPL-26-030-A1"
title = "Light, power and endurance of lamps offered for three harbour schools"
customer_contact = "Purchasing office of the Trust (invented)"
accreditation_scope = "light, power and spectra; endurance is outside the scope"
received_on = 2025-07-07
tested_from = 2025-07-14
tested_to = 2026-01-23
issued_on = 2026-02-26
sampling = "Units sent by the bidders, taken from stock by them; the laboratory took no samples."
conditions = "Ambient air 25 degrees C within 1 degree, draught-free; lamps aged until stable."
signatory = "Edda Quillfeather (invented)"
signatory_function = "head of photometry"
reproduction_note = "To be copied whole; in part only with written consent of the laboratory."

[[report.methods]]
name = "Luminous flux and spectrum: EN 13032-4, 2 m sphere, 4 pi geometry, auxiliary lamp"
deviations = "tubes of 1500 mm measured with the goniophotometer's flux, spectrum from the sphere"

[[report.methods]]
name = "Intensity: EN 13032-4, near-horizontal goniophotometer, C-gamma planes"

[[report.methods]]
name = "Light modulation: IEC TR 61547-1 and IEC TR 63158, 20 kHz for 1 s, 2 kHz for long records"

[[report.methods]]
name = "Power and harmonics: stabilised supply, total harmonic content of the voltage below 1 %"

[[report.methods]]
name = "Endurance: EU 2019/2020, Annex V, 150 min on, 30 min off"

[[report.equipment]]
name = "Integrating sphere with array spectroradiometer"
serial = "TPL-S2"
calibrated_on = 2025-05-19
calibration_certificate = "C-25-0417"
traceable_to = "the invented national institute of Aldermoor"

[[report.equipment]]
name = "Goniophotometer"
serial = "TPL-G1"
calibrated_on = 2025-06-02
calibration_certificate = "C-25-0463"
traceable_to = "the invented national institute of Aldermoor"

[[report.equipment]]
name = "Power analyser"
serial = "TPL-P3"
calibrated_on = 2025-03-11
calibration_certificate = "C-25-0198"
traceable_to = "the invented national institute of Aldermoor"

[[report.amendments]]
replaces = "TPL-26-030"
issued_on = 2026-02-20
reason = "the name of one model was misspelt; no result changed"

[supply]
voltage_v = 230
frequency_hz = 50

# Expanded uncertainties, k = 2.
[uncertainty]
luminous_flux_lm = "1.5 %"
useful_luminous_flux_lm = "1.8 %"
power_w = "0.4 %"
voltage_v = "0.1 %"
current_a = "0.3 %"
power_factor = 0.005
displacement_factor = 0.005
thd_current_percent = 1.0
standby_power_w = 0.02
networked_standby_power_w = 0.02
beam_angle_deg = 1.0
peak_intensity_cd = "2.5 %"
x = 0.0012
y = 0.0012
cct_k = 40
duv = 0.0008
ra = 0.6
r9 = 2.0
percent_flicker = 0.5
flicker_index = 0.004
svm = 0.03
pst_lm = 0.05
lumen_maintenance_factor = 0.005
wavelength_scale_nm = 0.3
spectral_noise_percent = 0.1
spectral_calibration_percent = 1.5
light_noise_percent = 0.2
light_offset_percent = 0.3
time_base_percent = 0.01
voltage_current_skew_us = 2
angle_deg = 0.3
flux_repeatability_percent = 0.3
chromaticity_repeatability = 0.0003

[decision]
# A guard band as wide as the expanded uncertainty: a value closer to its limit than that is open.
rule = "guarded acceptance"

[[clause]]
id = "ast-efficacy"
title = "Luminous efficacy asked by the Trust"
quantity = "efficacy_lm_per_w"
unit = "lm/W"
comparison = "at least"
value = 100
source = { act = "AST-2026-07", annex = "Specification", point = "3.1" }

[[clause]]
id = "ast-r9"
title = "Saturated red must not be lost"
quantity = "r9"
comparison = "at least"
value = 0
source = { act = "AST-2026-07", annex = "Specification", point = "3.2" }

[[clause]]
id = "ast-flicker"
title = "Modulation of the light in classrooms"
quantity = "percent_flicker"
unit = "%"
comparison = "at most"
value = 10
source = { act = "AST-2026-07", annex = "Specification", point = "3.3" }

# Prices and rates are real: the general rise of prices is left out of all of them. Whatever the
# price of energy does is therefore what it does beyond that.
[use]
hours_per_year = 1800
standby_share_percent = 100
tariff_per_kwh = 0.24
currency = "EUR"
prices = "real"
price_rise_percent = 2.0
discount_rate_percent = 3.0
years = 10
installation_cost_per_lamp = 1.50
replacement_labour_per_lamp = 4.00
end_of_life_cost_per_lamp = 0.10
baseline_lamp = "sundrel-a70-stock"
tariff_uncertainty_percent = 20
price_rise_uncertainty_points = 2
life_uncertainty_percent = 25

[use.location_based]
g_per_kwh = 250
source = "Round figure invented for this demo; take the published one of your grid."
year = 2025
region = "Aldermoor grid (invented)"

[use.market_based]
g_per_kwh = 90
source = "Figure invented for this demo; take the one of the supply contract."
year = 2025
region = "Contract of the Trust (invented)"

[award]
decimals = 2
tie_rule = "lower life-cycle cost"
abnormally_low_percent = 50

[[award.criteria]]
quantity = "life_cycle_cost"
weight_percent = 50
better = "lower"

[[award.criteria]]
quantity = "efficacy_lm_per_w"
weight_percent = 20
better = "higher"
method = "linear"
zero_score_at = 80
full_score_at = 160

[[award.criteria]]
quantity = "r9"
weight_percent = 10
better = "higher"
method = "linear"
zero_score_at = 0
full_score_at = 60

[[award.criteria]]
quantity = "percent_flicker"
weight_percent = 20
better = "lower"
method = "steps"
steps = [{ at = 2, score = 100 }, { at = 5, score = 70 }, { at = 10, score = 40 }]

[tender]
reports_from = 2025-09-01
reports_to = 2026-03-01
minimum_sample_units = 3
mandatory_clauses = ["eu-2019-2020-cri", "eu-2019-2020-svm", "eu-2019-2020-displacement-factor"]
code_names = true
technical_part_closed = true
seed = 20260302
trials = 10000

[[lot]]
id = "lamps"
title = "Lamps with an E27 cap for rooms and corridors"
quantity = 1200
flux_per_point_lm = 750
cap = "E27"
minimum_flux_lm = 750

[[lot]]
id = "tubes"
title = "Tubes of 1500 mm for the sports halls"
quantity = 300
flux_per_point_lm = 2100
compare_at = "equal light"
cap = "G13"
baseline_lamp = "tube-58w"

[[lot]]
id = "spots"
title = "Spotlights with a GU10 cap for the display walls"
quantity = 240
flux_per_point_lm = 300
cap = "GU10"
beam_from_deg = 30
beam_to_deg = 65
baseline_lamp = "halogen-50w"

[[existing_lamp]]
id = "tube-58w"
title = "Fluorescent tube of 58 W with its magnetic ballast"
power_w = 70
luminous_flux_lm = 4800
life_h = 12000
unit_price = 3.20

[[existing_lamp]]
id = "halogen-50w"
title = "Halogen reflector lamp of 50 W"
power_w = 50
luminous_flux_lm = 350
life_h = 2000
unit_price = 1.90

[[room]]
id = "quay-classrooms"
title = "Quay School, classrooms"
lot = "lamps"
points = 480
hours_per_year = 1500
existing_lamp = "sundrel-a70-stock"
relamp_year = 1

[[room]]
id = "quay-corridors"
title = "Quay School, corridors and stairs"
lot = "lamps"
points = 220
hours_per_year = 2600
existing_lamp = "sundrel-a70-stock"
relamp_year = 1

[[room]]
id = "pier-classrooms"
title = "Pier School, classrooms"
lot = "lamps"
points = 500
hours_per_year = 1500
existing_lamp = "sundrel-a70-stock"
relamp_year = 2

[[room]]
id = "pier-hall"
title = "Pier School, sports hall"
lot = "tubes"
points = 300
hours_per_year = 2200
existing_lamp = "tube-58w"
relamp_year = 2

[[room]]
id = "mole-display"
title = "Mole School, display walls"
lot = "spots"
points = 240
hours_per_year = 1200
existing_lamp = "halogen-50w"
relamp_year = 3

[sheet]
theme = "tender"
languages = ["en", "de", "pl"]
"""
