#!/usr/bin/env python3
"""Makes the demo area: an invented fold belt cut by two faults and partly hidden by a younger cover.

    python3 generate.py [FOLDER]        (default: the folder of this file)

Needs numpy, pyproj, pyshp and pygeomag; with the versions in README.md the files come out byte for byte.
Nothing here is taken from the program that reads these files: convergence comes from pyproj, declination from
pygeomag (WMM2025), the geometry of the folds from a few lines of vector algebra below.

Frame: unit vectors are (east, north, up) with north the true north. Angles are degrees.
"""

import csv
import datetime
import io
import json
import math
import pathlib
import struct
import sys

import numpy as np
import pyproj
import shapefile
from pygeomag import GeoMag

HERE = pathlib.Path(sys.argv[1] if len(sys.argv) > 1 else pathlib.Path(__file__).parent)
HERE.mkdir(parents=True, exist_ok=True)
RNG = np.random.default_rng(20250612)
MAP, SECOND = "EPSG:32612", "EPSG:32613"
ORIGIN = np.array([616000.0, 6874000.0])  # of the local metres below, in MAP
TO_LONLAT = pyproj.Transformer.from_crs(MAP, "EPSG:4326", always_xy=True)
TO_SECOND = pyproj.Transformer.from_crs(MAP, SECOND, always_xy=True)
MAP_PROJ = pyproj.Proj(MAP)
MODEL = GeoMag(coefficients_file="wmm/WMM_2025.COF")

# ---------------------------------------------------------------- geometry of planes and lines


def vector(trend, plunge):
    return np.array(
        [
            math.cos(math.radians(plunge)) * math.sin(math.radians(trend)),
            math.cos(math.radians(plunge)) * math.cos(math.radians(trend)),
            -math.sin(math.radians(plunge)),
        ]
    )


def trend_plunge(v):
    v = v / np.linalg.norm(v)
    if v[2] > 0:
        v = -v
    return math.degrees(math.atan2(v[0], v[1])) % 360, math.degrees(math.asin(min(1.0, -v[2])))


def strike_dip(normal):
    """Right-hand strike and dip of the plane with this normal (either sense)."""
    n = normal / np.linalg.norm(normal)
    if n[2] < 0:
        n = -n
    direction = math.degrees(math.atan2(n[0], n[1])) % 360  # an upward normal leans down-dip
    return (direction - 90) % 360, math.degrees(math.acos(min(1.0, n[2])))


def rotation(trend, plunge, angle):
    """Right-handed turn by `angle` about the axis pointing down its plunge (clockwise when looking down along it)."""
    a = vector(trend, plunge)
    k = np.array([[0, -a[2], a[1]], [a[2], 0, -a[0]], [-a[1], a[0], 0]])
    return np.eye(3) + math.sin(math.radians(angle)) * k + (1 - math.cos(math.radians(angle))) * k @ k


def scatter(v, degrees):
    """v turned a little: two normal deviates of the given spread in the plane across it."""
    v = v / np.linalg.norm(v)
    p = np.cross(v, [0.0, 0.0, 1.0] if abs(v[2]) < 0.9 else [1.0, 0.0, 0.0])
    p /= np.linalg.norm(p)
    q = np.cross(v, p)
    a, b = RNG.normal(0, math.radians(degrees), 2)
    w = v + a * p + b * q
    return w / np.linalg.norm(w)


# ---------------------------------------------------------------- the invented area (local metres: east, north)

WEST_FAULT = [(2700, -300), (2850, 1200), (3050, 2500), (3000, 4000), (3250, 5400)]  # from south, up to the cover
WEST_HIDDEN = [(3250, 5400), (3350, 6300), (3400, 7300)]
EAST_FAULT = [(7000, -300), (6600, 1300), (6250, 2600), (6150, 3900), (5900, 5600)]
EAST_HIDDEN = [(5900, 5600), (5800, 6400), (5700, 7300)]
COVER_EDGE = [(0, 5250), (1500, 5500), (3250, 5400), (4600, 5750), (5900, 5600), (7600, 5350), (9000, 5500)]


