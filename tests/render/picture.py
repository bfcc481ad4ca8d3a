#!/usr/bin/env python3
"""Draws layers of a GeoPackage as a desktop GIS shows them when the file is opened: with the styles inside it.

    QT_QPA_PLATFORM=offscreen python3 picture.py AREA.gpkg PICTURE.png LAYER[,LAYER…] [WEST,SOUTH,EAST,NORTH]

The first layer is drawn on top. Needs QGIS's Python (Debian's python3-qgis). demo-map/map.png was made with
    picture.py demo-map/out/area.gpkg demo-map/map.png orientations,domains 616800,6876300,622300,6880260
"""
import os
import sys

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
from qgis.core import QgsApplication, QgsMapRendererParallelJob, QgsMapSettings, QgsRectangle, QgsVectorLayer
from qgis.PyQt.QtCore import QSize
from qgis.PyQt.QtGui import QColor

if len(sys.argv) < 4:
    sys.exit(__doc__)
package, picture, names = sys.argv[1:4]
application = QgsApplication([], False)
application.initQgis()
layers = [QgsVectorLayer(f"{package}|layername={name}", name, "ogr") for name in names.split(",")]
for layer in layers:
    if not layer.isValid():
        sys.exit(f"{package} has no layer {layer.name()}")
settings = QgsMapSettings()
settings.setLayers(layers)
settings.setDestinationCrs(layers[0].crs())
settings.setBackgroundColor(QColor("white"))
extent = layers[-1].extent()
extent.scale(1.05)
settings.setExtent(QgsRectangle(*map(float, sys.argv[4].split(","))) if len(sys.argv) > 4 else extent)
settings.setOutputSize(QSize(1500, 1080))
settings.setOutputDpi(130)
job = QgsMapRendererParallelJob(settings)
job.start()
job.waitForFinished()
if not job.renderedImage().save(picture):
    sys.exit(f"cannot write {picture}")
