"""Makes the shapefiles of this folder with GDAL (python3-gdal 3.6.2, Debian 12)."""
import os, struct, zipfile
from osgeo import ogr, osr
ogr.UseExceptions()
here = os.path.dirname(os.path.abspath(__file__))
srs = osr.SpatialReference(); srs.ImportFromEPSG(32633)
driver = ogr.GetDriverByName("ESRI Shapefile")

def make(name, kind, fields, rows, encoding):
    path = os.path.join(here, name + ".shp")
    if os.path.exists(path): driver.DeleteDataSource(path)
    source = driver.CreateDataSource(path)
    layer = source.CreateLayer(name, srs, kind, ["ENCODING=" + encoding])
    for field, type_ in fields: layer.CreateField(ogr.FieldDefn(field, type_))
    for wkt, values in rows:
        feature = ogr.Feature(layer.GetLayerDefn())
        if wkt: feature.SetGeometry(ogr.CreateGeometryFromWkt(wkt))
        for i, value in enumerate(values):
            if value is not None: feature.SetField(i, value)
        layer.CreateFeature(feature)
    del layer, source

FIELDS = [("id", ogr.OFTString), ("strike", ogr.OFTInteger), ("dip", ogr.OFTReal), ("date", ogr.OFTDate)]
ROWS = [("POINT Z (430000.5 5210000.25 812)", ["Größe", 45, 30.5, "2024/06/01"]),
        ("POINT Z (430001 5210001 813)", ["Ätna", None, None, None]),
        (None, ["no place", 10, 20, None])]
# As GDAL writes them, with a .cpg.
make("stations_utf8", ogr.wkbPoint25D, FIELDS, ROWS, "UTF-8")
# Without one: the .dbf alone does not say what its bytes mean (its code page byte is cleared too).
make("stations_1252", ogr.wkbPoint25D, FIELDS, ROWS, "CP1252")
os.remove(os.path.join(here, "stations_1252.cpg"))
with open(os.path.join(here, "stations_1252.dbf"), "r+b") as f: f.seek(29); f.write(b"\0")
# A polygon with a hole and one of two parts; the second of three records is then marked as deleted in the .dbf.
make("blocks", ogr.wkbPolygon, [("name", ogr.OFTString)], [
    ("POLYGON ((0 0,9 0,9 9,0 9,0 0),(3 3,6 3,6 6,3 6,3 3))", ["A"]),
    ("POLYGON ((20 0,29 0,29 9,20 0))", ["deleted"]),
    ("MULTIPOLYGON (((40 0,49 0,49 9,40 0)),((60 0,69 0,69 9,60 0)))", ["C"])], "UTF-8")
with open(os.path.join(here, "blocks.dbf"), "r+b") as f:
    header, record = struct.unpack("<HH", f.read(12)[8:12])
    f.seek(header + record); f.write(b"*")
# A shapefile in a zip, as they are sent around.
with zipfile.ZipFile(os.path.join(here, "stations.zip"), "w", zipfile.ZIP_DEFLATED) as z:
    for e in ("shp", "shx", "dbf", "prj", "cpg"):
        info = zipfile.ZipInfo("survey/stations_utf8." + e, (2024, 6, 1, 12, 0, 0)); info.compress_type = zipfile.ZIP_DEFLATED
        z.writestr(info, open(os.path.join(here, "stations_utf8." + e), "rb").read())
