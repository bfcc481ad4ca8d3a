#!/usr/bin/python3
"""Renders the symbols of an output folder with QGIS and with MapServer and measures which way they point.

    /usr/bin/python3 tests/render/check.py OUT_FOLDER [--pictures FOLDER] [--only qgis|mapserver]

Reads OUT_FOLDER/area.gpkg (layer orientations; QGIS finds its style in there by itself) and, for MapServer,
OUT_FOLDER/styles/orientations_ccw*.sld. Needs Debian's python3-qgis, python3-mapscript, python3-gdal, python3-numpy and
fontconfig.

Every reading in the sample is drawn alone on a 14 mm picture, and its pixels are measured without regard to where on
the picture they are: the long axis of the ink is the strike line or the arrow's shaft; the side to which the ink thins
out across the strike line is the dip side, the end at which it is thick the arrow's head. Dip marks must point along
rotation_grid + 90, arrows along rotation_grid, clockwise from the picture's top, both within 2 degrees. The station
must lie on the symbol's axis within 0.15 mm. Symbols with marks on both sides are left out.
"""

import argparse
import math
import os
import pathlib
import subprocess
import sys

import numpy
from osgeo import gdal, ogr

gdal.UseExceptions()
DOWN_DIP = {"02.15.01", "04.03.02", "06.02", "07.02", "08.02.03", "08.03.02", "planar"}
ALONG = {"09.001", "09.017", "09.097", "linear"}
TOLERANCE = 2.0
MISS_MM = 0.15
PER_SYMBOL = 12
SIDE = 165  # pixels for 14 mm at 300 dpi
DPI = 300


def sample(geopackage):
    """Up to PER_SYMBOL readings of each symbol, spread over all rotations: (fid, symbol, rotation, x, y)."""
    source = ogr.Open(str(geopackage))  # has to outlive its layer
    found = {}
    for feature in source.GetLayerByName("orientations"):
        symbol = feature["symbol"]
        if symbol in DOWN_DIP | ALONG and feature["rotation_grid"] is not None:
            point = feature.GetGeometryRef()
            found.setdefault(symbol, []).append(
                (feature["rotation_grid"], feature.GetFID(), point.GetX(), point.GetY())
            )
    for symbol, readings in sorted(found.items()):
        readings.sort()
        step = max(1, len(readings) / PER_SYMBOL)
        for i in range(min(PER_SYMBOL, len(readings))):
            rotation, fid, x, y = readings[int(i * step)]
            yield fid, symbol, rotation, x, y


def measure(picture, down_dip):
    """(direction in which the symbol points, clockwise from the top; millimetres by which its axis misses the middle)."""
    ink = 255.0 - picture
    if ink.sum() == 0:
        return None, None
    rows, columns = numpy.indices(picture.shape)
    middle = (picture.shape[0] - 1) / 2
    places = numpy.stack([(columns - middle).ravel(), (middle - rows).ravel()])  # right, up
    weights = ink.ravel() / ink.sum()
    centre = places @ weights
    centred = places - centre[:, None]
    _, axes = numpy.linalg.eigh((centred * weights) @ centred.T)  # the long axis comes last
    pointing, across = (axes[:, 0], axes[:, 1]) if down_dip else (axes[:, 1], axes[:, 0])
    skewness = ((pointing @ centred) ** 3) @ weights
    # Across a strike line the thin end of the distribution is the dip mark; along a shaft it is the tail.
    if (skewness > 0) != down_dip:
        pointing = -pointing
    return math.degrees(math.atan2(pointing[0], pointing[1])) % 360, abs(across @ centre) / DPI * 25.4


def grey(path):
    bands = gdal.Open(str(path))
    return numpy.mean([bands.GetRasterBand(i).ReadAsArray() for i in (1, 2, 3)], axis=0)


class Qgis:
    name = "QGIS"

    def __init__(self, folder):
        os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
        from qgis import core
        from qgis.PyQt import QtCore, QtGui

        self.core, self.size, self.colour = core, QtCore.QSize, QtGui.QColor
        self.application = core.QgsApplication([], False)
        self.application.initQgis()
        self.layer = core.QgsVectorLayer(f"{folder / 'area.gpkg'}|layername=orientations", "orientations", "ogr")
        self.close = lambda: None
        assert self.layer.renderer().type() == "categorizedSymbol", "QGIS did not find the layer's style"

    def draw(self, path, extent, width, height, dpi):
        settings = self.core.QgsMapSettings()
        settings.setLayers([self.layer])
        settings.setDestinationCrs(self.layer.crs())
        settings.setOutputSize(self.size(width, height))
        settings.setOutputDpi(dpi)
        settings.setBackgroundColor(self.colour("white"))
        settings.setExtent(self.core.QgsRectangle(*extent))
        job = self.core.QgsMapRendererParallelJob(settings)
        job.start()
        job.waitForFinished()
        assert job.renderedImage().save(str(path))

    def one(self, path, fid, x, y):
        assert self.layer.setSubsetString(f'"fid" = {fid}')
        self.layer.setLabelsEnabled(False)
        self.draw(path, (x - 7, y - 7, x + 7, y + 7), SIDE, SIDE, DPI)

    def all(self, path, extent, width, height):
        self.layer.setSubsetString("")
        self.layer.setLabelsEnabled(True)
        self.draw(path, extent, width, height, 150)


