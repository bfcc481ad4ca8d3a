//! One text that holds a whole attitude: "045/45", "N45E 45SE", "225->30", "045/60 SE rake 30 NE".

use super::check::{azimuth, inclination, line};
use super::compass::{CompassPoint, between, quadrant_bearing};
use super::plane::{line_from_rake, plane};
use super::scan::{Num, Token, Tokens, blank_parted, tokens};
use super::{Notation, NotationError, Quantity, Reading};
use crate::orientation::{Dip, Measured, Polarity};

/// What the text is to be read as: the structure says so, not the text.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Wanted {
    /// A plane.
    Plane,
    /// A line.
    Line,
    /// A line with a sense: a negative plunge points up. Its polarity is overturned then, else upright.
    DirectedLine,
}

/// Which of two plain numbers comes first in a source's text column.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Order {
    /// No row has told.
    #[default]
    Unknown,
    /// Azimuth, then dip or plunge.
    AzimuthFirst,
    /// Dip or plunge, then azimuth.
    InclinationFirst,
}

/// What a text shows about the notation of its column.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct Written {
    /// It has compass letters.
    pub letters: bool,
    /// It has an arrow.
    pub arrow: bool,
    /// Which number is the azimuth, where the text leaves no doubt.
    pub order: Order,
}

#[derive(Debug, Clone, Copy, PartialEq)]
enum Part {
    Lettered(f64),
    Plain(Num),
    Sided(Num, CompassPoint),
    Word(f64),
}

#[derive(Debug, Default)]
struct Parts {
    parts: [Option<Part>; 2],
    /// A separator came before any part: the azimuth was left blank.
    blank_first: bool,
    arrow: bool,
    side: Option<CompassPoint>,
    rake: Option<(f64, Option<CompassPoint>)>,
    polarity: Option<Polarity>,
}

impl Parts {
    fn count(&self) -> usize {
        self.parts.iter().flatten().count()
    }
    fn push(&mut self, part: Part) -> Option<()> {
        let free = self.parts.iter_mut().find(|p| p.is_none())?;
        *free = Some(part);
        Some(())
    }
}

/// A bearing in letters at the start of `items`, and how many tokens it took.
pub(super) fn lettered(items: &[Token]) -> Option<Result<(f64, usize), ()>> {
    let from = match items.first()? {
        Token::Point(from) => from,
        Token::Due(point) => return Some(Ok((point.azimuth, 1))),
        _ => return None,
    };
    if let Some((num, used)) = items.get(1..).and_then(blank_parted)
        && let Some(Token::Point(toward)) = items.get(1 + used)
        && from.is_cardinal()
        && toward.is_cardinal()
        && between(from.azimuth, toward.azimuth) == 90.0
    {
        return Some(quadrant_bearing(*from, num.degrees, *toward).map(|a| (a, 2 + used)).ok_or(()));
    }
    if let (Some(Token::Dash), Some(Token::Point(to))) = (items.get(1), items.get(2)) {
        return Some(if between(from.azimuth, to.azimuth) == 180.0 { Ok((from.azimuth, 3)) } else { Err(()) });
    }
    Some(Ok((from.azimuth, 1)))
}

fn parts(tokens: &Tokens) -> Option<Parts> {
    let items = tokens.as_slice();
    // Blank-parted minutes can be told from a second reading only where something else parts the readings.
    let parted = items.iter().any(|t| matches!(t, Token::Slash | Token::Arrow));
    let mut out = Parts::default();
    let mut i = 0;
    let mut after_separator = true;
    while i < items.len() {
        let fresh = std::mem::replace(&mut after_separator, false);
        match items[i] {
            Token::Slash | Token::Arrow | Token::Dash => {
                out.arrow |= items[i] == Token::Arrow;
                // "225-30" is an azimuth and a dip, "5-15" a range.
                if items[i] == Token::Dash
                    && !matches!(out.parts, [Some(Part::Plain(Num { width: 3, .. }) | Part::Lettered(_)), None])
                {
                    return None;
                }
                out.blank_first |= out.count() == 0;
                after_separator = true;
                i += 1;
            }
            Token::Num(_) => {
                let (num, used) = if parted { blank_parted(&items[i..])? } else { (number_at(items, i)?, 1) };
                i += used;
                // Letters right after a number are its side, unless they begin a bearing of their own.
                if let Some(Token::Point(p)) = items.get(i).copied()
                    && matches!(lettered(&items[i..]), Some(Ok((_, 1))))
                {
                    out.push(Part::Sided(num, p))?;
                    i += 1;
                } else {
                    out.push(Part::Plain(num))?;
                }
            }
            Token::Point(p) => {
                if out.count() == 2 {
                    if out.side.replace(p).is_some() {
                        return None;
                    }
                    i += 1;
                } else {
                    let (a, used) = lettered(&items[i..])?.ok()?;
                    out.push(Part::Lettered(a))?;
                    i += used;
                }
            }
            Token::Due(p) => {
                out.push(Part::Lettered(p.azimuth))?;
                i += 1;
            }
            Token::Horizontal | Token::Vertical => {
                out.push(Part::Word(if items[i] == Token::Vertical { 90.0 } else { 0.0 }))?;
                i += 1;
            }
            Token::Rake => {
                let num = number_at(items, i + 1)?;
                let end = match items.get(i + 2) {
                    Some(Token::Point(p)) => Some(*p),
                    _ => None,
                };
                if out.rake.replace((num.degrees, end)).is_some() {
                    return None;
                }
                i += 2 + usize::from(end.is_some());
            }
            Token::Upright | Token::Overturned => {
                let p = if items[i] == Token::Upright { Polarity::Upright } else { Polarity::Overturned };
                if out.polarity.replace(p).is_some_and(|old| old != p) {
                    return None;
                }
                after_separator = fresh;
                i += 1;
            }
        }
    }
    Some(out)
}

