//! How the layers look: styles for desktop GIS (QML, stored inside the GeoPackage) and for map servers (SLD), both made
//! from the symbol catalogue.
//!
//! Symbols turn by the field `rotation_grid`, clockwise, as desktop GIS and the SLD standard count it. Some map servers
//! turn the other way; for those there is a second SLD that uses `rotation_ccw`. Both fields hold only for a map
//! drawn in the layer's own CRS. Symbols of what has no azimuth are not turned at all.

mod number;
mod palette;
mod qml;
mod sld;
mod sld_numbers;
mod xml;

pub use palette::{AREA_COLOURS, Rgb};
pub use qml::{LAYERS, qml};
pub use sld::{Turning, sld, sld_of_numbers};

use crate::symbol;

/// Every file of an output's folder `styles/`: path within it, with `/` between parts, and contents.
/// The SLDs name the symbols by relative path, so the files belong together.
pub fn files() -> Vec<(String, String)> {
    let mut files = vec![
        ("orientations.sld".to_owned(), sld(Turning::Clockwise)),
        ("orientations_ccw.sld".to_owned(), sld(Turning::CounterClockwise)),
        ("orientations_ccw_numbers.sld".to_owned(), sld_of_numbers()),
    ];
    files.extend(symbol::ALL.iter().map(|s| (symbol_file(s), symbol::svg(s))));
    files
}

/// Where a symbol's picture lies within the folder `styles/`.
fn symbol_file(symbol: &symbol::Symbol) -> String {
    format!("symbols/{}.svg", symbol.code)
}
