"""The same area in geopandas: read, join points to polygons, eigenvalues per polygon and structure, write.

    peer_geopandas.py STATIONS.csv POLYGONS.geojson OUT.gpkg
"""
import sys

import geopandas as gpd
import numpy as np
import pandas as pd

stations, polygons, out = sys.argv[1:4]
table = pd.read_csv(stations)
blocks = gpd.read_file(polygons, engine="pyogrio")
points = gpd.GeoDataFrame(table, geometry=gpd.points_from_xy(table.x, table.y), crs=blocks.crs)
joined = gpd.sjoin(points, blocks, how="left", predicate="intersects")
joined = joined[~joined.index.duplicated()].drop(columns="index_right")

# Upward poles to planes: east, north, up.
direction, dip = np.radians(joined.strike.to_numpy() + 90.0), np.radians(joined.dip.to_numpy())
pole = np.column_stack([np.sin(direction) * np.sin(dip), np.cos(direction) * np.sin(dip), np.cos(dip)])
groups = joined.groupby(["name", "structure"]).ngroup().fillna(-1).to_numpy(int)
inside = groups >= 0
count = np.bincount(groups[inside])
tensor = np.empty((len(count), 3, 3))
for a in range(3):
    for b in range(a, 3):
        tensor[:, a, b] = tensor[:, b, a] = np.bincount(groups[inside], (pole[:, a] * pole[:, b])[inside]) / count
values, vectors = np.linalg.eigh(tensor)
keys = joined[inside].groupby(["name", "structure"]).size().index
mean = vectors[:, :, 2] * np.where(vectors[:, 2, 2] < 0, -1, 1)[:, None]
fabrics = pd.DataFrame(
    {
        "name": keys.get_level_values(0),
        "structure": keys.get_level_values(1),
        "n": count,
        "s1": values[:, 2],
        "s2": values[:, 1],
        "s3": values[:, 0],
        "dip": np.degrees(np.arccos(np.clip(mean[:, 2], -1, 1))),
        "strike": (np.degrees(np.arctan2(mean[:, 0], mean[:, 1])) - 90) % 360,
    }
)
joined.to_file(out, layer="stations", driver="GPKG", engine="pyogrio")
blocks.merge(fabrics, on="name").to_file(out, layer="fabrics", driver="GPKG", engine="pyogrio")
