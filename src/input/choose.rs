//! Which column is what: as the user says, else by its name.

use super::checks::{find, named_well, ragged};
use super::names::{Meaning, PAIRS, half};
use super::spec::{DeclinationSpec, NorthReference, StationSpec, StructureSpec};
use super::{InputFault, place};
use crate::notice::{Notice, Place};
use crate::orientation::notation::Notation;
use crate::table::{Column, Shapes, Table};

/// A column that was read, and as what.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct UsedColumn {
    /// Key under `[stations.columns]`.
    pub key: &'static str,
    /// The column as the source spells it.
    pub column: String,
    /// True where its name alone decided.
    pub guessed: bool,
}

/// Where positions come from.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Position {
    Shapes { degrees: bool },
    Columns { x: usize, y: usize, degrees: bool },
}

impl Position {
    /// The same, held to the range of longitude and latitude.
    pub fn in_degrees(self) -> Self {
        match self {
            Self::Shapes { .. } => Self::Shapes { degrees: true },
            Self::Columns { x, y, .. } => Self::Columns { x, y, degrees: true },
        }
    }
}

/// Where structures come from.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum StructureSource {
    Column(usize),
    Value(String),
}

/// Columns by meaning, as indices into the table's fields.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Columns {
    pub position: Position,
    pub structure: StructureSource,
    pub id: Option<usize>,
    pub z: Option<usize>,
    pub date: Option<usize>,
    pub attitude: Option<usize>,
    /// Strike, and how the name or the user says it is to be read.
    pub strike: Option<(usize, Notation)>,
    pub dip_direction: Option<usize>,
    pub trend: Option<usize>,
    pub dip: Option<usize>,
    pub plunge: Option<usize>,
    pub quadrant: Option<usize>,
    pub rake: Option<usize>,
    pub polarity: Option<usize>,
    pub weight: Option<usize>,
    pub declination: Option<usize>,
    /// The strike column is one by its name or by the key `strike`; "azimuth" may hold trends too.
    pub strike_by_name: bool,
    pub used: Vec<UsedColumn>,
}

struct Chooser<'a> {
    table: &'a Table,
    spec: &'a StationSpec,
    used: Vec<UsedColumn>,
    notices: &'a mut Vec<Notice>,
}

pub(super) fn names(table: &Table) -> Vec<String> {
    table.fields.iter().map(|f| f.name.clone()).collect()
}

/// Columns that may be meant, by names that come near.
fn near(table: &Table, meanings: &[Meaning]) -> Vec<String> {
    let mut out = names(table);
    out.retain(|name| meanings.iter().any(|m| m.near(name)));
    out
}

