//! Colours of our own, told apart also by eyes that see no red or no green.

/// Red, green, blue, 0 to 255.
pub type Rgb = [u8; 3];

/// Areas, one after another; they step in lightness as well as in hue. A test holds them apart as seen with the common
/// deficiencies of colour vision.
pub const AREA_COLOURS: [Rgb; 6] =
    [[38, 70, 140], [240, 190, 60], [120, 45, 90], [95, 185, 215], [200, 95, 35], [205, 215, 190]];
/// Single readings.
pub(super) const BLACK: Rgb = [0, 0, 0];
/// Domain means.
pub(super) const MEAN: Rgb = [160, 25, 60];
/// Fold axes.
pub(super) const AXIS: Rgb = [15, 90, 120];
/// Orientation sets.
pub(super) const SET: Rgb = [100, 70, 150];

/// As SVG writes it.
pub(super) fn hex([r, g, b]: Rgb) -> String {
    format!("#{r:02x}{g:02x}{b:02x}")
}

/// As QML writes it, with opacity 0 to 255.
pub(super) fn rgba([r, g, b]: Rgb, opacity: u8) -> String {
    format!("{r},{g},{b},{opacity}")
}
