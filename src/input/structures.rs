//! From the source's words for structures to names and kinds.

use super::InputFault;
use super::choose::{Columns, StructureSource};
use super::names::NEAR_ENOUGH;
use super::spec::StationSpec;
use super::value::{Value, normal, value, written};
use crate::notice::{Notice, Place};
use crate::orientation::notation::overturned_in;
use crate::station::{Kind, STRUCTURES, Structure, kind_of};
use crate::table::{Column, Table, WordColumn};
use rayon::prelude::*;
use std::collections::{BTreeMap, BTreeSet, HashMap};

/// Most structures of one source; they are counted in 16 bits.
const MOST: usize = 20_000;

/// What one spelling stands for. Both kinds are set where each row's own columns must tell.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub(super) struct Resolved {
    pub planar: Option<u16>,
    pub linear: Option<u16>,
    /// The words say overturned.
    pub overturned: bool,
    /// Lines of this structure carry a sense.
    pub directed: bool,
}

/// The structures of a source.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Structures {
    pub list: Vec<Structure>,
    by_spelling: HashMap<String, Resolved>,
    constant: Option<Resolved>,
    column: Option<usize>,
    /// A column of code numbers, as text.
    codes: Option<Column>,
    /// Why a spelling has no kind, and what to do about it.
    unknown: HashMap<String, Unknown>,
}

impl Structures {
    /// The spelling of a row.
    pub fn spelling<'a>(&'a self, table: &'a Table, row: usize) -> Option<&'a str> {
        let column = self.codes.as_ref().or_else(|| self.column.map(|i| &table.fields[i].column))?;
        match value(column, row) {
            Value::Text(text) => Some(text),
            _ => None,
        }
    }
    /// The one structure of all rows, where the user gave it.
    pub fn constant(&self) -> Option<Resolved> {
        self.constant
    }
    /// What a spelling stands for.
    pub fn get(&self, spelling: &str) -> Resolved {
        self.by_spelling.get(spelling).copied().unwrap_or_default()
    }
    /// Why a spelling has no kind, and what to do about it.
    pub fn unknown(&self, spelling: &str) -> Unknown {
        self.unknown.get(spelling).cloned().unwrap_or_default()
    }
    /// The column, for messages.
    pub fn column(&self) -> Option<usize> {
        self.column
    }
}

/// Word by word, and as a whole, what obviously names one of our structures.
const SYNONYMS: [(&str, &[&str]); 14] = [
    (
        "bedding",
        &[
            "s0",
            "bedding",
            "beddings",
            "beds",
            "bed",
            "strata",
            "stratum",
            "stratification",
            "schichtung",
            "bdg",
            "stratificazione",
        ],
    ),
    ("foliation", &["foliation", "foliations", "fol", "schistosity", "gneissosity", "gneissicfoliation", "foliacion"]),
    ("cleavage", &["cleavage", "cleavages", "clv", "clvg"]),
    ("igneous_foliation", &["igneousfoliation", "magmaticfoliation", "flowfoliation", "flowbanding"]),
    ("joint", &["joint", "joints", "jointing", "jnt", "jt", "kluft", "klueftung", "diaclase", "diaclasa"]),
    ("fault", &["fault", "faults", "faultplane", "flt", "faille", "falla", "faglia"]),
    ("vein", &["vein", "veins", "veining"]),
    ("dike", &["dike", "dikes", "dyke", "dykes"]),
    ("contact", &["contact", "contacts", "geologicalcontact", "lithologicalcontact"]),
    ("axial_plane", &["axialplane", "axialplanes", "axialsurface", "foldaxialplane", "foldaxialsurface"]),
    ("lineation", &["lineation", "lineations", "lin", "lineacion"]),
    ("fold_axis", &["foldaxis", "foldaxes", "foldhinge", "hingeline", "foldhingeline", "faltenachse"]),
    ("slickenline", &["slickenline", "slickenlines", "striae", "striation", "striations", "slickenstriae"]),
    ("intersection_lineation", &["intersectionlineation", "intersectionlineations"]),
];

fn synonym(word: &str) -> Option<&'static str> {
    SYNONYMS.iter().find(|(_, words)| words.contains(&word)).map(|(name, _)| *name)
}

/// One of the structures of the contract by its own name, whatever its case and punctuation.
fn own(name: &str) -> Option<&'static str> {
    let name = normal(name);
    STRUCTURES.iter().map(|(own, _)| *own).find(|own| normal(own) == name)
}

