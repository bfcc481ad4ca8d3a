//! Fabric options of the area file, through the whole program. All data is invented.

mod common;

use common::Area;
use serde_json::Value;
use std::fmt::Write;

const HEAD: &str = "[stations]\nfile = \"s.csv\"\ncrs = \"EPSG:32633\"\nnorth = \"true\"\n";

/// Runs rows of `id,structure,azimuth,dip,polarity` with more lines of the area file; returns the summary.
fn run(rows: &[(String, &str, f64, f64, &str)], more: &str) -> Value {
    let mut csv = String::from("id,x,y,structure,azimuth,dip,polarity,exposure\n");
    for (i, (id, structure, azimuth, dip, polarity)) in rows.iter().enumerate() {
        let exposure = if i % 2 == 0 { "line 000/90" } else { "face 090/90" };
        writeln!(csv, "{id},{},{},{structure},{azimuth},{dip},{polarity},{exposure}", 500_000 + i, 5_400_000 + 7 * i)
            .unwrap();
    }
    let area = Area::with(&[("s.csv", csv.as_str())]);
    area.put("area.toml", format!("{HEAD}[stations.columns]\nazimuth = \"azimuth\"\n{more}"));
    let said = area.homocline(&["run", "area.toml"]);
    assert_eq!(said.code, 0, "{}", said.err);
    area.summary("out")
}

fn ids(n: usize) -> impl Iterator<Item = String> {
    (0..n).map(|i| format!("s{i}"))
}

/// `n` planes about strike/dip, scattered by a few degrees.
fn planes(
    n: usize,
    structure: &'static str,
    strike: f64,
    dip: f64,
    polarity: &'static str,
) -> Vec<(String, &'static str, f64, f64, &'static str)> {
    ids(n)
        .enumerate()
        .map(|(i, id)| {
            let (a, b) = ((i * 7 % 11) as f64 - 5.0, (i * 5 % 9) as f64 - 4.0);
            (format!("{id}{strike}"), structure, (strike + a).rem_euclid(360.0), dip + b, polarity)
        })
        .collect()
}

#[test]
fn exposure_weights_follow_the_dip_on_a_map() {
    // Closed form: on level ground a plane of dip 30 weighs 1/sin 30 = 2, a vertical one 1; of dip 3, 19.1, cut to 10.
    let rows: Vec<_> =
        ids(12).enumerate().map(|(i, id)| (id, "joint", (i * 3) as f64, [30.0, 90.0, 3.0][i % 3], "")).collect();
    let summary = run(&rows, "[fabric]\nterzaghi = \"map\"\n");
    let fabric = &summary["fabrics"][0];
    assert!((fabric["weight_sum"].as_f64().unwrap() - (4.0 * 2.0 + 4.0 + 4.0 * 10.0)).abs() < 1e-9, "{fabric}");
    assert_eq!(fabric["n_clipped"], 4);
    let effective = 52.0 * 52.0 / (4.0 * 4.0 + 4.0 + 4.0 * 100.0);
    assert!((fabric["n_effective"].as_f64().unwrap() - effective).abs() < 1e-9, "{fabric}");
    // Off by default.
    let summary = run(&rows, "");
    assert_eq!((&summary["fabrics"][0]["weight_sum"], &summary["fabrics"][0]["n_clipped"]), (&12.0.into(), &0.into()));
}

#[test]
fn exposure_per_record_and_none_for_lines() {
    let mut rows = planes(10, "joint", 90.0, 60.0, "");
    rows.extend(
        planes(10, "lineation", 10.0, 30.0, "").into_iter().map(|(id, s, a, d, p)| (format!("l{id}"), s, a, d, p)),
    );
    let summary = run(&rows, "exposure = \"exposure\"\n[fabric]\nterzaghi = \"column\"\n");
    let weight = |s: &str| {
        summary["fabrics"].as_array().unwrap().iter().find(|f| f["structure"] == s).unwrap()["weight_sum"]
            .as_f64()
            .unwrap()
    };
    assert!(weight("joint") > 10.5);
    assert_eq!(weight("lineation"), 10.0, "lines have no such bias");
    // A scanline that is not given stops the run.
    let area = Area::with(&[("s.csv", "x,y,structure,strike,dip\n500000,5400000,joint,1,2\n")]);
    area.put("area.toml", format!("{HEAD}[fabric]\nterzaghi = \"scanline\"\n"));
    let said = area.homocline(&["run", "area.toml"]);
    assert!(said.code == 2 && said.err.contains("fabric.scanline"), "{}", said.err);
}

#[test]
fn directed_planes_need_polarity_throughout() {
    let more = "[fabric]\ndirected = [\"bedding\"]\n";
    let known = run(&planes(20, "bedding", 40.0, 30.0, "upright"), more);
    let fabric = &known["fabrics"][0];
    assert_eq!(fabric["directed"], true);
    assert!(fabric["kent_kappa"].as_f64().unwrap() > 0.0, "{fabric}");
    let plunge = fabric["mean_plunge"].as_f64().unwrap();
    assert!(plunge < 0.0, "upright beds face up: {plunge}");
    let mut rows = planes(20, "bedding", 40.0, 30.0, "upright");
    rows[7].4 = "";
    let unknown = run(&rows, more);
    let fabric = &unknown["fabrics"][0];
    assert_eq!((&fabric["directed"], &fabric["kent_kappa"]), (&false.into(), &Value::Null));
    assert!(fabric["note"].as_str().unwrap().contains("1 of 20 readings have no polarity"), "{fabric}");
    assert!(fabric["mean_plunge"].as_f64().unwrap() > 0.0);
}

