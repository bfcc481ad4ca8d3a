//! The map CRS when nobody gave one. UTM: zones 6 degrees wide from 180 W, north and south of the equator, from
//! 80 S to 84 N, then UPS (DMA Technical Manual 8358.2).

use crate::support::{at, bedding};
use homocline::crs::{CrsError, default_map_crs};
use homocline::station::North;

fn chosen(positions: &[(f64, f64)]) -> Result<String, CrsError> {
    let positions = positions.iter().map(|&(x, y)| at(x, y)).collect();
    let (crs, notice) = default_map_crs(&[bedding("EPSG:4326", North::True, positions)])?;
    assert_eq!(notice.code, "map-crs-chosen");
    assert!(notice.message.contains(crs.name()), "{}", notice.message);
    Ok(crs.code_or_wkt().to_owned())
}

#[test]
fn utm_zone_of_the_middle() {
    for (positions, code) in [
        (vec![(-3.7, 40.4)], "EPSG:32630"),
        (vec![(-3.7, -40.4)], "EPSG:32730"),
        (vec![(11.0, 47.0), (13.5, 47.0)], "EPSG:32633"),
        (vec![(0.0, 0.0)], "EPSG:32631"),
        (vec![(180.0, 10.0)], "EPSG:32601"),
        (vec![(-180.0, 10.0)], "EPSG:32601"),
        (vec![(179.999, 10.0)], "EPSG:32660"),
        // Either side of the date line: the middle is there, not at longitude 0.
        (vec![(179.0, -17.0), (-178.0, -17.0)], "EPSG:32701"),
        (vec![(179.0, -17.0), (-179.9, -17.0)], "EPSG:32760"),
        (vec![(20.0, 85.0)], "EPSG:32661"),
        (vec![(0.0, 85.0), (90.0, 85.0), (180.0, 85.0), (-90.0, 85.0)], "EPSG:32661"),
        (vec![(20.0, -81.0)], "EPSG:32761"),
        (vec![(20.0, 83.0)], "EPSG:32634"),
        // An impossible latitude does not count.
        (vec![(-3.7, 40.4), (10.0, 120.0)], "EPSG:32630"),
    ] {
        assert_eq!(chosen(&positions).unwrap(), code, "{positions:?}");
    }
}

#[test]
fn a_projected_source_decides() {
    let geographic = bedding("EPSG:4326", North::True, vec![at(15.0, 50.0)]);
    let grid = bedding("EPSG:2193", North::True, vec![at(1_600_000.0, 5_000_000.0)]);
    let reversed = bedding("EPSG:2053", North::True, vec![at(0.0, 2_900_000.0)]);
    let code = |sources: &[_]| default_map_crs(sources).unwrap().0.code_or_wkt().to_owned();
    assert_eq!(code(std::slice::from_ref(&grid)), "EPSG:2193");
    assert_eq!(code(&[geographic, grid.clone()]), "EPSG:2193");
    // Axes to the west and south carry no map: Lo29 lies in zones 35 and 36 south.
    assert_eq!(code(&[reversed]), "EPSG:32735");
}

#[test]
fn no_middle_no_map() {
    assert_eq!(chosen(&[]).unwrap_err(), CrsError::NoCentroid);
    assert_eq!(chosen(&[(f64::NAN, 1.0)]).unwrap_err(), CrsError::NoCentroid);
    assert_eq!(chosen(&[(0.0, 0.0), (180.0, 0.0)]).unwrap_err(), CrsError::NoZone);
    let error = default_map_crs(&[bedding("nonsense", North::True, vec![])]).unwrap_err();
    assert_eq!(error.source_name(), Some("stations.csv"));
    assert!(error.hint().is_some());
}
