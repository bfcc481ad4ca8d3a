//! Domains and carried columns through the whole program. All data is invented.

mod common;

use common::{AREA, Area, STATIONS};
use serde_json::Value;
use std::fmt::Write;

/// A GeoJSON file of named rings in EPSG:32633.
fn polygons(rings: &[(&str, &str)]) -> String {
    let features: Vec<String> = rings
        .iter()
        .map(|(name, ring)| {
            format!(r#"{{"type":"Feature","properties":{{"name":{name}}},"geometry":{{"type":"Polygon","coordinates":[{ring}]}}}}"#)
        })
        .collect();
    format!(
        r#"{{"type":"FeatureCollection","crs":{{"type":"name","properties":{{"name":"urn:ogc:def:crs:EPSG::32633"}}}},"features":[{}]}}"#,
        features.join(",")
    )
}

fn square(x: f64, y: f64, side: f64) -> String {
    format!("[[{x},{y}],[{0},{y}],[{0},{1}],[{x},{1}],[{x},{y}]]", x + side, y + side)
}

fn run(area: &Area) -> (Value, String) {
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 0, "{}", said.err);
    (area.summary("out"), said.err)
}

#[test]
fn stations_outside_join_within_reach_or_none() {
    let area = Area::with(&[
        ("stations.csv", STATIONS),
        ("p.geojson", &polygons(&[("\"west\"", &square(500_000.0, 5_400_000.0, 350.0))])),
    ]);
    for (nearest, inside) in [(0, 3), (51, 4), (10_000, 6)] {
        area.put("area.toml", format!("{AREA}[domains]\npolygons = \"p.geojson\"\nnearest_m = {nearest}\n"));
        let (summary, _) = run(&area);
        assert_eq!(summary["domains"][0]["n_orientations"], inside, "nearest_m = {nearest}");
        assert_eq!(summary["orientations"].as_array().unwrap().len(), 6, "stations outside stay in the output");
        assert_eq!(summary["domains"][0]["area_m2"], 350.0 * 350.0);
    }
}

#[test]
fn an_outline_bounds_a_single_domain() {
    let area = Area::with(&[
        ("stations.csv", STATIONS),
        ("o.geojson", &polygons(&[("\"o\"", &square(500_000.0, 5_400_000.0, 350.0))])),
    ]);
    area.put("area.toml", format!("{AREA}[domains]\nmethod = \"single\"\noutline = \"o.geojson\"\n"));
    let (summary, err) = run(&area);
    assert_eq!(
        (&summary["domains"][0]["n_orientations"], &summary["domains"][0]["method"]),
        (&3.into(), &"single".into())
    );
    assert!(err.contains("3 of 6 readings lie outside"), "{err}");
    area.put("area.toml", AREA);
    assert_eq!(run(&area).0["domains"][0]["n_orientations"], 6);
}

#[test]
fn areas_and_reach_are_ground_metres_on_a_stretched_map() {
    let area = Area::with(&[
        ("stations.csv", STATIONS),
        ("p.geojson", &polygons(&[("\"west\"", &square(500_000.0, 5_400_000.0, 350.0))])),
    ]);
    area.put(
        "area.toml",
        format!("[area]\ncrs = \"EPSG:3857\"\n{AREA}[domains]\npolygons = \"p.geojson\"\nnearest_m = 51\n"),
    );
    let (summary, err) = run(&area);
    let measured = summary["domains"][0]["area_m2"].as_f64().unwrap();
    assert!((measured / (350.0 * 350.0) - 1.0).abs() < 0.005, "{measured}");
    assert_eq!(summary["domains"][0]["n_orientations"], 4);
    assert!(err.contains("times as long as the ground"), "{err}");
    area.put(
        "area.toml",
        format!("[area]\ncrs = \"EPSG:4326\"\n{AREA}[domains]\npolygons = \"p.geojson\"\nnearest_m = 51\n"),
    );
    let said = area.homocline(&["run", "area.toml"]);
    assert!(said.code == 2 && said.err.contains("nearest_m"), "degrees are no metres: {}", said.err);
}

#[test]
fn odd_features_are_left_out_or_named() {
    let line = r#"{"type":"Feature","properties":{"name":"l"},"geometry":{"type":"LineString","coordinates":[[500000,5400000],[500100,5400100]]}}"#;
    let two = polygons(&[
        ("null", &square(500_000.0, 5_400_000.0, 350.0)),
        ("\"domain 1\"", &square(500_350.0, 5_400_000.0, 400.0)),
    ]);
    let mixed = two.replace("\"features\":[", &format!("\"features\":[{line},"));
    let area = Area::with(&[("stations.csv", STATIONS), ("p.geojson", &mixed)]);
    area.put("area.toml", format!("{AREA}[domains]\npolygons = \"p.geojson\"\nname = \"name\"\n"));
    let (summary, err) = run(&area);
    let names: Vec<&str> =
        summary["domains"].as_array().unwrap().iter().map(|d| d["domain"].as_str().unwrap()).collect();
    assert_eq!(names, ["unnamed 1", "domain 1"]);
    assert!(err.contains("a line is no domain") && err.contains("without a name: 1"), "{err}");
}

