//! A million rows, when asked for: `cargo test --release --test format_scale -- --ignored --nocapture`.

use geo_types::Coord;
use homocline::format::gpkg::{GeometryKind, LayerToWrite, Package, write};
use homocline::format::{Source, read};
use homocline::notice::Silent;
use homocline::table::{Column, Shapes, Table};
use std::fmt::Write as _;
use std::time::Instant;

const ROWS: usize = 1_000_000;

/// Processor time of this process so far, in seconds: other work on the machine does not count.
fn processor_time() -> f64 {
    let stat = std::fs::read_to_string("/proc/self/stat").expect("this measurement needs Linux");
    // Fields 14 and 15 (user, system), in ticks of 1/100 s; the name in field 2 may hold blanks.
    let fields: Vec<&str> = stat.rsplit(')').next().unwrap().split_whitespace().collect();
    (fields[11].parse::<f64>().unwrap() + fields[12].parse::<f64>().unwrap()) / 100.0
}

/// Seconds of processor time that `work` takes.
fn timed<T>(what: &str, work: impl FnOnce() -> T) -> (T, f64) {
    let (start, processor) = (Instant::now(), processor_time());
    let result = work();
    let seconds = processor_time() - processor;
    println!("{what}: {:.2} s, {seconds:.2} s of processor time", start.elapsed().as_secs_f64());
    (result, seconds)
}

#[test]
#[ignore = "takes a release build and half a gigabyte of disk"]
fn a_million_rows_are_read_and_written_within_seconds() {
    let folder = tempfile::tempdir().unwrap();
    let csv = folder.path().join("stations.csv");
    let mut text = String::from("id,x,y,structure,strike,dip,date,geologist,note,unit\n");
    for i in 0..ROWS {
        let (x, y) =
            ((i * 7919 % 120_000) as f64 / 10.0 + 430_000.0, (i * 104_729 % 120_000) as f64 / 10.0 + 5_210_000.0);
        let (strike, dip) = (i % 360, i % 91);
        writeln!(text, "ST{i},{x:.1},{y:.1},bedding,{strike},{dip},2024-06-01,AB,\"grey, laminated\",Js2").unwrap();
    }
    std::fs::write(&csv, &text).unwrap();
    drop(text);
    let source = |path: &std::path::Path| {
        let location = path.to_string_lossy().into_owned();
        Source { path: location.clone(), location, layer: None }
    };
    let (back, reading) = timed("CSV, 10 columns, read", || read(&source(&csv), &Silent).unwrap());
    assert_eq!((back.table.len(), back.table.rows[ROWS - 1]), (ROWS, ROWS as u64 + 1));
    assert!(reading < 1.5, "reading took {reading} s");

    let mut table = Table::new("orientations");
    table.fields = back.table.fields;
    table.shapes = Shapes::Points(
        (0..ROWS)
            .map(|i| Coord {
                x: (i * 7919 % 120_000) as f64 / 10.0 + 430_000.0,
                y: (i * 104_729 % 120_000) as f64 / 10.0,
            })
            .collect(),
    );
    for n in 0..35 {
        let column: Column = match n % 5 {
            0 => (0..ROWS).map(|i| Some((i % 360) as f64 + 0.25)).collect(),
            1 => (0..ROWS).map(|i| Some((i % 91) as i64)).collect(),
            2 => (0..ROWS).map(|i| Some(["bedding", "joint", "cleavage"][i % 3])).collect(),
            3 => (0..ROWS).map(|_| None::<f64>).collect(),
            _ => (0..ROWS).map(|i| Some(i as f64 * 0.001)).collect(),
        };
        table = table.with(&format!("column_{n}"), "", "", column);
    }
    let target = folder.path().join("area.gpkg");
    let package = Package {
        crs: "EPSG:32633".into(),
        layers: vec![LayerToWrite {
            table: &table,
            geometry: GeometryKind::Point,
            title: String::new(),
            description: String::new(),
        }],
        metadata: vec![],
        styles: vec![],
        last_change: "2024-06-01T12:00:00.000Z".into(),
    };
    let ((), writing) =
        timed("GeoPackage, 45 columns, written with its index", || write(&target, &package, &Silent).unwrap());
    println!("{} MiB", std::fs::metadata(&target).unwrap().len() >> 20);
    let db = rusqlite::Connection::open(&target).unwrap();
    let check: String = db.query_row("SELECT rtreecheck('rtree_orientations_geom')", [], |r| r.get(0)).unwrap();
    assert_eq!(check, "ok");
    // 6 to 7 s where nothing else runs; processors shared with other work count up to half as much again.
    assert!(writing < 12.0, "writing took {writing} s");
    let (back, _) = timed("GeoPackage, 45 columns, read", || read(&source(&target), &Silent).unwrap());
    assert_eq!(back.table.len(), ROWS);
}