impl Chooser<'_> {
    fn named(&mut self, key: &'static str, name: &str) -> Result<usize, InputFault> {
        let i = find(self.table, key, name)?;
        self.used.push(UsedColumn { key, column: self.table.fields[i].name.clone(), guessed: false });
        Ok(i)
    }

    fn note(&mut self, i: usize, key: &'static str, area_key: &str, words: &str) {
        let column = self.table.fields[i].name.clone();
        self.notices.push(
            Notice::info(
                "column-guessed",
                Place::file(&self.spec.file).in_column(&column),
                format!("read as {words}, from its name"),
            )
            .hint(format!("name another under [stations.columns], key {area_key}")),
        );
        self.used.push(UsedColumn { key, column, guessed: true });
    }

    fn told(&mut self, i: usize, meaning: Meaning) {
        self.note(i, meaning.key(), meaning.area_key(), meaning.words());
    }

    /// The best column for a meaning, by name; not yet said. `first` takes the first of several equally good ones.
    fn guess(&self, meaning: Meaning, first: bool) -> Result<Option<usize>, InputFault> {
        let mut found: Vec<(usize, usize)> = Vec::new();
        for (i, field) in self.table.fields.iter().enumerate() {
            let text = matches!(field.column, Column::Text(_) | Column::Word(_));
            if matches!(meaning, Meaning::Structure | Meaning::Attitude | Meaning::DipQuadrant) && !text {
                continue;
            }
            if let Some(rank) = meaning.rank(&field.name) {
                found.push((rank, i));
            }
        }
        let Some(best) = found.iter().map(|(rank, _)| *rank).min() else { return Ok(None) };
        let best: Vec<usize> = found.into_iter().filter(|(rank, _)| *rank == best).map(|(_, i)| i).collect();
        if best.len() > 1 && !first {
            let candidates = best.iter().map(|&i| self.table.fields[i].name.clone()).collect();
            let (key, meaning) = (meaning.area_key(), meaning.words());
            return Err(InputFault::Ambiguous { key, meaning, candidates });
        }
        Ok(best.first().copied())
    }

    fn optional(&mut self, meaning: Meaning, name: &Option<String>, first: bool) -> Result<Option<usize>, InputFault> {
        if let Some(name) = name {
            return self.named(meaning.key(), name).map(Some);
        }
        let found = self.guess(meaning, first)?;
        if let Some(i) = found {
            self.told(i, meaning);
        }
        Ok(found)
    }

    fn position(&mut self) -> Result<Position, InputFault> {
        let keys = self.spec.columns.clone();
        let missing = |table, keys| InputFault::NoColumn {
            what: "where a station is",
            keys,
            near: Vec::new(),
            columns: names(table),
        };
        if !matches!(self.table.shapes, Shapes::None) {
            return Ok(Position::Shapes { degrees: false });
        }
        match (&keys.x, &keys.y) {
            (Some(x), Some(y)) => {
                let (x, y) = (self.named("x", x)?, self.named("y", y)?);
                let is = |i: usize, first: bool| {
                    PAIRS.iter().any(|p| p.2 && half(&self.table.fields[i].name, if first { p.0 } else { p.1 }))
                };
                return Ok(Position::Columns { x, y, degrees: is(x, true) && is(y, false) });
            }
            (Some(_), None) => return Err(missing(self.table, "y")),
            (None, Some(_)) => return Err(missing(self.table, "x")),
            (None, None) => {}
        }
        let find = |spelling| self.table.fields.iter().position(|f| half(&f.name, spelling));
        let mut pairs: Vec<(usize, usize, bool)> = Vec::new();
        for (first, second, degrees) in PAIRS {
            if let (Some(x), Some(y)) = (find(first), find(second))
                && !pairs.contains(&(x, y, degrees))
            {
                pairs.push((x, y, degrees));
            }
        }
        // Both kinds side by side are common; a CRS that is said tells them apart.
        if let (true, Some(crs)) = (pairs.len() > 1, self.spec.crs.as_ref().or(self.table.crs.as_ref())) {
            let geographic = place::is_geographic(crs);
            if pairs.iter().any(|p| p.2 == geographic) {
                pairs.retain(|p| p.2 == geographic);
            }
        }
        match pairs[..] {
            [] => Err(missing(self.table, "x and y")),
            [(x, y, degrees)] => {
                self.note(x, "x", "x", if degrees { "longitude" } else { "easting" });
                self.note(y, "y", "y", if degrees { "latitude" } else { "northing" });
                Ok(Position::Columns { x, y, degrees })
            }
            _ => {
                let name = |i: usize| &self.table.fields[i].name;
                let candidates = pairs.iter().map(|p| format!("{} / {}", name(p.0), name(p.1))).collect();
                Err(InputFault::Ambiguous { key: "x and y", meaning: "position", candidates })
            }
        }
    }

    fn structure(&mut self) -> Result<StructureSource, InputFault> {
        match &self.spec.columns.structure {
            Some(StructureSpec::Value(value)) => Ok(StructureSource::Value(value.clone())),
            Some(StructureSpec::Column(name)) => self.named("structure", name).map(StructureSource::Column),
            None => match self.guess(Meaning::Structure, false)? {
                Some(i) => {
                    self.told(i, Meaning::Structure);
                    Ok(StructureSource::Column(i))
                }
                None => Err(InputFault::NoStructure {
                    near: near(self.table, &[Meaning::Structure]),
                    columns: names(self.table),
                }),
            },
        }
    }
}

/// How a strike beside a dip direction is read: where the latter is what counts, a strike alone tells no side.
fn of_strike(declared: Notation) -> Notation {
    if declared == Notation::DipDirection { Notation::Quadrant } else { declared }
}

/// What a column's name says about a strike.
fn notation_in_name(name: &str) -> Option<Notation> {
    let name = super::value::normal(name);
    let has = |words: [&str; 2]| words.iter().any(|w| name.contains(w));
    if has(["rhr", "righthand"]) {
        Some(Notation::RightHand)
    } else if has(["lhr", "lefthand"]) {
        Some(Notation::LeftHand)
    } else {
        None
    }
}