def on_edge(line, north):
    """Where a fault crosses the south edge of the area."""
    (x0, y0), (x1, y1) = line[0], line[1]
    t = (north - y0) / (y1 - y0)
    return (x0 + t * (x1 - x0), north)


WS, ES = on_edge(WEST_FAULT, 0), on_edge(EAST_FAULT, 0)
BLOCKS = {
    "Quernside": [(0, 0), WS, *WEST_FAULT[1:], *COVER_EDGE[1::-1]],
    "Middle Harl": [WS, ES, *EAST_FAULT[1:], COVER_EDGE[3], *WEST_FAULT[:0:-1]],
    "Ostrey": [ES, (9000, 0), (9000, 5500), COVER_EDGE[5], *EAST_FAULT[:0:-1]],
    "Lidmoor cover": [*COVER_EDGE, (9000, 7000), (0, 7000)],
}
OUTLINE = [(0, 0), WS, ES, (9000, 0), (9000, 5500), (9000, 7000), (0, 7000), (0, 5250)]

# Fold belt before the faults: axis 035/12, folds leaning to the south-east. Right limbs dip about 35 to the
# north-west, overturned ones about 80, also to the north-west; the axial planes dip between them.
AXIS = vector(35, 12)
ACROSS = np.cross(AXIS, [0, 0, 1.0])
ACROSS /= np.linalg.norm(ACROSS)  # level, to the south-east
UPWARD = np.cross(ACROSS, AXIS)
MIDDLE, SWING, WAVELENGTH = 32.5, 67.5, 1700.0
# Turns of the blocks after folding: trend and plunge of the turning axis, angle.
TURNS = {"Quernside": (0, 90, 0), "Middle Harl": (200, 76, 26), "Ostrey": (305, 8, 18)}
TURN = {name: rotation(*t) for name, t in TURNS.items()}
AXIAL_POLE = math.cos(math.radians(MIDDLE - 90)) * UPWARD + math.sin(math.radians(MIDDLE - 90)) * ACROSS
JOINT_POLES = {"across the folds": AXIS, "along the folds": ACROSS}
COVER_POLE = -vector(350 + 180, 90 - 7)  # upward pole of a bed that dips 7 to 350


def bed(block, place):
    """Younging direction of the bed at a place."""
    if block == "Lidmoor cover":
        return COVER_POLE
    phase = 2 * math.pi * (place @ ACROSS[:2]) / WAVELENGTH
    theta = MIDDLE + SWING * math.tanh(2.2 * math.sin(phase)) / math.tanh(2.2)
    return TURN[block] @ (math.cos(math.radians(theta)) * UPWARD + math.sin(math.radians(theta)) * ACROSS)


def inside(point, ring):
    x, y = point
    hit = False
    for (x0, y0), (x1, y1) in zip(ring, ring[1:] + ring[:1]):
        if (y0 > y) != (y1 > y) and x < x0 + (y - y0) / (y1 - y0) * (x1 - x0):
            hit = not hit
    return hit


def clearance(point, ring):
    p = np.array(point)
    out = 1e9
    for a, b in zip(ring, ring[1:] + ring[:1]):
        a, b = np.array(a, float), np.array(b, float)
        t = np.clip((p - a) @ (b - a) / ((b - a) @ (b - a)), 0, 1)
        out = min(out, np.linalg.norm(p - a - t * (b - a)))
    return out