fn number_at(items: &[Token], i: usize) -> Option<Num> {
    match items.get(i) {
        Some(Token::Num(n)) => Some(*n),
        _ => None,
    }
}

/// Which of two plain numbers is the azimuth: what is over 90 must be; three digits say azimuth, two do not.
fn order_of(a: Num, b: Num) -> Order {
    match (a.degrees > 90.0, b.degrees > 90.0, a.width >= 3, b.width >= 3) {
        (true, false, ..) | (true, true, ..) => Order::AzimuthFirst,
        (false, true, ..) => Order::InclinationFirst,
        (_, _, true, _) => Order::AzimuthFirst,
        (_, _, false, true) => Order::InclinationFirst,
        _ => Order::Unknown,
    }
}

/// What `text` shows about the notation of its column; nothing where it is unreadable.
pub fn written_as(text: &str) -> Written {
    let Some(p) = tokens(text).as_ref().and_then(parts) else { return Written::default() };
    let letters =
        p.side.is_some() || p.parts.iter().flatten().any(|p| matches!(p, Part::Lettered(_) | Part::Sided(..)));
    let order = match p.parts {
        [Some(Part::Plain(a)), Some(Part::Plain(b))] => order_of(a, b),
        _ => Order::Unknown,
    };
    Written { letters, arrow: p.arrow, order }
}

struct Split {
    azimuth: Option<f64>,
    in_letters: bool,
    inclination: f64,
    side: Option<CompassPoint>,
}

fn split(text: &str, p: &Parts, wanted: Wanted, order: Order) -> Result<Split, NotationError> {
    let unreadable = || NotationError::Unreadable(text.to_owned());
    let numeric = |part: Part| match part {
        Part::Plain(n) => Some((n.degrees, None)),
        Part::Sided(n, p) => Some((n.degrees, Some(p))),
        Part::Word(d) => Some((d, None)),
        Part::Lettered(_) => None,
    };
    let missing = |wanted| match wanted {
        Wanted::Plane => NotationError::Missing(Quantity::Dip),
        _ => NotationError::Missing(Quantity::Plunge),
    };
    let (azimuth, in_letters, inclination, own_side) = match p.parts {
        [None, _] => return Err(unreadable()),
        [Some(Part::Lettered(_)), None] => return Err(missing(wanted)),
        [Some(one), None] => {
            let (d, side) = numeric(one).ok_or_else(unreadable)?;
            if !p.blank_first && !matches!(one, Part::Word(_)) {
                return Err(missing(wanted));
            }
            (None, false, d, side)
        }
        [Some(Part::Lettered(a)), Some(other)] | [Some(other), Some(Part::Lettered(a))] => {
            let (d, side) = numeric(other).ok_or_else(unreadable)?;
            (Some(a), true, d, side)
        }
        [Some(Part::Plain(a)), Some(Part::Plain(b))] => {
            // A plane with dip first is written with an arrow toward its dip direction; "30/225" could be a strike.
            let swap = match (order_of(a, b), wanted, p.arrow) {
                (Order::InclinationFirst, Wanted::Plane, arrow) => arrow,
                (Order::InclinationFirst, ..) => true,
                (Order::AzimuthFirst, ..) => false,
                (Order::Unknown, Wanted::Plane, false) => false,
                (Order::Unknown, _, arrow) => match order {
                    Order::InclinationFirst => true,
                    Order::AzimuthFirst => false,
                    Order::Unknown if arrow && wanted != Wanted::Plane && a.degrees != b.degrees => {
                        return Err(NotationError::OrderAmbiguous(text.to_owned()));
                    }
                    Order::Unknown => false,
                },
            };
            let (azimuth, dip) = if swap { (b, a) } else { (a, b) };
            (Some(azimuth.degrees), false, dip.degrees, None)
        }
        [Some(Part::Plain(a)), Some(Part::Sided(d, side))] | [Some(Part::Sided(d, side)), Some(Part::Plain(a))] => {
            (Some(a.degrees), false, d.degrees, Some(side))
        }
        [Some(Part::Plain(a)), Some(Part::Word(d))] | [Some(Part::Word(d)), Some(Part::Plain(a))] => {
            (Some(a.degrees), false, d, None)
        }
        _ => return Err(unreadable()),
    };
    if own_side.is_some() && p.side.is_some() {
        return Err(unreadable());
    }
    Ok(Split { azimuth, in_letters, inclination, side: own_side.or(p.side) })
}