/// What a description obviously names: exactly one structure among its words, and none that speaks of something
/// else (a fault's displacement has no attitude; a trace is a line on the map).
fn described(text: &str) -> Option<&'static str> {
    if let Some(name) = synonym(&normal(text)) {
        return Some(name);
    }
    let lower = text.to_lowercase();
    let words: Vec<&str> = lower.split(|c: char| !c.is_alphanumeric()).filter(|w| !w.is_empty()).collect();
    let any = |list: &[&str]| words.iter().any(|w| list.contains(w));
    if any(&["displacement", "movement", "motion", "throw", "trace", "unknown", "no", "other", "or"]) {
        return None;
    }
    let pair = |a: &[&str], b: &[&str]| any(a) && any(b);
    if pair(&["intersection"], &["lineation", "lineations"]) {
        return Some("intersection_lineation");
    }
    if pair(&["axial"], &["plane", "planes", "surface", "planar"]) {
        return if any(&["cleavage", "foliation"]) { None } else { Some("axial_plane") };
    }
    if pair(&["fold"], &["axis", "axes", "hinge"])
        || pair(&["plunge"], &["fold", "anticline", "syncline", "antiform", "synform"])
    {
        return Some("fold_axis");
    }
    if any(&["striae", "striation", "striations", "slickenline", "slickenlines"]) {
        return Some("slickenline");
    }
    if pair(&["igneous", "magmatic", "flow"], &["foliation"]) {
        return Some("igneous_foliation");
    }
    let named: BTreeSet<&str> = words.iter().filter_map(|w| synonym(w)).collect();
    match named.len() {
        1 => named.into_iter().next(),
        _ => None,
    }
}

/// S1, S2, L1, ...: generations keep their own names; the letter says the kind. F is fold here and fault there.
fn generation(text: &str) -> Option<Kind> {
    match text.trim().as_bytes() {
        [b's' | b'S', b'1'..=b'9'] => Some(Kind::Planar),
        [b'l' | b'L', b'1'..=b'9'] => Some(Kind::Linear),
        _ => None,
    }
}

/// Where [structures] has this spelling: the key there, and the name it gives.
fn mapped<'a>(spec: &'a StationSpec, spelling: &str) -> Option<(&'a String, &'a String)> {
    let folded = || spec.structures.iter().find(|(k, _)| k.trim().to_lowercase() == spelling.to_lowercase());
    spec.structures.get_key_value(spelling).or_else(folded)
}

/// A name and, where known, a kind; and whether that was a guess.
fn meaning(spec: &StationSpec, spelling: &str) -> (String, Option<Kind>, bool) {
    let kind = |name: &str| {
        kind_of(name)
            .or_else(|| spec.kinds.get(name).copied())
            .or_else(|| spec.kinds.iter().find(|(k, _)| k.to_lowercase() == name.to_lowercase()).map(|(_, v)| *v))
    };
    if let Some((_, target)) = mapped(spec, spelling) {
        let name = own(target).map_or_else(|| target.trim().to_owned(), str::to_owned);
        let kind = kind(&name).or_else(|| generation(&name));
        return (name, kind, false);
    }
    if let Some(name) = own(spelling) {
        return (name.to_owned(), kind_of(name), false);
    }
    if let Some(kind) = kind(spelling) {
        return (spelling.to_owned(), Some(kind), false);
    }
    if let Some(name) = described(spelling) {
        return (name.to_owned(), kind_of(name), true);
    }
    (spelling.to_owned(), generation(spelling), true)
}

/// Which kind a structure of unknown kind has, from the columns there are.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Fallback {
    Planar,
    Linear,
    /// Trend and strike have columns of their own: the row tells.
    ByRow,
    Unknown,
}

fn fallback(columns: &Columns, lines_too: bool) -> Fallback {
    let plane = columns.strike_by_name || columns.dip_direction.is_some() || columns.quadrant.is_some();
    // Lines are often entered as "dip direction" and "dip"; nobody gives a line a strike.
    let strike = columns.strike_by_name || columns.quadrant.is_some();
    match (columns.trend.is_some(), columns.strike.is_some() || columns.dip_direction.is_some()) {
        (true, false) => Fallback::Linear,
        (true, true) if plane => Fallback::ByRow,
        // Where known lines share the columns, the columns tell nothing.
        (false, true) if strike && !lines_too => Fallback::Planar,
        _ => Fallback::Unknown,
    }
}

