"""Remarks of the laboratory and the buyer, in Markdown, by the name of the file."""

__all__ = ["REMARKS"]

REMARKS = {
    "campaign": """\
# About this campaign

**Everything here is invented**: the client, the schools, the laboratory and its accreditation,
the bidders, their lamps and every figure. A likeness to a real product is chance.

The Aldermoor Schools Trust wants to replace the lamps of three schools near the harbour.
Seven bidders sent seventeen lamps. Each lamp tells a story that a buyer may meet:

- an honest one, a cheap one that flickers, one that is too green, one that ages too fast;
- claims that are too high, a claim that physics forbids, and figures nobody measured;
- one that sits exactly on its limits, and one that is older than the limits.

The data were computed from simple models of emitters, phosphors, drivers and reflectors, so that
spectra, waveforms, intensities and reported figures of one unit agree with each other.
""",
    "veldrune-a60-940": """\
The **reference of this tender**: ten units, 6000 h of endurance, a light record of 180 s.

| test | units | remark |
|---|---|---|
| sphere, spectrum | 10 | 1 nm steps |
| mains capture | 10 | ten cycles each |
| endurance | 10 | 6000 h, none failed |
""",
    "veldrune-gu10-930": """\
Reflector lamp, measured in 24 C-planes. The declared flux is the *useful* flux in the 90° cone;
the total flux is about a tenth higher.
""",
    "corvath-a60-827": """\
The cheapest offer. The light follows the rectified mains: a pencil waved below it leaves a row of
images. One of ten units went dark before the reading at 2500 h. Units 06 to 10 were only aged.
""",
    "corvath-a65-840": """\
The driver is a capacitive dropper: the current runs far ahead of the voltage. A slow trembling of
the light near 9 Hz can be seen in the record of 180 s.
""",
    "ostrelle-a60-840": """\
Ra is above 80, as printed on the box. *Strong red looks brown all the same*: see R9, which is no
part of Ra.
""",
    "ostrelle-t8-840": """\
A very efficient tube, and a greenish one. The eye is most sensitive to green, so a tint towards
green buys lumens. No endurance data were handed in.
""",
    "ostrelle-par30-830": """\
Declared exactly on a class boundary: 550 lm × 1.176 / 5.88 W = 110 lm/W. The flux is honest, the
declared peak intensity is not.
""",
    "pemmerick-a60-840": """\
Ten units were measured to be sure. All of them are far below the declared 1055 lm, which the
claim "replaces 75 W" rests on.
""",
    "pemmerick-a67-ultra": """\
1521 lm / 4.2 W = **362 lm/W**. Light of this spectrum carries about 323 lm per watt of radiation,
so even a lamp without any loss could not do it. When asked, the bidder explained that 4.2 W is
the power of one of three LED strings.
""",
    "quillmoor-a60-830": """\
Good on the first day. After 3000 h a tenth of the light is gone, the colour has drifted towards
blue, and two of ten units are dark.

<script>document.title = "raw HTML in a remark must not run"</script>
<b onclick="alert('nor must this')">Raw HTML has no effect on the sheet.</b>
""",
    "quillmoor-gu10-827": """\
The bidder sent no test report, and the units arrived too late for spectra, waveforms and
intensities. Flux, power, colour temperature and Ra are ready-made figures.
""",
    "brantivar-a60-link": """\
Connected lamp, measured with its radio off the lamp's power where possible. While it waits for
the network it takes about 0.7 W, all day: more than 6 kWh in a year.
""",
    "brantivar-a60-dim": """\
Dims by pulse-width modulation at 4 kHz, at full load with a duty cycle of one half. That is
beyond the frequencies which SVM covers; the Trust's own limit on percent flicker still catches it.
""",
    "brantivar-ar111-930": """\
For a separate control gear, measured on 12 V direct voltage at the input of the lamp; the loss of
the gear comes on top. The red comes from narrow lines.
""",
    "sundrel-a60-limit": """\
Whatever may be declared on its limit is declared on its limit: power 8.874 W for 806 lm, Ra 80,
SVM 0.4, PstLM 1.0, displacement factor 0.50, standby 0.50 W, survival 0.90.
""",
    "sundrel-t8-840": """\
First placed on the market in November 2023, when SVM up to 0.9 was allowed. Units placed on the
market from 1 September 2024 would have to keep 0.4.
""",
}
