//! The styles: well-formed, complete, and the same as the copies kept in `styles/`.

use base64::Engine;
use homocline::style::{self, AREA_COLOURS, Rgb, Turning};
use homocline::symbol::ALL;
use quick_xml::Reader;
use quick_xml::XmlVersion;
use quick_xml::events::{BytesStart, Event};
use std::collections::BTreeSet;
use std::fs;
use std::path::{Path, PathBuf};

fn name_of(start: &BytesStart<'_>) -> String {
    assert!(start.attributes().all(|a| a.is_ok_and(|a| a.normalized_value(XmlVersion::Implicit1_0).is_ok())));
    start.name().as_ref().to_owned()
}

/// Reads a document to its end, every element closed; the names of its elements.
fn elements(xml: &str) -> Vec<String> {
    let mut reader = Reader::from_str(xml);
    let (mut names, mut open) = (Vec::new(), 0);
    loop {
        match reader.read_event().unwrap_or_else(|e| panic!("not well-formed: {e}\n{xml}")) {
            Event::Start(e) => {
                open += 1;
                names.push(name_of(&e));
            }
            Event::Empty(e) => names.push(name_of(&e)),
            Event::End(_) => open -= 1,
            Event::Eof => break,
            _ => {}
        }
    }
    assert_eq!(open, 0, "an element is not closed\n{xml}");
    names
}

fn count(names: &[String], name: &str) -> usize {
    names.iter().filter(|n| *n == name).count()
}

fn kept() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("styles")
}

fn files_below(folder: &Path, into: &mut BTreeSet<PathBuf>) {
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            files_below(&path, into);
        } else {
            into.insert(path);
        }
    }
}

/// With `HOMOCLINE_WRITE_STYLES=1` in the environment the copies are written instead of compared.
#[test]
fn the_kept_copies_are_what_the_code_makes() {
    let files = style::files();
    if std::env::var_os("HOMOCLINE_WRITE_STYLES").is_some() {
        fs::create_dir_all(kept().join("symbols")).unwrap();
        for (path, text) in &files {
            fs::write(kept().join(path), text).unwrap();
        }
    }
    let mut there = BTreeSet::new();
    files_below(&kept(), &mut there);
    for (path, text) in &files {
        let path = kept().join(path);
        let copy = fs::read_to_string(&path).unwrap_or_default();
        assert!(copy == *text, "{} is out of date: run this test with HOMOCLINE_WRITE_STYLES=1", path.display());
        there.remove(&path);
    }
    assert!(there.is_empty(), "nothing makes {there:?}");
}

#[test]
fn every_file_is_well_formed_and_every_picture_is_there() {
    let files = style::files();
    let names: BTreeSet<&str> = files.iter().map(|(name, _)| name.as_str()).collect();
    assert_eq!(names.len(), files.len());
    for (name, text) in &files {
        elements(text);
        if name.ends_with(".sld") {
            let linked: BTreeSet<&str> =
                text.split("xlink:href=\"").skip(1).map(|rest| rest.split('"').next().unwrap()).collect();
            assert_eq!(linked.len(), if name.contains("numbers") { 0 } else { ALL.len() });
            assert!(linked.iter().all(|l| names.contains(l)), "{name} names a picture that is not written");
        }
    }
}

#[test]
fn slds_turn_what_turns_by_their_own_field() {
    for (turning, field, other) in [
        (Turning::Clockwise, "rotation_grid", "rotation_ccw"),
        (Turning::CounterClockwise, "rotation_ccw", "<Rotation><ogc:PropertyName>rotation_grid"),
    ] {
        let sld = style::sld(turning);
        let compact: String = sld.lines().map(str::trim).collect();
        assert!(!compact.contains(other), "{field}");
        let rules: Vec<&str> = compact.split("<Rule>").skip(1).filter(|r| r.contains("<PointSymbolizer>")).collect();
        for symbol in ALL {
            let own: Vec<_> =
                rules.iter().filter(|r| r.contains(&format!("<ogc:Literal>{}</ogc:Literal>", symbol.code))).collect();
            assert_eq!(own.len(), 1, "{}", symbol.code);
            let rotation = format!("<Rotation><ogc:PropertyName>{field}</ogc:PropertyName></Rotation>");
            assert_eq!(own[0].contains(&rotation), symbol.turns(), "{}", symbol.code);
        }
        let names = elements(&sld);
        for absent in ["uom", "Displacement"] {
            assert!(!sld.split("<Graphic>").skip(1).any(|g| g.split("</Graphic>").next().unwrap().contains(absent)));
        }
        assert_eq!(count(&names, "PointSymbolizer"), ALL.len());
        assert_eq!(count(&names, "TextSymbolizer") > 0, turning == Turning::Clockwise);
    }
}

/// What stands between the first `<name>` and `</name>` after the start of `text`.
fn inside<'a>(text: &'a str, name: &str) -> &'a str {
    text.split(&format!("<{name}>")).nth(1).unwrap().split(&format!("</{name}>")).next().unwrap()
}

#[test]
fn every_azimuth_has_one_rule_for_its_number_and_that_lies_where_the_symbol_points() {
    // The second counts displacements downwards.
    for (sld, up) in [(style::sld(Turning::Clockwise), 1.0), (style::sld_of_numbers(), -1.0)] {
        let compact: String = sld.lines().map(str::trim).collect();
        check_numbers(&compact, up);
    }
}