fn distinct(table: &Table, column: &Column) -> BTreeSet<String> {
    const CHUNK: usize = 1 << 16;
    let rows = table.len();
    (0..rows.div_ceil(CHUNK))
        .into_par_iter()
        .map(|chunk| {
            let mut seen: BTreeSet<&str> = BTreeSet::new();
            let mut last = "";
            for row in chunk * CHUNK..rows.min((chunk + 1) * CHUNK) {
                if let Value::Text(text) = value(column, row)
                    && text != last
                {
                    seen.insert(text);
                    last = text;
                    if seen.len() > MOST {
                        break;
                    }
                }
            }
            seen.into_iter().map(str::to_owned).collect::<BTreeSet<String>>()
        })
        .reduce(BTreeSet::new, |mut a, b| {
            a.extend(b);
            a
        })
}

/// Settles every spelling of the source.
pub(super) fn resolve(
    table: &Table,
    spec: &StationSpec,
    columns: &Columns,
    notices: &mut Vec<Notice>,
) -> Result<Structures, InputFault> {
    let mut out = Structures {
        list: Vec::new(),
        by_spelling: HashMap::new(),
        constant: None,
        column: None,
        codes: None,
        unknown: HashMap::new(),
    };
    let spellings = match &columns.structure {
        StructureSource::Value(value) => BTreeSet::from([value.trim().to_owned()]),
        StructureSource::Column(i) => {
            out.column = Some(*i);
            let column = &table.fields[*i].column;
            if !matches!(column, Column::Text(_) | Column::Word(_) | Column::Date(_)) {
                let mut words = WordColumn::default();
                (0..table.len()).for_each(|row| words.push(written(column, row).as_deref()));
                out.codes = Some(Column::Word(words));
            }
            let found = distinct(table, out.codes.as_ref().unwrap_or(column));
            if found.len() > MOST {
                return Err(InputFault::TooManyStructures { column: table.fields[*i].name.clone(), most: MOST });
            }
            found
        }
    };
    let meant: BTreeMap<String, (String, Option<Kind>, bool)> =
        spellings.into_iter().map(|s| (s.clone(), meaning(spec, &s))).collect();
    let lines_too = meant.values().any(|(_, kind, _)| *kind == Some(Kind::Linear));
    let fallback = fallback(columns, lines_too);
    let kinds = |kind: Option<Kind>| match (kind, fallback) {
        (Some(kind), _) => (kind == Kind::Planar, kind == Kind::Linear),
        (None, Fallback::Planar) => (true, false),
        (None, Fallback::Linear) => (false, true),
        (None, Fallback::ByRow) => (true, true),
        (None, Fallback::Unknown) => (false, false),
    };
    let mut list = BTreeSet::new();
    for (name, kind, _) in meant.values() {
        let (planar, linear) = kinds(*kind);
        for (yes, kind) in [(planar, Kind::Planar), (linear, Kind::Linear)] {
            if yes {
                list.insert(Structure { name: name.clone(), kind });
            }
        }
    }
    out.list = list.into_iter().collect();
    let place = || match out.column {
        Some(i) => Place::file(&spec.file).in_column(&table.fields[i].name),
        None => Place::file(&spec.file),
    };
    for (spelling, (name, kind, guessed)) in &meant {
        let (planar, linear) = kinds(*kind);
        let index = |yes: bool, kind: Kind| {
            let i = out.list.iter().position(|s| s.name == *name && s.kind == kind).filter(|_| yes)?;
            u16::try_from(i).ok()
        };
        let directed = spec.directed.contains(name);
        let overturned = columns.polarity.is_none() && overturned_in(spelling);
        let resolved =
            Resolved { planar: index(planar, Kind::Planar), linear: index(linear, Kind::Linear), overturned, directed };
        match kind {
            Some(kind) => notices.extend(told(spelling, name, *kind, *guessed, overturned, place())),
            None => {
                let unknown = unknown(spec, spelling);
                notices.extend(assumed(&unknown, fallback, place()));
                out.unknown.insert(spelling.clone(), unknown);
            }
        }
        if out.column.is_some() {
            out.by_spelling.insert(spelling.clone(), resolved);
        } else {
            out.constant = Some(resolved);
        }
    }
    if out.column.is_some() {
        notices.extend(unmet(spec, meant.keys(), place()));
    }
    Ok(out)
}