class MapServer:
    name = "MapServer"

    def __init__(self, folder):
        import mapscript

        self.mapscript, self.folder = mapscript, folder
        self.close = self.open(DPI, ["orientations_ccw"])

    def open(self, dpi, styles):
        """One layer per style; returns what to call at the end."""
        layer = """  LAYER
    NAME "{}"
    TYPE POINT
    STATUS ON
    CONNECTIONTYPE OGR
    CONNECTION "{}"
    DATA "orientations"
  END
"""
        fonts = self.folder / "styles" / "check_fonts.txt"
        fonts.write_text("sans " + subprocess.check_output(["fc-match", "-f", "%{file}", "sans"], text=True))
        map_file = self.folder / "styles" / "check.map"  # links in the SLD are relative to the map file's folder
        map_file.write_text(f"""MAP
  NAME "check"
  UNITS METERS
  SIZE 100 100
  EXTENT 0 0 1 1
  IMAGETYPE PNG24
  IMAGECOLOR 255 255 255
  DEFRESOLUTION {25.4 / 0.28}
  RESOLUTION {dpi}
  FONTSET "{fonts.name}"
  WEB
    VALIDATION
      "sld_external_graphic" "^symbols/.*\\.svg$"
    END
  END
""" + "".join(layer.format(style, self.folder / "area.gpkg") for style in styles) + "END\n")
        self.map = self.mapscript.mapObj(str(map_file))
        for style in styles:
            sld = (self.folder / "styles" / f"{style}.sld").read_text()
            assert self.map.getLayerByName(style).applySLD(sld, "orientations") == 0  # success
        return lambda: (map_file.unlink(), fonts.unlink())

    def draw(self, path, extent, width, height, data="orientations"):
        drawing = self.map.clone()  # a map that was drawn does not take other data
        for i in range(drawing.numlayers):
            drawing.getLayer(i).data = data
        drawing.setSize(width, height)
        drawing.setExtent(*extent)
        drawing.draw().save(str(path), drawing)

    def one(self, path, fid, x, y):
        data = f"SELECT * FROM orientations WHERE fid = {fid}"
        half = 7 * (SIDE - 1) / SIDE  # MapServer's extent runs from pixel centre to pixel centre
        self.draw(path, (x - half, y - half, x + half, y + half), SIDE, SIDE, data)

    def all(self, path, extent, width, height):
        self.close = self.open(150, ["orientations_ccw", "orientations_ccw_numbers"])
        self.draw(path, extent, width, height)


def main():
    arguments = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    arguments.add_argument("folder", type=pathlib.Path)
    arguments.add_argument(
        "--pictures", type=pathlib.Path, help="keep a picture of the whole layer from each renderer here"
    )
    arguments.add_argument("--only", choices=["qgis", "mapserver"])
    given = arguments.parse_args()
    folder = given.folder.resolve()
    readings = list(sample(folder / "area.gpkg"))
    assert readings, "no reading has a symbol that can be measured"
    picture = folder / "check.png"
    failures = 0
    for key, renderer in (("qgis", Qgis), ("mapserver", MapServer)):
        if given.only not in (None, key):
            continue
        renderer = renderer(folder)
        worst, misses = {}, [0.0]
        for fid, symbol, rotation, x, y in readings:
            renderer.one(picture, fid, x, y)
            down_dip = symbol in DOWN_DIP
            direction, miss = measure(grey(picture), down_dip)
            wanted = (rotation + (90 if down_dip else 0)) % 360
            if direction is None:
                failures += 1
                print(f"{renderer.name}: fid {fid}, {symbol}: not drawn")
                continue
            error = abs((direction - wanted + 180) % 360 - 180)
            worst[symbol] = max(worst.get(symbol, (0.0, 0.0)), (error, miss))
            misses.append(miss)
            if error > TOLERANCE or miss > MISS_MM:
                failures += 1
                print(
                    f"{renderer.name}: fid {fid}, {symbol}: wanted {wanted:.1f}, drawn {direction:.1f}, {miss:.2f} mm off"
                )
        listed = ", ".join(f"{s} {e:.2f}" for s, (e, _) in worst.items())
        print(
            f"{renderer.name}: {len(readings)} symbols; worst angle by symbol: {listed}; worst place {max(misses):.3f} mm"
        )
        if given.pictures:
            given.pictures.mkdir(parents=True, exist_ok=True)
            source = ogr.Open(str(folder / "area.gpkg"))
            xmin, xmax, ymin, ymax = source.GetLayerByName("orientations").GetExtent()
            margin = 0.05 * max(xmax - xmin, ymax - ymin, 100)
            extent = (xmin - margin, ymin - margin, xmax + margin, ymax + margin)
            scale = 1600 / max(extent[2] - extent[0], extent[3] - extent[1])
            size = [round((extent[2] - extent[0]) * scale), round((extent[3] - extent[1]) * scale)]
            renderer.all(given.pictures / f"{key}.png", extent, *size)
        renderer.close()
    picture.unlink(missing_ok=True)
    pathlib.Path(f"{picture}.aux.xml").unlink(missing_ok=True)
    sys.exit(1 if failures else 0)


if __name__ == "__main__":
    main()
