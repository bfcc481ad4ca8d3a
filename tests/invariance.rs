//! The answer does not depend on row order, on how a file is split, or on threads; and when every reading
//! is turned, the answer turns with it. All data is invented.

mod common;

use common::Area;
use serde_json::Value;
use std::fmt::Write;

const HEADER: &str = "id,x,y,structure,strike,dip\n";
const SQUARES: &str = r#"{"type":"FeatureCollection","crs":{"type":"name","properties":{"name":"urn:ogc:def:crs:EPSG::32633"}},"features":[
{"type":"Feature","properties":{"name":"west"},"geometry":{"type":"Polygon","coordinates":[[[499000,5399000],[500500,5399000],[500500,5402000],[499000,5402000],[499000,5399000]]]}},
{"type":"Feature","properties":{"name":"east"},"geometry":{"type":"Polygon","coordinates":[[[500500,5399000],[502000,5399000],[502000,5402000],[500500,5402000],[500500,5399000]]]}}]}"#;

fn area_file(sources: &[&str]) -> String {
    let mut text = String::new();
    for source in sources {
        write!(text, "[[stations]]\nfile = \"{source}\"\ncrs = \"EPSG:32633\"\nnorth = \"true\"\n").unwrap();
    }
    text + "[domains]\npolygons = \"squares.geojson\"\n"
}

/// Rows of two domains with different fabric, turned clockwise by `turn`.
fn rows(turn: f64) -> Vec<String> {
    (0..60)
        .map(|i| {
            let spread = f64::from((i * 37) % 23) - 11.0;
            let (strike, dip) =
                if i % 2 == 0 { (40.0 + spread, 35 + (i * 7) % 11) } else { (130.0 + spread, 60 + (i * 5) % 13) };
            let (x, y) = (500_000 + (i % 2) * 1000 + (i * 13) % 400, 5_400_000 + (i * 29) % 900);
            format!("s{i},{x},{y},bedding,{},{dip}\n", (strike + turn).rem_euclid(360.0))
        })
        .collect()
}

fn fabrics(sources: &[(&str, String)], args: &[&str]) -> Value {
    let area = Area::with(&[("squares.geojson", SQUARES)]);
    for (name, text) in sources {
        area.put(name, text);
    }
    area.put("area.toml", area_file(&sources.iter().map(|s| s.0).collect::<Vec<_>>()));
    let said = area.homocline(&[&["run", "area.toml"], args].concat());
    assert_eq!(said.code, 0, "{}", said.err);
    let mut summary = area.summary("out");
    let fabrics = summary["fabrics"].take();
    assert_eq!(fabrics.as_array().unwrap().len(), 2);
    fabrics
}

#[test]
fn shuffled_split_and_threaded_runs_agree_to_the_last_bit() {
    let rows = rows(0.0);
    let whole = fabrics(&[("a.csv", HEADER.to_owned() + &rows.concat())], &["--threads", "1"]);
    let mut shuffled = rows.clone();
    shuffled.sort_by_key(|r| r.bytes().fold(7_u64, |h, b| h.wrapping_mul(31).wrapping_add(b.into())));
    assert_ne!(rows, shuffled);
    assert_eq!(whole, fabrics(&[("a.csv", HEADER.to_owned() + &shuffled.concat())], &["--threads", "2"]));
    let (first, second) = (HEADER.to_owned() + &rows[..17].concat(), HEADER.to_owned() + &rows[17..].concat());
    assert_eq!(whole, fabrics(&[("a.csv", first), ("b.csv", second)], &[]));
}

#[test]
fn vertical_planes_seen_from_either_side_are_one() {
    let row = |i: i32, flip: bool| {
        format!("s{i},{},{},joint,{},90\n", 500_000 + i, 5_400_000 + i, (20 + i) + if flip { 180 } else { 0 })
    };
    let one: String = (0..12).map(|i| row(i, false)).chain(rows(0.0).into_iter().skip(1).step_by(2)).collect();
    let other: String = (0..12).map(|i| row(i, i % 3 == 0)).chain(rows(0.0).into_iter().skip(1).step_by(2)).collect();
    let (one, other) =
        (fabrics(&[("a.csv", HEADER.to_owned() + &one)], &[]), fabrics(&[("a.csv", HEADER.to_owned() + &other)], &[]));
    for (a, b) in one.as_array().unwrap().iter().zip(other.as_array().unwrap()) {
        for field in ["s1", "s2", "s3", "v1_trend", "v1_plunge", "mean_dip", "mean_cone_major", "uniformity_p"] {
            let (a, b) = (a[field].as_f64().unwrap(), b[field].as_f64().unwrap());
            let apart = if field == "v1_trend" { (a - b + 90.0).rem_euclid(180.0) - 90.0 } else { a - b };
            assert!(apart.abs() < 1e-9, "{field}: {a} {b}");
        }
    }
}

#[test]
fn the_answer_turns_with_the_readings() {
    let still = fabrics(&[("a.csv", HEADER.to_owned() + &rows(0.0).concat())], &[]);
    for turn in [17.0, 90.0, 211.5] {
        let turned = fabrics(&[("a.csv", HEADER.to_owned() + &rows(turn).concat())], &[]);
        for (a, b) in still.as_array().unwrap().iter().zip(turned.as_array().unwrap()) {
            assert_eq!((&a["domain"], &a["shape"], &a["n"]), (&b["domain"], &b["shape"], &b["n"]));
            for field in
                ["s1", "s2", "s3", "mean_dip", "mean_cone_major", "mean_cone_minor", "uniformity_p", "fisher_kappa"]
            {
                let (a, b) = (a[field].as_f64().unwrap(), b[field].as_f64().unwrap());
                assert!((a - b).abs() <= 1e-9 * a.abs().max(1.0), "{field} at {turn}: {a} {b}");
            }
            for field in ["mean_strike", "v1_trend", "rotation_true"] {
                let moved = b[field].as_f64().unwrap() - a[field].as_f64().unwrap();
                assert!(((moved - turn + 180.0).rem_euclid(360.0) - 180.0).abs() < 1e-8, "{field} at {turn}: {moved}");
            }
        }
    }
}

#[test]
fn a_second_run_writes_the_same_bytes() {
    let area = Area::with(&[("squares.geojson", SQUARES)]);
    area.put("a.csv", HEADER.to_owned() + &rows(0.0).concat());
    area.put("area.toml", area_file(&["a.csv"]));
    for out in ["one", "two"] {
        assert_eq!(area.homocline(&["run", "area.toml", "--out", out]).code, 0);
    }
    for file in ["area.gpkg", "styles/orientations.sld"] {
        let read = |out: &str| std::fs::read(area.path(out).join(file)).unwrap();
        assert!(read("one") == read("two"), "{file} differs between two runs");
    }
}
