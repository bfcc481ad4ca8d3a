//! The symbol catalogue against published numbers, and its drawings against what renderers need.

use homocline::orientation::Polarity;
use homocline::station::Kind;
use homocline::symbol::{self, ALL, Anchor, CANVAS_MM, Evidence, Posture, Shape};

/// Type of structure and number of FGDC-STD-013-2006, as the list of types in the USGS repository of the GeMS
/// standard states them (rows whose type one reading decides).
const USGS_TYPE_LIST: [(&str, Kind, f64, Polarity, &str); 13] = [
    ("bedding", Kind::Planar, 0.0, Polarity::Unknown, "06.01"),
    ("bedding", Kind::Planar, 30.0, Polarity::Unknown, "06.02"),
    ("bedding", Kind::Planar, 90.0, Polarity::Unknown, "06.03"),
    ("bedding", Kind::Planar, 30.0, Polarity::Upright, "06.13"),
    ("bedding", Kind::Planar, 30.0, Polarity::Overturned, "06.15"),
    ("cleavage", Kind::Planar, 30.0, Polarity::Unknown, "07.02"),
    ("igneous_foliation", Kind::Planar, 30.0, Polarity::Unknown, "08.02.03"),
    ("foliation", Kind::Planar, 30.0, Polarity::Unknown, "08.03.02"),
    ("joint", Kind::Planar, 30.0, Polarity::Unknown, "04.03.02"),
    ("joint", Kind::Planar, 90.0, Polarity::Unknown, "04.03.03"),
    ("lineation", Kind::Linear, 30.0, Polarity::Unknown, "09.001"),
    ("slickenline", Kind::Linear, 30.0, Polarity::Unknown, "09.017"),
    ("fold_axis", Kind::Linear, 30.0, Polarity::Unknown, "09.097"),
];

#[test]
fn numbers_are_those_of_the_usgs_type_list() {
    for (structure, kind, inclination, polarity, code) in USGS_TYPE_LIST {
        let chosen = symbol::choose(structure, kind, inclination, polarity);
        assert_eq!(chosen.code, code, "{structure} {inclination} {polarity:?}");
        assert_eq!(chosen.evidence, Evidence::Stated, "{code}");
    }
}

#[test]
fn entries_are_sorted_single_and_say_what_they_are() {
    for pair in ALL.windows(2) {
        let own = |i: usize| pair[i].evidence == Evidence::Own;
        assert!(own(1) || pair[0].code < pair[1].code, "{} before {}", pair[0].code, pair[1].code);
        assert!(!own(0) || own(1), "{} stands after the project's own", pair[1].code);
    }
    for s in ALL {
        assert_eq!(ALL.iter().filter(|other| other.code == s.code).count(), 1, "{}", s.code);
        assert_eq!(ALL.iter().filter(|other| other.drawing == s.drawing).count(), 1, "{} has a double", s.code);
        assert!(!s.marks.is_empty() && !s.evidence.sentence().is_empty());
        let number = s.code.starts_with(|c: char| c.is_ascii_digit());
        assert_eq!(number, s.evidence != Evidence::Own, "{}: only the standard's symbols have numbers", s.code);
        // What the entry tells a user is what decides.
        for structure in s.structures {
            assert!(s.chosen_when.contains(structure), "{}: {}", s.code, s.chosen_when);
        }
        let when = match s.posture {
            Posture::Horizontal => "rounds to 0",
            Posture::Inclined => "between horizontal and vertical",
            Posture::Vertical => "rounds to 90",
        };
        assert!(s.chosen_when.contains(when) || s.chosen_when.starts_with("never"), "{}: {}", s.code, s.chosen_when);
    }
}

fn extent(shape: &Shape) -> Vec<(f64, f64)> {
    let box_of = |(x, y): (f64, f64), r: f64| vec![(x - r, y - r), (x + r, y + r)];
    match *shape {
        Shape::Line { points, .. } | Shape::Outline(points) | Shape::Filled(points) => points.to_vec(),
        Shape::HalfCircle { from, to } => {
            box_of(((from.0 + to.0) / 2.0, (from.1 + to.1) / 2.0), (from.0 - to.0).hypot(from.1 - to.1) / 2.0)
        }
        Shape::Ring { centre, diameter } | Shape::Ball { centre, diameter } => box_of(centre, diameter / 2.0),
    }
}

#[test]
fn drawings_fit_their_canvas_when_turned_and_point_the_right_way() {
    for s in ALL {
        let points: Vec<_> = s.drawing.iter().flat_map(extent).collect();
        let reach = points.iter().map(|p| p.0.hypot(p.1)).fold(0.0, f64::max);
        assert!(reach + 0.2 < CANVAS_MM / 2.0, "{} reaches {reach} mm", s.code);
        let sum = |get: fn(&(f64, f64)) -> f64| points.iter().map(get).sum::<f64>();
        match (s.kind, s.posture) {
            // The half circle of overturned beds stands on the up-dip side; the tick still reaches further right.
            (Kind::Planar, Posture::Inclined) => {
                let right = points.iter().map(|p| p.0).fold(0.0, f64::max);
                let left = points.iter().map(|p| -p.0).fold(0.0, f64::max);
                assert!(right > left, "{}: the dip mark is not on the right", s.code);
            }
            (Kind::Linear, Posture::Inclined) => {
                assert_eq!(s.anchor(), Anchor::Tail);
                assert!(sum(|p| p.1) > 0.0 && sum(|p| p.0).abs() < 1e-9, "{} does not point up", s.code);
            }
            // Undirected ones look the same upside down.
            _ => assert!(sum(|p| p.0).abs() < 1e-9 && sum(|p| p.1).abs() < 1e-9, "{}", s.code),
        }
    }
}

#[test]
fn svg_keeps_to_the_subset_renderers_agree_on() {
    for s in ALL {
        let svg = symbol::svg(s);
        assert!(svg.contains(r#"width="1400" height="1400" viewBox="0 0 1400 1400""#), "{svg}");
        for forbidden in ["mm", "style", "class", "<use", "<text", "<g", "transform", "nan", "inf"] {
            assert!(!svg.to_lowercase().contains(forbidden), "{} holds {forbidden}: {svg}", s.code);
        }
        let parts = svg.matches("<path").count() + svg.matches("<circle").count();
        assert_eq!(parts, s.drawing.len());
        assert_eq!(svg.matches(" fill=\"").count(), parts);
        assert_eq!(svg.matches(" stroke=\"").count(), parts);
    }
}

#[test]
fn inclined_bedding_is_drawn_as_measured() {
    // Strike line 5.0 mm, tick 1.0 mm to the right of its middle, stroke 0.20 mm.
    assert_eq!(
        symbol::svg(symbol::by_code("06.02").unwrap()).lines().collect::<Vec<_>>()[1..3],
        [
            r##"  <path d="M 700 950 L 700 450" fill="none" stroke="#000000" stroke-width="20"/>"##,
            r##"  <path d="M 700 700 L 800 700" fill="none" stroke="#000000" stroke-width="20"/>"##,
        ]
    );
}

#[test]
fn what_has_no_azimuth_does_not_turn() {
    let turning = |code: &str| symbol::by_code(code).unwrap().turns();
    for code in ["06.01", "07.01", "04.03.01", "planar_horizontal", "09.007", "linear_vertical"] {
        assert!(!turning(code), "{code}");
    }
    for code in ["06.02", "06.03", "04.03.03", "09.001", "09.005", "planar_vertical"] {
        assert!(turning(code), "{code}");
    }
}