/// Azimuth, dip and the rest of an attitude.
fn attitude(chooser: &mut Chooser<'_>, out: &mut Columns) -> Result<(), InputFault> {
    let keys = &chooser.spec.columns;
    let declared = chooser.spec.notation;
    if let Some(name) = &keys.attitude {
        out.attitude = Some(chooser.named("attitude", name)?);
        return Ok(());
    }
    for (slot, key, name) in
        [(&mut out.dip_direction, "dip_direction", &keys.dip_direction), (&mut out.trend, "trend", &keys.trend)]
    {
        if let Some(name) = name {
            *slot = Some(chooser.named(key, name)?);
        }
    }
    if let Some(name) = &keys.strike {
        out.strike = Some((chooser.named("strike", name)?, of_strike(declared)));
        out.strike_by_name = true;
    }
    if let Some(name) = &keys.azimuth {
        let i = chooser.named("azimuth", name)?;
        azimuth(chooser, out, i, true)?;
    } else if out.strike.is_none() && out.dip_direction.is_none() {
        let strike = chooser.guess(Meaning::Strike, false)?;
        let dip_direction = chooser.guess(Meaning::DipDirection, false)?;
        if out.trend.is_none() {
            out.trend = chooser.optional(Meaning::Trend, &None, false)?;
        }
        if let Some(i) = strike {
            chooser.told(i, Meaning::Strike);
            out.strike = Some((i, of_strike(declared)));
            out.strike_by_name = true;
        }
        if let Some(i) = dip_direction {
            chooser.told(i, Meaning::DipDirection);
            out.dip_direction = Some(i);
        }
        if strike.is_none() && dip_direction.is_none() {
            let generic = chooser.guess(Meaning::Azimuth, false)?;
            if let Some(i) = generic.filter(|_| !(declared == Notation::TrendPlunge && out.trend.is_some())) {
                chooser.told(i, Meaning::Azimuth);
                azimuth(chooser, out, i, false)?;
            }
        }
        disagreement(chooser.table, declared, strike, dip_direction)?;
    } else if out.trend.is_none() {
        out.trend = chooser.optional(Meaning::Trend, &None, false)?;
    }
    if let Some((i, notation)) = &mut out.strike
        && *notation == Notation::Auto
    {
        *notation = notation_in_name(&chooser.table.fields[*i].name).unwrap_or(Notation::Auto);
    }
    if out.strike.is_none() && out.dip_direction.is_none() && out.trend.is_none() {
        out.attitude = chooser.optional(Meaning::Attitude, &None, false)?;
        if out.attitude.is_some() {
            return Ok(());
        }
        return Err(InputFault::NoColumn {
            what: "strike, dip direction or trend",
            keys: "azimuth (or attitude, where one text holds all)",
            near: near(chooser.table, &[Meaning::Strike, Meaning::DipDirection, Meaning::Trend, Meaning::Azimuth]),
            columns: names(chooser.table),
        });
    }
    out.dip = chooser.optional(Meaning::Dip, &keys.dip, false)?;
    out.plunge = chooser.optional(Meaning::Plunge, &keys.plunge, false)?;
    if out.dip.is_none() && out.plunge.is_none() {
        return Err(InputFault::NoColumn {
            what: "dip or plunge",
            keys: "dip",
            near: near(chooser.table, &[Meaning::Dip, Meaning::Plunge]),
            columns: names(chooser.table),
        });
    }
    out.quadrant = chooser.optional(Meaning::DipQuadrant, &keys.dip_quadrant, false)?;
    out.rake = chooser.optional(Meaning::Rake, &keys.rake, false)?;
    Ok(())
}

