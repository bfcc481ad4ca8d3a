#!/usr/bin/env python3
"""Times one area of a million stations, side by side with general-purpose tools, in one run on one machine.

    cargo build --release && tests/bench/bench.py [--stations N] [--polygons K] [--repeat R] [--work FOLDER]

Jobs, each its own process, taken in turn R times:
  homocline run      the whole job: read, orient, assign to polygons, statistics with confidence limits, symbols, write
  ogr2ogr            CSV to GeoPackage and nothing else, without and with spatial index: the floor for reading and writing
  geopandas          read, point-in-polygon join, eigenvalues per polygon and structure, write with spatial index
Prints median wall time, processor time and peak memory, and checks that every output holds every station.
Needs Python 3.9, ogr2ogr (gdal-bin) and, for the last job, a package index to install geopandas from.
"""
import argparse, os, random, shutil, sqlite3, statistics, subprocess, sys, time, venv
from pathlib import Path

HERE = Path(__file__).resolve().parent
EAST, NORTH, SIDE = 430_000.0, 5_210_000.0, 12_000.0  # metres, EPSG:32633


def make_stations(path, count):
    """Stations in a square, the attitude varying smoothly over it with scatter; half a dozen in a thousand lie outside."""
    rng = random.Random(1)
    units, people = ["Js2", "Kc1", "Tr", "Pz"], ["AB", "CD", "EF"]
    with open(path, "w", newline="") as out:
        out.write("id,x,y,structure,strike,dip,date,geologist,unit,note\n")
        lines = []
        for i in range(1, count + 1):
            u, v = rng.random() * 1.003, rng.random() * 1.003
            strike = (40 + 90 * u + rng.gauss(0, 12)) % 360
            dip = abs(35 + 30 * v + rng.gauss(0, 9))
            if dip > 90:
                dip, strike = 180 - dip, (strike + 180) % 360
            structure = "bedding" if i % 10 < 7 else "foliation" if i % 10 < 9 else "joint"
            note = '"grey, laminated"' if i % 5 == 0 else ""
            lines.append(
                f"S{i},{EAST + u * SIDE:.1f},{NORTH + v * SIDE:.1f},{structure},{int(strike)},{int(dip)},"
                f"2024-06-{1 + i % 30:02d},{people[i % 3]},{units[i % 4]},{note}\n"
            )
            if len(lines) == 50_000:
                out.writelines(lines)
                lines.clear()
        out.writelines(lines)


def make_polygons(path, count):
    """A mesh of quadrangles with shared, shaken corners."""
    rng = random.Random(2)
    rows = max(n for n in range(1, int(count**0.5) + 1) if count % n == 0)
    columns = count // rows
    corner = {}
    for i in range(columns + 1):
        for j in range(rows + 1):
            inner_x, inner_y = 0 < i < columns, 0 < j < rows
            x = (i + (rng.uniform(-0.3, 0.3) if inner_x else 0)) / columns
            y = (j + (rng.uniform(-0.3, 0.3) if inner_y else 0)) / rows
            corner[i, j] = [round(EAST + SIDE * x, 2), round(NORTH + SIDE * y, 2)]
    with open(path, "w") as out:
        out.write('{"type":"FeatureCollection","name":"blocks","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::32633"}},"features":[\n')
        features = []
        for i in range(columns):
            for j in range(rows):
                ring = [corner[c] for c in ((i, j), (i + 1, j), (i + 1, j + 1), (i, j + 1), (i, j))]
                name = f"B{len(features) + 1:03d}"
                features.append(f'{{"type":"Feature","properties":{{"name":"{name}"}},"geometry":{{"type":"Polygon","coordinates":[{ring}]}}}}')
        out.write(",\n".join(features) + "\n]}\n")


def make_area(path):
    path.write_text(
        """[area]
name = "A million stations"
crs  = "EPSG:32633"

[stations]
file = "stations.csv"
crs  = "EPSG:32633"
north = "true"
notation = "right-hand"

[stations.columns]
id = "id"
x = "x"
y = "y"
structure = "structure"
azimuth = "strike"
dip = "dip"
date = "date"

[domains]
method = "polygons"
polygons = "blocks.geojson"
name = "name"
"""
    )


