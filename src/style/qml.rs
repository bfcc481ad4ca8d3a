//! Styles for desktop GIS, in QGIS's own form (QML), each complete in itself: the symbols' pictures are inside.
//!
//! Checked against QGIS 3.22. Sizes are millimetres; a field's rotation turns clockwise.

use super::number::{POINTS, distance};
use super::palette::{AREA_COLOURS, AXIS, BLACK, MEAN, Rgb, SET, hex, rgba};
use super::xml::{Element, element};
use crate::station::Kind;
use crate::symbol::{self, ALL, CANVAS_MM, Symbol};
use base64::Engine;
use base64::engine::general_purpose::STANDARD as BASE64;

/// The layers that have a style.
pub const LAYERS: [&str; 5] = ["orientations", "domains", "fabrics", "fold_axes", "sets"];

/// The style of a layer of an output; `None` for a layer that has none.
///
/// `codes` are the symbol codes that occur in the layer: they become the legend, in catalogue order. A code outside the
/// catalogue is drawn, as any other value, as a plain dot.
pub fn qml(layer: &str, codes: &[&str]) -> Option<String> {
    match layer {
        "orientations" => Some(symbols(codes, BLACK, 1.0)),
        "fabrics" => Some(symbols(codes, MEAN, 1.6)),
        "fold_axes" => Some(symbols(codes, AXIS, 1.6)),
        "sets" => Some(symbols(codes, SET, 1.3)),
        "domains" => Some(areas()),
        _ => None,
    }
}

fn document(renderer: Element, labels: Element) -> String {
    element("qgis")
        .with("version", "3.22.0")
        .with("styleCategories", "Symbology|Labeling")
        .with("labelsEnabled", 1)
        .child(renderer)
        .child(element("labeling").with("type", "simple").child(labels))
        .document("")
}

fn option(name: &str, kind: &str, value: impl ToString) -> Element {
    element("Option").with("name", name).with("type", kind).with("value", value)
}

fn map(entries: impl IntoIterator<Item = Element>) -> Element {
    element("Option").with("type", "Map").children(entries)
}

fn named_map(name: &str, entries: impl IntoIterator<Item = Element>) -> Element {
    element("Option").with("name", name).with("type", "Map").children(entries)
}