#[test]
fn directed_lines_may_point_up() {
    let mut rows = planes(12, "slickenline", 100.0, 20.0, "");
    for row in rows.iter_mut().take(3) {
        row.3 = -6.0;
    }
    let summary = run(&rows, "[fabric]\ndirected = [\"slickenline\"]\n");
    let senses: Vec<&str> =
        summary["orientations"].as_array().unwrap().iter().map(|o| o["sense"].as_str().unwrap()).collect();
    assert_eq!(senses.iter().filter(|s| **s == "up").count(), 3, "{senses:?}");
    assert!(summary["orientations"].as_array().unwrap().iter().all(|o| o["plunge"].as_f64().unwrap() >= 0.0));
    assert_eq!(summary["fabrics"][0]["directed"], true);
    // Without the declaration an upward plunge is no reading.
    let summary = run(&rows, "");
    assert_eq!(summary["run"]["counts"]["refused"], 3);
}

#[test]
fn sets_are_found_given_or_left_alone() {
    let mut rows = planes(25, "joint", 30.0, 85.0, "");
    rows.extend(planes(20, "joint", 120.0, 80.0, ""));
    let summary = run(&rows, "");
    let sets = summary["sets"].as_array().unwrap();
    assert_eq!(sets.len(), 2, "{sets:?}");
    assert_eq!((&sets[0]["n"], &sets[1]["n"]), (&25.into(), &20.into()));
    assert!((sets[0]["mean_strike"].as_f64().unwrap() - 30.0).abs() < 3.0);
    assert_eq!(summary["fabrics"][0]["shape"], "multimodal");
    assert!(summary["fabrics"][0]["mean_strike"].is_null());
    let orientations = summary["orientations"].as_array().unwrap();
    assert!(orientations[..25].iter().all(|o| o["set_id"] == 1) && orientations[25..].iter().all(|o| o["set_id"] == 2));
    assert!(run(&rows, "[fabric]\nsets = 0\n")["sets"].as_array().unwrap().is_empty());
    assert_eq!(run(&rows, "[fabric]\nsets = 3\n")["sets"].as_array().unwrap().len(), 3);
    assert!(run(&rows[..25], "")["sets"].as_array().unwrap().is_empty(), "one maximum is no several sets");
}

#[test]
fn bootstrap_cones_are_seeded_and_said() {
    let rows = planes(30, "bedding", 40.0, 50.0, "");
    let cone = |more: &str| {
        let summary = run(&rows, more);
        let fabric = &summary["fabrics"][0];
        (fabric["mean_cone_major"].as_f64().unwrap(), fabric["note"].as_str().unwrap_or("").to_owned())
    };
    let (ellipse, _) = cone("");
    let pivotal = cone("[fabric]\nuncertainty = \"pivotal\"\n");
    assert!(pivotal.1.contains("pivotal bootstrap, 1000 resamples"), "{}", pivotal.1);
    assert_eq!(pivotal, cone("[fabric]\nuncertainty = \"pivotal\"\n"), "one seed, one answer");
    assert_ne!(pivotal.0, cone("[area]\nseed = 2\n[fabric]\nuncertainty = \"pivotal\"\n").0);
    let (percentile, _) = cone("[fabric]\nuncertainty = \"percentile\"\n");
    for other in [pivotal.0, percentile] {
        assert!((0.5..2.0).contains(&(other / ellipse)), "{other} {ellipse}");
    }
}

#[test]
fn readings_of_one_station_are_one_vote() {
    let apart = planes(30, "bedding", 40.0, 50.0, "");
    let mut together = apart.clone();
    for (i, row) in together.iter_mut().enumerate() {
        row.0 = format!("s{}", i / 5);
    }
    let (apart, together) = (run(&apart, ""), run(&together, ""));
    let get = |s: &Value, field: &str| s["fabrics"][0][field].as_f64().unwrap();
    assert_eq!((get(&apart, "n_stations"), get(&together, "n_stations")), (30.0, 6.0));
    assert_eq!(get(&apart, "s1"), get(&together, "s1"), "the readings are described alike");
    assert!(get(&together, "uniformity_p") > get(&apart, "uniformity_p"), "six votes weigh less than thirty");
}

#[test]
fn degenerate_samples_give_nulls_with_reasons() {
    let flat = |n: usize| -> Vec<_> { ids(n).map(|id| (id, "bedding", 0.0, 0.0, "")).collect() };
    let coplanar: Vec<_> = ids(12).enumerate().map(|(i, id)| (id, "joint", 15.0 * i as f64, 90.0, "")).collect();
    for rows in [flat(1), flat(2), flat(9), coplanar] {
        let summary = run(&rows, "");
        let fabric = &summary["fabrics"][0];
        assert!(!fabric["note"].as_str().unwrap_or("").is_empty(), "{fabric}");
        let sum: f64 = ["s1", "s2", "s3"].iter().map(|s| fabric[s].as_f64().unwrap()).sum();
        assert!((sum - 1.0).abs() < 1e-12);
    }
}