def run(command, log):
    """Runs a command; wall seconds, processor seconds, peak MiB."""
    with open(log, "ab") as out:
        start = time.perf_counter()
        child = subprocess.Popen([str(c) for c in command], stdout=out, stderr=out)
        _, status, usage = os.wait4(child.pid, 0)
        wall = time.perf_counter() - start
        child.returncode = os.waitstatus_to_exitcode(status)
    if child.returncode:
        sys.exit(f"{command[0]} ended with {child.returncode}; see {log}")
    return wall, usage.ru_utime + usage.ru_stime, usage.ru_maxrss / 1024


def rows_in(path, table):
    with sqlite3.connect(path) as db:
        return db.execute(f'SELECT count(*) FROM "{table}"').fetchone()[0]


def peers_python(work):
    """An environment of its own with geopandas."""
    python = work / "venv" / "bin" / "python"
    if not python.exists():
        venv.create(work / "venv", with_pip=True)
    subprocess.run([python, "-m", "pip", "install", "-q", "geopandas", "pyogrio"], check=True)
    return python


def main():
    options = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    options.add_argument("--stations", type=int, default=1_000_000)
    options.add_argument("--polygons", type=int, default=200)
    options.add_argument("--repeat", type=int, default=3)
    options.add_argument("--work", type=Path, default=HERE.parents[1] / "target" / "bench")
    options.add_argument("--homocline", type=Path, default=HERE.parents[1] / "target" / "release" / "homocline")
    options.add_argument("--only", nargs="+", metavar="JOB", help="homocline, ogr2ogr, geopandas")
    args = options.parse_args()
    wanted = args.only or ["homocline", "ogr2ogr", "geopandas"]
    work = args.work.resolve()
    work.mkdir(parents=True, exist_ok=True)
    csv, blocks, area, log = work / "stations.csv", work / "blocks.geojson", work / "area.toml", work / "log.txt"
    log.unlink(missing_ok=True)
    make_stations(csv, args.stations)
    make_polygons(blocks, args.polygons)
    make_area(area)

    jobs = []  # name, command, output, layer that holds every station
    if "homocline" in wanted:
        out = work / "out"
        command = [args.homocline, "run", area, "--out", out, "--quiet"]
        jobs.append(("homocline run (the whole job)", command, out / "area.gpkg", "orientations"))
    if "ogr2ogr" in wanted:
        for index in ("NO", "YES"):
            out = work / f"ogr2ogr_{index}.gpkg"
            command = ["ogr2ogr", "-f", "GPKG", out, csv, "-oo", "X_POSSIBLE_NAMES=x", "-oo", "Y_POSSIBLE_NAMES=y",
                       "-oo", "AUTODETECT_TYPE=YES", "-a_srs", "EPSG:32633", "-nln", "stations", "-lco", f"SPATIAL_INDEX={index}"]
            name = "ogr2ogr, " + ("with" if index == "YES" else "without") + " spatial index"
            jobs.append((name, command, out, "stations"))
    if "geopandas" in wanted:
        out = work / "geopandas.gpkg"
        command = [peers_python(work), HERE / "peer_geopandas.py", csv, blocks, out]
        jobs.append(("geopandas, join and eigenvalues", command, out, "stations"))

    taken = {name: [] for name, *_ in jobs}
    for _ in range(args.repeat):
        for name, command, out, layer in jobs:
            if out.parent == work:
                out.unlink(missing_ok=True)
            else:
                shutil.rmtree(out.parent, ignore_errors=True)
            taken[name].append(run(command, log))
            found = rows_in(out, layer)
            if found != args.stations:
                sys.exit(f"{name}: {found} rows, not {args.stations}")

    print(f"{args.stations:,} stations, {args.polygons} polygons, median of {args.repeat}, {os.cpu_count()} processors\n")
    print(f"{'job':<36}{'wall s':>9}{'cpu s':>9}{'peak MiB':>10}{'output MiB':>12}")
    for name, _, out, _ in jobs:
        wall, cpu, peak = (statistics.median(column) for column in zip(*taken[name]))
        print(f"{name:<36}{wall:>9.2f}{cpu:>9.2f}{peak:>10.0f}{out.stat().st_size / 2**20:>12.0f}")


if __name__ == "__main__":
    main()
