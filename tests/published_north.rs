//! Published azimuths and grid bearings, through the whole program.

mod common;

use common::Area;

fn degrees(d: f64, m: f64, s: f64) -> f64 {
    d.signum() * (d.abs() + m / 60.0 + s / 3600.0)
}

/// Source: Geocentric Datum of Australia Technical Manual (Intergovernmental Committee on Surveying and
/// Mapping), worked example Flinders Peak to Buninyong: geodetic azimuths 306°52'05.37" and 127°10'25.07",
/// grid bearings 305°17'01.72" and 125°17'41.86", zone 55.
#[test]
fn flinders_peak_and_buninyong() {
    let flinders = (degrees(144.0, 25.0, 29.52442), degrees(-37.0, 57.0, 3.72030), degrees(306.0, 52.0, 5.37));
    let buninyong = (degrees(143.0, 55.0, 35.38393), degrees(-37.0, 39.0, 10.15611), degrees(127.0, 10.0, 25.07));
    let mut csv = String::from("id,lon,lat,structure,strike,dip\n");
    for (id, (lon, lat, azimuth)) in [("flinders", flinders), ("buninyong", buninyong)] {
        csv += &format!("{id},{lon:.12},{lat:.12},bedding,{azimuth:.12},30\n");
    }
    let area = Area::with(&[("stations.csv", csv.as_str())]);
    area.put(
        "area.toml",
        "[area]\ncrs = \"EPSG:28355\"\n[stations]\nfile = \"stations.csv\"\ncrs = \"EPSG:4283\"\nnorth = \"true\"\n",
    );
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 0, "{}", said.err);
    let summary = area.summary("out");
    let grid = |i: usize| summary["orientations"][i]["rotation_grid"].as_f64().unwrap();
    let arc_second = 1.0 / 3600.0;
    assert!((grid(0) - degrees(305.0, 17.0, 1.72)).abs() < 0.01 * arc_second, "{}", grid(0));
    // The printed figures of the second line close to 0.01" only after rounding of azimuth and bearing both.
    assert!((grid(1) - degrees(125.0, 17.0, 41.86)).abs() < 0.015 * arc_second, "{}", grid(1));
    let ccw = summary["orientations"][0]["rotation_ccw"].as_f64().unwrap();
    assert!((ccw + grid(0) - 360.0).abs() < 1e-9);
}

/// Source: National Oceanic and Atmospheric Administration, WMM2025 test values: 2025.0, height 0, latitude 80,
/// longitude 0: declination 1.28°; latitude 0, longitude 120: -0.16°.
#[test]
fn declination_from_the_model_is_added() {
    let csv = "lon,lat,structure,strike,dip,date\n0,80,bedding,100,30,2025-01-01\n120,0,bedding,100,30,2025-01-01\n120,0,bedding,100,30,1890-01-01\n120,0,bedding,100,30,\n";
    let area = Area::with(&[("stations.csv", csv)]);
    area.put(
        "area.toml",
        "[stations]\nfile = \"stations.csv\"\ncrs = \"EPSG:4326\"\nnorth = \"magnetic\"\ndeclination = \"model\"\n[area]\ncrs = \"EPSG:4326\"\n",
    );
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 0, "{}", said.err);
    let summary = area.summary("out");
    for (row, want) in [(0, 1.28), (1, -0.16)] {
        let reading = &summary["orientations"][row];
        assert!((reading["declination"].as_f64().unwrap() - want).abs() < 0.006, "{reading}");
        assert!((reading["strike"].as_f64().unwrap() - 100.0 - want).abs() < 0.006, "{reading}");
    }
    let refusals = summary["refusals"].as_array().unwrap();
    assert_eq!(refusals.len(), 2, "{refusals:?}");
    assert!(refusals[0].to_string().contains("1890"), "{}", refusals[0]);
}