def places(block, n):
    ring = [tuple(map(float, p)) for p in BLOCKS[block]]
    xs, ys = zip(*ring)
    out = []
    while len(out) < n:  # never nearer than 60 m to a boundary
        p = (RNG.uniform(min(xs), max(xs)), RNG.uniform(min(ys), max(ys)))
        if inside(p, ring) and clearance(p, ring) > 60 and all(math.hypot(p[0] - q[0], p[1] - q[1]) > 90 for q in out):
            out.append(p)
    return sorted(np.round(np.array(out), 0).tolist(), key=lambda p: (p[1] // 600, p[0]))


# ---------------------------------------------------------------- readings


def lonlat(place):
    return TO_LONLAT.transform(*(ORIGIN + place))


def convergence(place):
    return MAP_PROJ.get_factors(*lonlat(place)).meridian_convergence


def declination(place, date):
    lon, lat = (round(v, 6) for v in lonlat(place))
    y, m, d = map(int, date.split("-"))
    days = (datetime.date(y, m, d) - datetime.date(y, 1, 1)).days
    return MODEL.calculate(glat=lat, glon=lon, alt=0, time=y + days / 365).d


def plane_reading(block, place, structure):
    if structure == "bedding":
        v, spread = bed(block, place), 4.0
    elif structure == "cleavage":
        v, spread = TURN[block] @ AXIAL_POLE, 3.5
    else:
        v, spread = TURN[block] @ JOINT_POLES[structure], 5.0
    v = scatter(v, spread)
    strike, dip = strike_dip(v)
    return strike, dip, "upright" if v[2] > 0 else "overturned"


def line_reading(block, spread):
    return trend_plunge(scatter(TURN[block] @ AXIS, spread))


TRUTH = []  # one entry per good reading


def record(file, row, station, block, place, structure, azimuth, inclination, polarity=""):
    gamma = convergence(place)
    east, north = ORIGIN + place
    TRUTH.append(
        [
            file,
            row,
            station,
            block,
            structure,
            f"{east:.1f}",
            f"{north:.1f}",
            f"{azimuth % 360:.3f}",
            f"{inclination:g}",
            f"{(azimuth - gamma) % 360:.3f}",
            polarity,
        ]
    )


POINTS = ["N", "NE", "E", "SE", "S", "SW", "W", "NW"]


def point_of(azimuth):
    return POINTS[int((azimuth + 22.5) % 360 // 45)]


def mixed(rows, bad):
    """Spreads bad rows evenly among good ones; returns (row, why it is bad or None)."""
    out, step = [], max(1, len(rows) // (len(bad) + 1))
    for i, r in enumerate(rows):
        out.append((r, None))
        if (i + 1) % step == 0 and bad:
            out.append(bad.pop(0))
    return out + bad


BAD, BLUNDERS = {}, []


def north_sheet():
    """readings_magnetic.csv: right-hand strike and dip, compass needle, longitude and latitude."""
    name, rows, k = "readings_magnetic.csv", [], 0
    for block, count in (("Quernside", 62), ("Middle Harl", 52)):
        for place in places(block, count):
            place = np.array(place)
            k += 1
            station = f"Q{k:03d}"
            date = f"2025-{6 + k // 45:02d}-{1 + (k * 7) % 28:02d}"
            for structure in ["bedding"] + (["cleavage"] if RNG.random() < 0.75 else []):
                strike, dip, up = plane_reading(block, place, structure)
                d = declination(place, date)
                read, dip = round(strike - d) % 360, min(90, round(dip))
                if k in (17, 80) and structure == "bedding":  # the far end of the strike was read
                    read = (read + 180) % 360
                    BLUNDERS.append([name, station])
                wayup = up if structure == "bedding" and 0 < dip < 90 and RNG.random() < 0.6 else ""
                quad = point_of(read + 90) if RNG.random() < 0.35 and 5 < dip < 85 else ""
                lon, lat = lonlat(place)
                rows.append(
                    [
                        [station, f"{lon:.6f}", f"{lat:.6f}", date, structure, f"{read:03d}", str(dip), quad, wayup],
                        (station, block, place, structure, read + d, dip, wayup),
                    ]
                )
    rows.append(rows[40])  # a row copied twice: warned of, kept
    t = rows[10][0]

    def bad(**change):
        r = dict(zip(["station", "lon", "lat", "date", "structure", "strike", "dip", "quad", "way_up"], t))
        r.update(quad="", way_up="")
        r.update(change)
        return list(r.values())

    wrong = [
        (bad(station="X01", dip="-9999"), "dip is a code for a missing value"),
        (bad(station="X02", dip="-99"), "dip is a code for a missing value"),
        (bad(station="X03", dip="95"), "dip above 90"),
        (bad(station="X04", dip="-35"), "dip below 0"),
        (bad(station="X05", strike="n/a"), "no strike"),
        (bad(station="X06", strike="21O"), "letter O in the strike"),
        (bad(station="X07", dip="about 40"), "text in the dip"),
        (bad(station="X08", strike="999"), "strike is a code for a missing value"),
        (bad(station="X09", strike="-15"), "strike below 0"),
        (bad(station="X10", lon=t[2], lat=t[1]), "longitude and latitude swapped"),
        (bad(station="X11", lat=""), "no latitude"),
        (bad(station="X12", dip=""), "no dip"),
        (bad(station="X13", strike="", dip="35"), "no strike"),
        (["X14", t[1], t[2], t[3], "bedding", "210"], "row too short"),
        (bad(station="X15") + ["41", "upright"], "row too long"),
        (bad(station="X16", date="2025-13-40"), "not a date"),
        (bad(station="X17", date=""), "no date"),
        (bad(station="X18", strike="045", dip="40", quad="NW"), "dip quadrant contradicts the right-hand strike"),
        (bad(station="X19", strike="200", dip="55", quad="E"), "dip quadrant contradicts the right-hand strike"),
        (bad(station="X20", structure=""), "no structure"),
    ]
    write_csv(name, ["station", "lon", "lat", "date", "structure", "strike", "dip", "dip_quadrant", "way_up"], rows, wrong, ",")


def south_sheet():
    """readings_dipdir.csv: dip direction and dip from true north, another UTM zone, semicolons and decimal commas."""
    name, rows, k = "readings_dipdir.csv", [], 0
    comma = lambda v, n: f"{v:.{n}f}".replace(".", ",")
    for block, count in (("Ostrey", 62), ("Lidmoor cover", 34)):
        for place in places(block, count):
            place = np.array(place)
            k += 1
            station = f"O-{k}"
            kinds = ["bedding"]
            if block == "Ostrey":
                kinds += ["cleavage"] if RNG.random() < 0.65 else []
                kinds += [j for j in JOINT_POLES if RNG.random() < 0.36]
            for kind in kinds:
                strike, dip, up = plane_reading(block, place, kind)
                structure = {"bedding": "S0", "cleavage": "S1"}.get(kind, "Jn")
                direction, dip = round((strike + 90) * 2) / 2 % 360, min(90.0, round(dip * 2) / 2)
                if station in ("O-9", "O-30") and kind == "bedding":  # written down the wrong way round
                    direction = (direction + 180) % 360
                    BLUNDERS.append([name, station])
                wayup = {"upright": "normal", "overturned": "inverted"}[up] if kind == "bedding" and 0 < dip < 90 and RNG.random() < 0.8 else ""
                e, n = TO_SECOND.transform(*(ORIGIN + place))
                full = {"S0": "bedding", "S1": "cleavage", "Jn": "joint"}[structure]
                rows.append(
                    [
                        [station, comma(e, 1), comma(n, 1), structure, comma(direction, 1), comma(dip, 1), wayup],
                        (station, block, place, full, direction - 90, dip, {"normal": "upright", "inverted": "overturned"}.get(wayup, "")),
                    ]
                )
    t = rows[10][0]

    def bad(i, **change):
        r = dict(zip(["station", "easting", "northing", "structure", "dd", "dip", "way_up"], t))
        r.update(station=f"X{i}", way_up="")
        r.update(change)
        return list(r.values())

    wrong = [
        (bad(31, dip="-99,0"), "dip is a code for a missing value"),
        (bad(32, dip="120,0"), "dip above 90"),
        (bad(33, dip="4,5,0"), "two commas in the dip"),
        (bad(34, dip=""), "no dip"),
        (bad(35, dd=""), "no dip direction"),
        (bad(36, dd="725,0"), "dip direction of two turns"),
        (bad(37, dd="-9999"), "dip direction is a code for a missing value"),
        (bad(38, easting="unknown"), "text in the easting"),
        (bad(39, northing=""), "no northing"),
        (["X40", t[1], t[2], "S0"], "row too short"),
        (bad(41, structure=""), "no structure"),
        (bad(42, structure="???"), "not known whether planar or linear"),
        (bad(43, dip="steep"), "text in the dip"),
    ]
    write_csv(name, ["station", "easting", "northing", "structure", "dip_direction", "dip", "way_up"], rows, wrong, ";")


def write_csv(name, header, rows, wrong, separator):
    BAD[name] = []
    text = io.StringIO()
    out = csv.writer(text, delimiter=separator, lineterminator="\n")
    out.writerow(header)
    good = 0
    for line, (row, why) in enumerate(mixed(rows, list(wrong)), start=2):
        if why is None:
            cells, facts = row
            record(name, line, *facts)
            good += 1
        else:
            cells = row
            BAD[name].append({"row": line, "why": why})
        out.writerow(cells)
    (HERE / name).write_bytes(text.getvalue().encode())


def line_sheet():
    """lines_and_joints.shp: trend and plunge, joints as strike and dip in the same columns, grid north of the map CRS."""
    name, rows, k = "lines_and_joints.shp", [], 0
    for block in ("Quernside", "Middle Harl", "Ostrey"):
        for place in places(block, 30):
            place = np.array(place)
            k += 1
            station = f"L{k:03d}"
            g = convergence(place)
            kinds = ["intersection lineation"] + (["fold axis"] if RNG.random() < 0.45 else [])
            if block != "Ostrey":
                kinds += [j for j in JOINT_POLES if RNG.random() < 0.75]
            for kind in kinds:
                if kind in JOINT_POLES:
                    az, inc, _ = plane_reading(block, place, kind)
                else:
                    az, inc = line_reading(block, 4.5 if kind == "fold axis" else 3.5)
                read, inc = round(az - g) % 360, min(90, round(inc))
                structure = "joint" if kind in JOINT_POLES else kind
                rows.append([(place, [station, structure, read, inc]), (station, block, place, structure.replace(" ", "_"), read + g, inc)])
    p = rows[5][0][0]
    wrong = [
        ((p, ["X51", "fold axis", 40, -9]), "plunge is a code for a missing value"),
        ((p, ["X52", "fold axis", 40, 95]), "plunge above 90"),
        ((p, ["X53", "intersection lineation", 40, -12]), "plunge below 0 of a line without a sense"),
        ((p, ["X54", "joint", None, 80]), "no strike"),
        ((p, ["X55", "joint", 999, 80]), "strike is a code for a missing value"),
        ((p, ["X56", "", 120, 30]), "no structure"),
        ((p, ["X57", "sole mark", 120, 30]), "not known whether planar or linear"),
        ((None, ["X58", "joint", 125, 80]), "no position"),
        ((p, ["X59", "joint", 300, None]), "no dip"),
    ]
    BAD[name] = []
    with shapefile.Writer(str(HERE / "lines_and_joints"), shapeType=shapefile.POINT, encoding="utf-8") as w:
        w.field("STATION", "C", 8)
        w.field("STRUCTURE", "C", 24)
        w.field("AZIMUTH", "N", 4, 0)
        w.field("DIP_PLUNGE", "N", 4, 0)
        for fid, (row, why) in enumerate(mixed(rows, list(wrong))):
            if why is None:
                (place, cells), facts = row
                record(name, fid, *facts)
            else:
                place, cells = row
                BAD[name].append({"row": fid, "why": why})
            if place is None:
                w.null()
            else:
                w.point(*map(float, ORIGIN + place))
            w.record(*cells)
    finish_shapefile("lines_and_joints")


def finish_shapefile(stem):
    dbf = HERE / f"{stem}.dbf"
    data = bytearray(dbf.read_bytes())
    data[1:4] = struct.pack("BBB", 125, 9, 1)
    dbf.write_bytes(data)  # the date of the day is no fact
    (HERE / f"{stem}.prj").write_text(pyproj.CRS(MAP).to_wkt("WKT1_ESRI"))
    (HERE / f"{stem}.cpg").write_text("UTF-8")


def maps():
    ring = lambda pts: [[[round(v, 7) for v in lonlat(np.array(p, float))] for p in pts + pts[:1]]]
    feature = lambda geometry, coordinates, **p: {"type": "Feature", "properties": p, "geometry": {"type": geometry, "coordinates": coordinates}}
    collection = lambda features: '{"type": "FeatureCollection", "features": [\n' + ",\n".join(json.dumps(f) for f in features) + "\n]}\n"
    (HERE / "blocks.geojson").write_text(collection([feature("Polygon", ring(list(pts)), name=name) for name, pts in BLOCKS.items()]))
    (HERE / "outline.geojson").write_text(collection([feature("Polygon", ring(OUTLINE), name="invented demo area")]))
    with shapefile.Writer(str(HERE / "faults"), shapeType=shapefile.POLYLINE, encoding="utf-8") as w:
        w.field("NAME", "C", 24)
        w.field("CERTAINTY", "C", 12)
        for name, certainty, pts in (
            ("Harl fault", "certain", WEST_FAULT),
            ("Harl fault", "concealed", WEST_HIDDEN),
            ("Ostrey fault", "certain", EAST_FAULT),
            ("Ostrey fault", "concealed", EAST_HIDDEN),
        ):
            w.line([[list(map(float, ORIGIN + np.array(p, float))) for p in pts]])
            w.record(name, certainty)
    finish_shapefile("faults")


def truth():
    blocks = {}
    for name, turn in TURN.items():
        axis, axial = trend_plunge(turn @ AXIS), strike_dip(turn @ AXIAL_POLE)
        blocks[name] = {
            "fold_axis": {"trend": round(axis[0], 2), "plunge": round(axis[1], 2)},
            "axial_plane": {"strike": round(axial[0], 2), "dip": round(axial[1], 2)},
            "joint_sets": {k: dict(zip(("strike", "dip"), (round(v, 2) for v in strike_dip(turn @ p)))) for k, p in JOINT_POLES.items()},
        }
    s, d = strike_dip(COVER_POLE)
    blocks["Lidmoor cover"] = {"bedding": {"strike": round(s, 2), "dip": round(d, 2)}}
    files = {f: {"good": sum(t[0] == f for t in TRUTH), "bad": len(b), "bad_rows": b} for f, b in BAD.items()}
    corners = [np.array(p, float) for p in ((0, 0), (9000, 7000))]
    facts = {
        "about": "What the invented area was made from. Azimuths from true north. A turn is right-handed about the axis pointing down its plunge and takes Quernside's structures onto the block's.",
        "map_crs": MAP,
        "declination_model": "WMM2025 (pygeomag)",
        "declination": {
            "least": round(min(declination(c, x) for c in corners for x in ("2025-06-01", "2025-08-28")), 3),
            "most": round(max(declination(c, x) for c in corners for x in ("2025-06-01", "2025-08-28")), 3),
        },
        "convergence": {"least": round(min(convergence(c) for c in corners), 3), "most": round(max(convergence(c) for c in corners), 3)},
        "blocks": blocks,
        "turns_from_quernside": {n: dict(zip(("axis_trend", "axis_plunge", "angle"), t)) for n, t in TURNS.items() if t[2]},
        "scatter_degrees": {"bedding": 4.0, "cleavage": 3.5, "joint": 5.0, "intersection_lineation": 3.5, "fold_axis": 4.5},
        "read": sum(f["good"] + f["bad"] for f in files.values()),
        "files": files,
        "blunders_among_the_good": [{"file": f, "station": s} for f, s in BLUNDERS],
    }
    (HERE / "truth.json").write_text(json.dumps(facts, indent=1) + "\n")
    out = io.StringIO()
    w = csv.writer(out, lineterminator="\n")
    w.writerow(["file", "row", "station", "block", "structure", "easting", "northing", "azimuth_true", "inclination", "azimuth_grid", "polarity"])
    w.writerows(TRUTH)
    (HERE / "truth.csv").write_text(out.getvalue())


north_sheet()
south_sheet()
line_sheet()
maps()
truth()
