"""A case that loads, and ways to spoil it."""

GOOD = """\
title = "test rig"
[combustor]
layout = "can"
casing_diameter = "440 mm"
casing_length = "1150 mm"
inlet_annulus = { inner = "403 mm", outer = "445 mm" }
exit_annulus = { inner = "430 mm", outer = "520 mm" }
[fuel]
name = "natural-gas"
[[points]]
name = "full"
kind = "rated"
air_flow = "14.2 kg/s"
inlet_pressure = "9.9 bar"
inlet_temperature = "325 degC"
exit_temperature = "1000 degC"
[[points]]
name = "idle"
kind = "idle"
air_flow = "5.35 kg/s"
inlet_pressure = "3.0 bar"
inlet_temperature = "150 degC"
fuel_flow = "0.0507 kg/s"
[targets]
design_point = "full"
pressure_loss = "4.5 %"
"""

HARDWARE = """
[hardware]
liner_length = "900 mm"
zones = { primary_end = "260 mm", secondary_end = "440 mm" }
liner = { diameter = "372 mm" }
[hardware.diffuser]
kind = "dump"
exit_area = "500 cm2"
length = "100 mm"
loss_coefficient = 0.45
[[hardware.annuli]]
outer_diameter = "440 mm"
inner_diameter = "374.4 mm"
[[hardware.walls]]
thickness = "1.2 mm"
[[hardware.openings]]
name = "swirler"
role = "swirler"
[hardware.openings.swirler]
hub_diameter = "50 mm"
tip_diameter = "120 mm"
vane_angle = "45 deg"
vane_count = 12
vane_thickness = "1.2 mm"
[[hardware.openings]]
name = "film 1"
role = "film"
x = "100 mm"
count = 120
diameter = "3 mm"
slot = { height = "2.5 mm", lip_thickness = "1 mm" }
[[hardware.openings]]
name = "primary row"
role = "primary"
x = "200 mm"
count = 8
diameter = "18.1 mm"
[[hardware.openings]]
name = "dilution row"
role = "dilution"
x = "500 mm"
count = 10
diameter = "30 mm"
[[hardware.openings]]
name = "leak"
role = "leak"
x = "900 mm"
effective_area = "180 mm2"
[[hardware.injectors]]
name = "main"
share = 1
openings = ["swirler"]
"""


def swap(text: str, old: str, new: str) -> str:
    """Replace one piece of text that must be there exactly once."""
    assert text.count(old) == 1, (old, text.count(old))
    return text.replace(old, new)


def line_with(text: str, piece: str) -> int:
    """Return the 1-based line that holds ``piece``."""
    return next(n for n, line in enumerate(text.split("\n"), 1) if piece in line)