/// Entries of [structures] that no row has: perhaps misspelt, perhaps another source's.
fn unmet<'a>(spec: &StationSpec, spellings: impl Iterator<Item = &'a String>, place: Place) -> Option<Notice> {
    let met: BTreeSet<&String> = spellings.filter_map(|s| mapped(spec, s)).map(|(key, _)| key).collect();
    let unmet: Vec<String> = spec.structures.keys().filter(|k| !met.contains(k)).map(|k| format!("{k:?}")).collect();
    (!unmet.is_empty()).then(|| {
        let text = format!("no row has what [structures] names: {}", unmet.join(", "));
        Notice::info("structure-unmet", place, text)
    })
}

/// A name whose kind nobody says.
#[derive(Debug, Clone, PartialEq, Eq, Default)]
pub(super) struct Unknown {
    /// That it is unknown, in words.
    pub what: String,
    /// What the user can write.
    pub advice: String,
}

fn unknown(spec: &StationSpec, spelling: &str) -> Unknown {
    let told = mapped(spec, spelling).map(|(_, target)| target.as_str());
    let name = told.unwrap_or(spelling);
    let known = STRUCTURES.iter().map(|(name, _)| *name).chain(spec.kinds.keys().map(String::as_str));
    let nearest = known
        .map(|k| (strsim::jaro_winkler(&name.to_lowercase(), &k.to_lowercase()), k))
        .filter(|(likeness, _)| *likeness >= NEAR_ENOUGH)
        .max_by(|a, b| a.0.total_cmp(&b.0).then(b.1.cmp(a.1)));
    let what = match told {
        Some(_) => format!("{name:?} is no structure known here ([structures] says it for {spelling:?})"),
        None => format!("{name:?} is no structure known here"),
    };
    let meant = nearest.map_or(String::new(), |(_, nearest)| format!("did you mean {nearest:?}? Else "));
    let own = name.trim().to_lowercase().split_whitespace().collect::<Vec<_>>().join("_");
    let advice = format!(
        "{meant}write under [structures]: {spelling:?} = {{ name = {own:?}, kind = \"planar\" }} (or kind = \"linear\")"
    );
    Unknown { what, advice }
}

/// The notice of what was made of a known spelling, where it was not plain.
fn told(spelling: &str, name: &str, kind: Kind, guessed: bool, overturned: bool, place: Place) -> Option<Notice> {
    (guessed || overturned).then(|| {
        let also = if overturned { ", overturned" } else { "" };
        let text = format!("{spelling:?} was read as {name} ({}){also}", kind.word());
        let hint = format!("say {spelling:?} = \"...\" under [structures] to change it");
        Notice::info("structure-guessed", place, text).hint(hint)
    })
}

/// The notice of an unknown name whose kind the columns told.
fn assumed(unknown: &Unknown, from: Fallback, place: Place) -> Option<Notice> {
    let kind = match from {
        Fallback::Planar => "planar",
        Fallback::Linear => "linear",
        Fallback::ByRow => "planar or linear by the columns filled in each row",
        Fallback::Unknown => return None,
    };
    let text = format!("{}; it was kept under its own name as {kind}", unknown.what);
    Some(Notice::warning("structure-kind-assumed", place, text).hint(unknown.advice.as_str()))
}

#[cfg(test)]
mod tests {
    use super::*;

    // Common practice, no source.
    #[test]
    fn descriptions_name_one_structure_or_none() {
        for (text, want) in [
            ("S0", Some("bedding")),
            ("strata", Some("bedding")),
            ("Strike and dip of inverted strata", Some("bedding")),
            ("Strike and dip of strata, dip 5 to 15 degrees", Some("bedding")),
            ("Plunge of fold axis", Some("fold_axis")),
            ("Minor anticline showing plunge", Some("fold_axis")),
            ("Joints", Some("joint")),
            ("Crenulation cleavage", Some("cleavage")),
            ("Schistosity", Some("foliation")),
            ("mineral lineation", Some("lineation")),
            ("bedding-cleavage intersection lineation", Some("intersection_lineation")),
            ("fault striae", Some("slickenline")),
            ("axial planar cleavage", None),
            ("Relative displacement of fault", None),
            ("joint with vein", None),
            ("bedding or foliation", None),
            ("S1", None),
            ("", None),
        ] {
            assert_eq!(described(text), want, "{text}");
        }
    }
}