/// Puts the column of key `azimuth` where the notation, else its name, says it belongs.
fn azimuth(chooser: &mut Chooser<'_>, out: &mut Columns, i: usize, named: bool) -> Result<(), InputFault> {
    let name = &chooser.table.fields[i].name;
    let declared = chooser.spec.notation;
    let meaning = match declared {
        Notation::DipDirection => Meaning::DipDirection,
        Notation::TrendPlunge => Meaning::Trend,
        Notation::Auto if Meaning::DipDirection.rank(name).is_some() => Meaning::DipDirection,
        Notation::Auto if Meaning::Trend.rank(name).is_some() => Meaning::Trend,
        _ => Meaning::Strike,
    };
    let taken = match meaning {
        Meaning::DipDirection => out.dip_direction.replace(i),
        Meaning::Trend => out.trend.replace(i),
        _ => {
            out.strike_by_name |= Meaning::Strike.rank(name).is_some();
            out.strike.replace((i, declared)).map(|(old, _)| old)
        }
    };
    if let Some(old) = taken.filter(|&old| old != i) {
        let candidates = vec![chooser.table.fields[old].name.clone(), name.clone()];
        let (key, meaning) = (meaning.area_key(), meaning.words());
        return Err(InputFault::Ambiguous { key, meaning, candidates });
    }
    let wrong = match meaning {
        Meaning::Strike => Meaning::DipDirection.rank(name).map(|_| "dip direction"),
        Meaning::DipDirection => Meaning::Strike.rank(name).map(|_| "strike"),
        _ => None,
    };
    if let (true, Some(wrong)) = (named, wrong) {
        chooser.notices.push(
            Notice::warning(
                "notation-and-name-differ",
                Place::file(&chooser.spec.file).in_column(name),
                format!(
                    "column {name:?} was read as {}, as notation says, but by its name it is a {wrong}",
                    meaning.words()
                ),
            )
            .hint("check notation under [stations]"),
        );
    }
    Ok(())
}

/// A guessed column whose name contradicts the declared notation would turn every reading by 90 degrees.
fn disagreement(
    table: &Table,
    declared: Notation,
    strike: Option<usize>,
    dip_direction: Option<usize>,
) -> Result<(), InputFault> {
    let (column, meaning) = match (declared, strike, dip_direction) {
        (Notation::RightHand | Notation::LeftHand | Notation::Quadrant, None, Some(i)) => (i, "dip direction"),
        (Notation::DipDirection, Some(i), None) => (i, "strike"),
        _ => return Ok(()),
    };
    Err(InputFault::NotationDisagrees { notation: declared.word(), column: table.fields[column].name.clone(), meaning })
}

/// Finds all columns; every guess is said in a notice.
pub(super) fn columns(table: &Table, spec: &StationSpec, notices: &mut Vec<Notice>) -> Result<Columns, InputFault> {
    ragged(table)?;
    let mut chooser = Chooser { table, spec, used: Vec::new(), notices };
    named_well(table, spec)?;
    let position = chooser.position()?;
    let structure = chooser.structure()?;
    let mut out = Columns {
        position,
        structure,
        id: chooser.optional(Meaning::Id, &spec.columns.id, true)?,
        z: None,
        date: None,
        attitude: None,
        strike: None,
        dip_direction: None,
        trend: None,
        dip: None,
        plunge: None,
        quadrant: None,
        rake: None,
        polarity: None,
        weight: None,
        declination: None,
        strike_by_name: false,
        used: Vec::new(),
    };
    attitude(&mut chooser, &mut out)?;
    out.polarity = chooser.optional(Meaning::Polarity, &spec.columns.polarity, false)?;
    out.weight = chooser.optional(Meaning::Weight, &spec.columns.weight, false)?;
    // Height, date and declination count only against magnetic north.
    match (spec.north, &spec.declination) {
        (Some(NorthReference::Magnetic), Some(DeclinationSpec::Model)) => {
            out.z = chooser.optional(Meaning::Z, &spec.columns.z, true)?;
            out.date = chooser.optional(Meaning::Date, &spec.columns.date, true)?;
        }
        (Some(NorthReference::Magnetic), Some(DeclinationSpec::Column(name))) => {
            out.declination = Some(chooser.named("declination", name)?);
        }
        (Some(NorthReference::Magnetic), None) => {
            out.declination = chooser.optional(Meaning::Declination, &spec.columns.declination, false)?;
        }
        _ => {}
    }
    if spec.north != Some(NorthReference::Magnetic)
        && (spec.declination.is_some() || spec.columns.declination.is_some())
    {
        chooser.notices.push(
            Notice::warning(
                "declination-unused",
                Place::file(&spec.file),
                "a declination is given, but the azimuths are not said to be magnetic; it was left aside",
            )
            .hint("say north = \"magnetic\" under [stations]"),
        );
    }
    out.used = chooser.used;
    Ok(out)
}