/// A check of every edge against every other would take minutes on this ring.
#[test]
fn a_ring_of_a_hundred_thousand_vertices_is_no_trouble() {
    let mut ring = String::from("[");
    for i in 0..=100_000 {
        let a = f64::from(i % 100_000) / 100_000.0 * std::f64::consts::TAU;
        let r = 400.0 + 30.0 * (40.0 * a).sin();
        write!(ring, "{}[{},{}]", if i > 0 { "," } else { "" }, 500_350.0 + r * a.cos(), 5_400_225.0 + r * a.sin())
            .unwrap();
    }
    ring.push(']');
    let area = Area::with(&[("stations.csv", STATIONS), ("p.geojson", &polygons(&[("\"round\"", &ring)]))]);
    area.put("area.toml", format!("{AREA}[domains]\npolygons = \"p.geojson\"\n"));
    assert_eq!(run(&area).0["domains"][0]["n_orientations"], 6);
}

#[test]
fn columns_that_differ_by_case_alone_are_all_carried() {
    let text = "id,x,y,structure,strike,dip,FID,fid,Note,note\n1,500000,5400000,bedding,45,30,A,B,E,F\n";
    let area = Area::with(&[("area.toml", AREA), ("stations.csv", text)]);
    let (summary, _) = run(&area);
    let reading = summary["orientations"][0].as_object().unwrap();
    let values: Vec<&str> = reading.values().filter_map(Value::as_str).collect();
    for value in ["A", "B", "E", "F"] {
        assert!(values.contains(&value), "{value} is lost: {reading:?}");
    }
}

#[test]
fn files_from_the_command_line_keep_the_area_files_settings() {
    let area = Area::with(&[("one.csv", STATIONS), ("two.csv", STATIONS)]);
    area.put("area.toml", "[stations]\nfile = \"one.csv\"\ncrs = \"EPSG:32633\"\nnorth = \"magnetic\"\ndeclination = 10\nnotation = \"dip-direction\"\n[stations.columns]\nazimuth = \"strike\"\n");
    let said = area.homocline(&["run", "area.toml", "--stations", "two.csv"]);
    assert_eq!(said.code, 0, "{}", said.err);
    let reading = &area.summary("out")["orientations"][0];
    assert_eq!((&reading["source"], &reading["dip_direction"]), (&"two.csv".into(), &20.0.into()));
}

#[test]
fn when_every_row_is_refused_they_are_listed() {
    let area = Area::with(&[
        ("area.toml", AREA),
        (
            "stations.csv",
            "id,x,y,structure,strike,dip\na,500000,5400000,bedding,10,95\nb,500000,5400000,bedding,10,abc\n",
        ),
    ]);
    for command in ["run", "check"] {
        let said = area.homocline(&[command, "area.toml"]);
        assert_eq!(said.code, 2);
        assert_eq!(
            said.err.lines().filter(|l| l.starts_with("refused: stations.csv, row ")).count(),
            2,
            "{}",
            said.err
        );
        assert!(said.err.contains("all 2 rows were refused"), "{}", said.err);
    }
    assert!(area.nothing_in("out"));
}

#[test]
fn a_station_as_wide_as_a_map_is_said() {
    let text = STATIONS.replace("\nb,", "\na,").replace("\nf,", "\na,");
    let area = Area::with(&[("area.toml", AREA), ("stations.csv", &text)]);
    let (_, err) = run(&area);
    assert!(err.contains("more than 250 m apart: 1, the widest \"a\" with 559 m"), "{err}");
}

#[test]
fn wrong_types_name_their_line_and_what_belongs_there() {
    let area = Area::with(&[("stations.csv", STATIONS)]);
    for (line, words) in [
        ("north = 1", &["line 3", "text"][..]),
        ("columns = { id = 3 }", &["line 3", "text"]),
        ("declination = [1]", &["line 3", "a number or a text"]),
    ] {
        area.put("area.toml", format!("[stations]\nfile = \"stations.csv\"\n{line}\n"));
        let said = area.homocline(&["run", "area.toml"]);
        assert_eq!(said.code, 2);
        for word in words {
            assert!(said.err.contains(word), "{line}: {}", said.err);
        }
        assert!(!said.err.contains("untagged"), "{}", said.err);
    }
    let said = area.homocline(&["run", "stations.csv"]);
    assert!(said.err.contains("--stations stations.csv"), "{}", said.err);
}