fn check_numbers(compact: &str, up: f64) {
    let number = |text: &str| text.parse::<f64>().unwrap();
    for (kind, turn) in [("planar", 90.0), ("linear", 0.0)] {
        let mut sectors = Vec::new();
        for rule in
            compact.split("<Rule>").filter(|r| r.contains("<TextSymbolizer>") && inside(r, "ogc:Literal") == kind)
        {
            // A rotated number would stand on its head for half of all strikes.
            assert!(!rule.contains("Rotation"));
            let from = number(inside(inside(rule, "ogc:PropertyIsGreaterThanOrEqualTo"), "ogc:Literal"));
            let to = number(inside(inside(rule, "ogc:PropertyIsLessThan"), "ogc:Literal"));
            let lies =
                number(inside(rule, "DisplacementX")).atan2(up * number(inside(rule, "DisplacementY"))).to_degrees();
            sectors.push((from, to, rule.contains("<ogc:Or>"), lies));
        }
        for tenth in 0..3600 {
            let azimuth = f64::from(tenth) / 10.0;
            let within = |from, to, either| {
                if either { azimuth >= from || azimuth < to } else { azimuth >= from && azimuth < to }
            };
            let fitting: Vec<_> = sectors.iter().filter(|(from, to, either, _)| within(*from, *to, *either)).collect();
            assert_eq!(fitting.len(), 1, "{kind} {azimuth}");
            let off = (fitting[0].3 - azimuth - turn + 540.0).rem_euclid(360.0) - 180.0;
            // Half a sector, and the rounding to pixels.
            assert!(off.abs() < 11.25 + 3.0, "{kind} {azimuth}: number lies {off} off");
        }
    }
}

#[test]
fn qml_holds_the_codes_in_use_and_their_pictures() {
    let codes = ["06.02", "06.01", "09.001", "no such code"];
    let qml = style::qml("orientations", &codes).unwrap();
    let names = elements(&qml);
    assert_eq!(count(&names, "category"), 4); // three and the rest
    assert_eq!(count(&names, "symbol"), 4);
    // 06.01 does not turn, so two angles follow the field.
    assert_eq!(qml.matches(r#"value="rotation_grid""#).count(), 2);
    let pictures: Vec<&str> =
        qml.split("value=\"base64:").skip(1).map(|rest| rest.split('"').next().unwrap()).collect();
    assert_eq!(pictures.len(), 3);
    for picture in pictures {
        let svg = base64::engine::general_purpose::STANDARD.decode(picture).unwrap();
        elements(std::str::from_utf8(&svg).unwrap());
    }
    for layer in style::LAYERS {
        elements(&style::qml(layer, &codes).unwrap());
        elements(&style::qml(layer, &[]).unwrap());
    }
    assert!(style::qml("comparisons", &codes).is_none());
}

/// Rows of the matrices by which Machado, Oliveira and Fernandes (2009) simulate full protanopia and deuteranopia in
/// linear RGB; values from memory.
const DEFICIENCIES: [[[f64; 3]; 3]; 2] = [
    [[0.152286, 1.052583, -0.204868], [0.114503, 0.786281, 0.099216], [-0.003882, -0.048116, 1.051998]],
    [[0.367322, 0.860646, -0.227968], [0.280085, 0.672501, 0.047413], [-0.011820, 0.042940, 0.968881]],
];
const NORMAL: [[f64; 3]; 3] = [[1.0, 0.0, 0.0], [0.0, 1.0, 0.0], [0.0, 0.0, 1.0]];

/// CIE L*a*b* (white D65) of an sRGB colour as seen through a deficiency; formulas of IEC 61966-2-1 and CIE 15.
fn lab(colour: Rgb, seen: &[[f64; 3]; 3]) -> [f64; 3] {
    let linear = colour.map(|c| {
        let c = f64::from(c) / 255.0;
        if c <= 0.04045 { c / 12.92 } else { ((c + 0.055) / 1.055).powf(2.4) }
    });
    let times = |m: &[[f64; 3]; 3], v: [f64; 3]| m.map(|row| row.iter().zip(v).map(|(a, b)| a * b).sum::<f64>());
    let seen = times(seen, linear).map(|c| c.clamp(0.0, 1.0));
    let xyz = times(&[[0.4124, 0.3576, 0.1805], [0.2126, 0.7152, 0.0722], [0.0193, 0.1192, 0.9505]], seen);
    let f = |t: f64| if t > 216.0 / 24389.0 { t.cbrt() } else { (24389.0 / 27.0 * t + 16.0) / 116.0 };
    let (x, y, z) = (f(xyz[0] / 0.9505), f(xyz[1]), f(xyz[2] / 1.089));
    [116.0 * y - 16.0, 500.0 * (x - y), 200.0 * (y - z)]
}

#[test]
fn area_colours_stay_apart_for_eyes_without_red_or_green() {
    for seen in [NORMAL, DEFICIENCIES[0], DEFICIENCIES[1]] {
        for (i, &a) in AREA_COLOURS.iter().enumerate() {
            for &b in &AREA_COLOURS[..i] {
                let (a_lab, b_lab) = (lab(a, &seen), lab(b, &seen));
                let apart = a_lab.iter().zip(b_lab).map(|(p, q)| (p - q).powi(2)).sum::<f64>().sqrt();
                // A difference of 2 to 3 is just seen side by side; 20 is plain across a map.
                assert!(apart > 20.0, "{a:?} and {b:?} are {apart:.1} apart");
            }
        }
    }
}
