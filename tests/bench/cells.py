"""Briefs to measure with, for the markets of `market.py`; everything about them is invented."""

LIDS = """\
title = "Lids"
[scene]
field = ["120 mm", "90 mm"]
above = "4 mm"
below = "1 mm"
feature = "0.4 mm"
[station]
working_distance = ["250 mm", "450 mm"]
"""
"""Plenty fits: entocentric and telecentric lenses. No speed, so that line-scan cameras miss their gate."""

LIDS_IN_FULL = """\
title = "Lids, much asked"
[scene]
field = ["120 mm", "90 mm"]
placement = "3 mm"
above = "4 mm"
below = "1 mm"
feature = "0.4 mm"
max_perspective = "4 %"
[station]
working_distance = ["250 mm", "450 mm"]
working_distance_tolerance = "2 mm"
tilt = "1 deg"
layers = [{ material = "N-BK7", thickness = "6 mm" }]
[motion]
speed = "300 mm/s"
rate = "4 / s"
[light]
illuminance = "40 klx"
reflectance = 0.5
snr = 30
max_exposure = "5 ms"
[choose]
sensor = "any"
mounts = ["C", "CS"]
interfaces = ["GigE Vision", "USB3 Vision"]
cable = "5 m"
max_distortion = "1 %"
max_price = 4000
max_diameter = "65 mm"
"""
"""Most of what can be asked of a part under a camera; some fit."""

LIDS_UNDER_A_GANTRY = LIDS_IN_FULL.replace("working_distance =", 'headroom = "650 mm"\nworking_distance =').replace(
    "max_price", 'max_mass = "900 g"\nmax_price'
)
"""Headroom and mass besides, by which cameras of one sensor differ."""

PLATES = """\
title = "Plates"
[scene]
field = ["120 mm", "90 mm"]
above = "0.2 mm"
feature = "0.06 mm"
[station]
working_distance = ["250 mm", "450 mm"]
"""
"""Nothing fits: no sensor has the pixels."""

PLATES_UNDER_A_GANTRY = PLATES + 'headroom = "650 mm"\n'
"""Nothing fits either."""