/// Reads a whole attitude from one text.
///
/// Planes: compass letters mean strike, dip and dip quadrant; an arrow means dip direction -> dip ("30->225" too, where
/// only the second number can be the azimuth); plain "a/b" is read by `notation`, azimuth first. Lines: trend and
/// plunge in either order where letters, three digits or a number over 90 tell the trend; else `order` (what the
/// rest of the column shows), else trend first, except with an arrow, which is refused. A rake makes a line of the
/// plane before it.
pub fn attitude(text: &str, wanted: Wanted, notation: Notation, order: Order) -> Result<Reading, NotationError> {
    let unreadable = || NotationError::Unreadable(text.to_owned());
    let found = tokens(text).ok_or_else(unreadable)?;
    let p = match parts(&found) {
        Some(p) => p,
        None if found
            .as_slice()
            .iter()
            .enumerate()
            .any(|(i, _)| matches!(lettered(&found.as_slice()[i..]), Some(Err(())))) =>
        {
            return Err(NotationError::QuadrantBearing(text.to_owned()));
        }
        None => return Err(unreadable()),
    };
    let as_plane = wanted == Wanted::Plane || p.rake.is_some();
    let s = split(text, &p, if as_plane { Wanted::Plane } else { wanted }, order)?;
    if as_plane {
        let (notation, quantity) = match (notation, p.arrow, s.in_letters, s.side) {
            (_, true, ..) | (Notation::DipDirection, ..) => (Notation::DipDirection, Quantity::DipDirection),
            (_, _, true, Some(_)) => (Notation::Quadrant, Quantity::Strike),
            (Notation::Auto, _, true, None) => (Notation::Quadrant, Quantity::Strike),
            (notation, ..) => (notation, Quantity::Strike),
        };
        let (a, wrapped) = wrap(quantity, s.azimuth)?;
        let dip = inclination(Quantity::Dip, s.inclination)?;
        let measured = plane(notation, a, dip, s.side)?;
        return match p.rake {
            None => Ok(Reading { measured, wrapped, polarity: p.polarity }),
            // A plane with striae on it is still that plane.
            Some(_) if wanted == Wanted::Plane => Ok(Reading { measured, wrapped, polarity: p.polarity }),
            Some((rake, end)) => {
                Ok(Reading { measured: line_from_rake(measured, rake, end)?, wrapped, polarity: p.polarity })
            }
        };
    }
    if s.side.is_some() {
        return Err(unreadable());
    }
    let (trend, wrapped) = wrap(Quantity::Trend, s.azimuth)?;
    line_reading(trend, s.inclination, wanted, wrapped, p.polarity)
}

/// A line from trend and plunge as written; the one place where a sense is taken up.
pub(super) fn line_reading(
    trend: Option<f64>,
    plunge: f64,
    wanted: Wanted,
    wrapped: bool,
    polarity: Option<Polarity>,
) -> Result<Reading, NotationError> {
    if wanted != Wanted::DirectedLine {
        let plunge = inclination(Quantity::Plunge, plunge)?;
        return Ok(Reading { measured: line(trend, plunge)?, wrapped, polarity });
    }
    let (plunge, up): (Dip, bool) = super::plunge_with_sense(plunge)?;
    let measured: Measured = line(if up { trend.map(|t| (t + 180.0) % 360.0) } else { trend }, plunge)?;
    Ok(Reading { measured, wrapped, polarity: Some(if up { Polarity::Overturned } else { Polarity::Upright }) })
}

fn wrap(quantity: Quantity, value: Option<f64>) -> Result<(Option<f64>, bool), NotationError> {
    match value {
        None => Ok((None, false)),
        Some(v) => azimuth(quantity, v).map(|(a, wrapped)| (Some(a), wrapped)),
    }
}