/// What a property follows instead of a fixed value.
enum Follows {
    Field(&'static str),
    Expression(String),
}

fn follows(container: &'static str, property: &str, source: Follows) -> Element {
    let (key, value, kind) = match source {
        Follows::Field(name) => ("field", name.to_owned(), 2),
        Follows::Expression(text) => ("expression", text, 3),
    };
    let active = option("active", "bool", "true");
    let property = named_map(property, [active, option(key, "QString", value), option("type", "int", kind)]);
    element(container).child(map([
        option("name", "QString", ""),
        named_map("properties", [property]),
        option("type", "QString", "collection"),
    ]))
}

/// A symbol of one layer; `properties` by name.
fn one_layer(name: usize, kind: &str, class: &str, properties: &[(&str, String)], turning: Option<Element>) -> Element {
    let layer = element("layer")
        .with("class", class)
        .with("enabled", 1)
        .with("locked", 0)
        .with("pass", 0)
        .child(map(properties.iter().map(|(name, value)| option(name, "QString", value))))
        .children(turning);
    element("symbol")
        .with("name", name)
        .with("type", kind)
        .with("alpha", 1)
        .with("clip_to_extent", 1)
        .with("force_rhr", 0)
        .child(layer)
}

fn marker(index: usize, symbol: &Symbol, colour: Rgb, scale: f64) -> Element {
    let picture = BASE64.encode(symbol::svg_in(symbol, &hex(colour)));
    let properties = [
        ("name", format!("base64:{picture}")),
        ("size", (CANVAS_MM * scale).to_string()),
        ("size_unit", "MM".into()),
        ("angle", "0".into()),
        ("scale_method", "diameter".into()),
        ("horizontal_anchor_point", "1".into()),
        ("vertical_anchor_point", "1".into()),
    ];
    let turning = symbol.turns().then(|| follows("data_defined_properties", "angle", Follows::Field("rotation_grid")));
    one_layer(index, "marker", "SvgMarker", &properties, turning)
}

fn dot(index: usize, colour: Rgb) -> Element {
    let properties = [
        ("name", "circle".to_owned()),
        ("color", rgba(colour, 255)),
        ("outline_style", "no".into()),
        ("size", "1".into()),
        ("size_unit", "MM".into()),
    ];
    one_layer(index, "marker", "SimpleMarker", &properties, None)
}

fn symbols(codes: &[&str], colour: Rgb, scale: f64) -> String {
    let used: Vec<&Symbol> = ALL.iter().filter(|s| codes.contains(&s.code)).collect();
    let category = |index: usize, value: &str, label: String| {
        element("category")
            .with("symbol", index)
            .with("value", value)
            .with("type", "string")
            .with("label", label)
            .with("render", "true")
    };
    let categories = used.iter().enumerate().map(|(i, s)| category(i, s.code, s.marks.to_owned()));
    let pictures = used.iter().enumerate().map(|(i, s)| marker(i, s, colour, scale));
    let other = used.len();
    let renderer = element("renderer-v2")
        .with("type", "categorizedSymbol")
        .with("attr", "symbol")
        .with("enableorderby", 0)
        .with("symbollevels", 0)
        .with("forceraster", 0)
        // The empty value stands for all others.
        .child(element("categories").children(categories).child(category(other, "", "other".into())))
        .child(element("symbols").children(pictures).child(dot(other, colour)));
    document(renderer, numbers(colour, scale))
}

/// The dip or plunge, upright, beyond the dip mark or the arrow's tip.
fn numbers(colour: Rgb, scale: f64) -> Element {
    let linear: Vec<String> = ALL.iter().filter(|s| s.kind == Kind::Linear).map(|s| format!("'{}'", s.code)).collect();
    // Millimetres to the right and down. A dip mark stands 90 degrees right of the strike.
    let offset = format!(
        "with_variable('line', \"symbol\" IN ({}), with_variable('a', radians(\"rotation_grid\" + if(@line, 0, 90)), \
         with_variable('r', if(@line, {}, {}), to_string(@r * sin(@a)) || ',' || to_string(-@r * cos(@a)))))",
        linear.join(","),
        distance(Kind::Linear) * scale,
        distance(Kind::Planar) * scale,
    );
    element("settings")
        .child(text_style("label", POINTS * scale.sqrt(), colour))
        .child(
            element("placement")
                .with("placement", 1)
                .with("quadOffset", 4)
                .with("offsetType", 0)
                .with("offsetUnits", "MM")
                .with("xOffset", 0)
                .with("yOffset", 0),
        )
        // A map without some of its dips is wrong: every number is drawn, even over another.
        .child(element("rendering").with("displayAll", 1).with("obstacle", 0))
        .child(follows("dd_properties", "OffsetXY", Follows::Expression(offset)))
}

fn text_style(field: &str, points: f64, colour: Rgb) -> Element {
    element("text-style")
        .with("fieldName", field)
        .with("isExpression", 0)
        .with("fontSize", format!("{points:.1}"))
        .with("fontSizeUnit", "Point")
        .with("textColor", rgba(colour, 255))
        .with("textOpacity", 1)
        .child(
            element("text-buffer")
                .with("bufferDraw", 1)
                .with("bufferSize", 0.4)
                .with("bufferSizeUnits", "MM")
                .with("bufferColor", "255,255,255,255")
                .with("bufferOpacity", 0.7),
        )
}

/// Domains: an outline, a translucent colour by their number, their name.
fn areas() -> String {
    let colours: Vec<String> = AREA_COLOURS.iter().map(|&c| format!("'{}'", rgba(c, 70))).collect();
    let colour = format!("array_get(array({}), \"domain_id\" % {})", colours.join(","), AREA_COLOURS.len());
    let properties = [
        ("color", rgba(AREA_COLOURS[0], 70)),
        ("style", "solid".to_owned()),
        ("outline_color", "60,60,60,255".into()),
        ("outline_style", "solid".into()),
        ("outline_width", "0.3".into()),
        ("outline_width_unit", "MM".into()),
        ("joinstyle", "round".into()),
    ];
    let by_number = follows("data_defined_properties", "fillColor", Follows::Expression(colour));
    let fill = one_layer(0, "fill", "SimpleFill", &properties, Some(by_number));
    let renderer = element("renderer-v2")
        .with("type", "singleSymbol")
        .with("enableorderby", 0)
        .with("symbollevels", 0)
        .with("forceraster", 0)
        .child(element("symbols").child(fill));
    let labels = element("settings")
        .child(text_style("domain", 9.0, [60, 60, 60]))
        .child(
            element("placement")
                .with("placement", 1)
                .with("quadOffset", 4)
                .with("centroidInside", 1)
                .with("centroidWhole", 1),
        )
        .child(element("rendering").with("displayAll", 1).with("obstacle", 0));
    document(renderer, labels)
}
