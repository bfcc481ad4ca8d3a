//! From characters to tokens: one spelling for the many ways to type a degree sign, a dash or an arrow.
//!
//! Nothing here allocates; text longer than any attitude is not one.

use super::compass::{CompassPoint, compass_point};

const LONGEST: usize = 96;
const MOST: usize = 24;

/// A number as written.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Num {
    pub degrees: f64,
    /// Digits before the decimal mark.
    pub width: u8,
    /// Digits alone: no decimals, no unit, no sign.
    pub whole: bool,
}

#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Token {
    Num(Num),
    Point(CompassPoint),
    /// "due N": that bearing and no more of one.
    Due(CompassPoint),
    /// A slash, bar, semicolon, or a comma between two readings.
    Slash,
    Arrow,
    /// A dash that is no sign.
    Dash,
    Horizontal,
    Vertical,
    Rake,
    Upright,
    Overturned,
}

/// Up to [`MOST`] tokens.
#[derive(Debug, Clone, Copy)]
pub(super) struct Tokens {
    items: [Token; MOST],
    len: usize,
}

impl Tokens {
    pub fn as_slice(&self) -> &[Token] {
        &self.items[..self.len]
    }
    fn push(&mut self, token: Token) -> Option<()> {
        *self.items.get_mut(self.len)? = token;
        self.len += 1;
        Some(())
    }
}

/// The text in plain lower-case ASCII: `*` for degrees, `>` for an arrow. `None` for a character that means
/// nothing here.
struct Plain {
    bytes: [u8; LONGEST],
    len: usize,
}

fn plain(text: &str) -> Option<Plain> {
    let mut out = Plain { bytes: [0; LONGEST], len: 0 };
    for c in text.chars() {
        let b = match c {
            'º' | '°' | '˚' | '∘' => b'*',
            '’' | '‘' | '′' | '´' | '`' | 'ʹ' | '‵' => b'\'',
            '″' | '”' | '“' | 'ʺ' | '‶' => b'"',
            '–' | '—' | '−' | '‐' | '‑' | '‒' | '―' => b'-',
            '→' | '⇒' | '➔' | '⟶' | '➜' | '⟹' => b'>',
            '⁄' | '∕' => b'/',
            '\u{feff}' => continue,
            // Full-width forms stand in the same order as ASCII.
            '\u{ff01}'..='\u{ff5e}' => (c as u32 - 0xff01 + 0x21) as u8,
            c if c.is_whitespace() => b' ',
            c if c.is_ascii_graphic() => c as u8,
            _ => return None,
        };
        *out.bytes.get_mut(out.len)? = b.to_ascii_lowercase();
        out.len += 1;
    }
    Some(out)
}

/// Digits with a decimal point or comma at `at`: value, digits before the mark, any decimals, where it ends.
fn number(s: &[u8], at: usize, commas: bool) -> Option<(f64, u8, bool, usize)> {
    let mut digits = [0u8; 40];
    let mut n = 0;
    let (mut width, mut mark, mut i) = (0u8, false, at);
    while let Some(&b) = s.get(i) {
        let follows = s.get(i + 1).is_some_and(u8::is_ascii_digit);
        if b.is_ascii_digit() {
            width += u8::from(!mark);
        } else if !mark && (b == b'.' && (follows || width > 0) || b == b',' && commas && width > 0 && follows) {
            mark = true;
        } else {
            break;
        }
        *digits.get_mut(n)? = if b == b',' { b'.' } else { b };
        n += 1;
        i += 1;
    }
    // 1e308 is a number to a computer and nothing to a compass.
    let value = std::str::from_utf8(&digits[..n]).ok()?.parse().ok()?;
    Some((value, width, mark, i))
}

fn skip_blanks(s: &[u8], mut i: usize) -> usize {
    while s.get(i) == Some(&b' ') {
        i += 1;
    }
    i
}

/// A number with its degrees, minutes and seconds signs.
fn angle(s: &[u8], at: usize, commas: bool) -> Option<(Num, usize)> {
    let (mut degrees, width, decimals, mut i) = number(s, at, commas)?;
    let word = s[i..].iter().take_while(|b| b.is_ascii_alphabetic()).count();
    let letter_d = word == 1 && s[i] == b'd';
    let sign = match &s[i..i + word] {
        b"deg" | b"degrees" | b"d" => word,
        _ if s.get(i) == Some(&b'*') => 1,
        _ => {
            let gap = skip_blanks(s, i);
            match &s[gap..] {
                [b'*', ..] => gap - i + 1,
                rest if rest.starts_with(b"degrees") => gap - i + 7,
                rest if rest.starts_with(b"deg") => gap - i + 3,
                _ => 0,
            }
        }
    };
    let mut whole = !decimals && sign == 0;
    i += sign;
    if sign > 0 && !decimals {
        let from = skip_blanks(s, i);
        if let Some((minutes, _, fraction, end)) = number(s, from, commas) {
            let minute_sign = matches!(s.get(end), Some(b'\'')) || letter_d && s.get(end) == Some(&b'm');
            if minute_sign {
                if minutes >= 60.0 {
                    return None;
                }
                degrees += minutes / 60.0;
                i = end + 1;
                let from = skip_blanks(s, i);
                if let (false, Some((seconds, _, _, end))) = (fraction, number(s, from, commas)) {
                    let two = s.get(end) == Some(&b'\'') && s.get(end + 1) == Some(&b'\'');
                    if two || s.get(end) == Some(&b'"') || letter_d && s.get(end) == Some(&b's') {
                        if seconds >= 60.0 {
                            return None;
                        }
                        degrees += seconds / 3600.0;
                        i = end + 1 + usize::from(two);
                    }
                }
            }
        }
    }
    whole &= degrees.is_finite();
    Some((Num { degrees, width, whole }, i))
}

/// The tokens of a text; `None` where it holds anything else.
pub(super) fn tokens(text: &str) -> Option<Tokens> {
    let plain = plain(text.trim())?;
    let s = &plain.bytes[..plain.len];
    let commas = decimal_commas(s);
    let mut out = Tokens { items: [Token::Slash; MOST], len: 0 };
    let mut i = 0;
    while i < s.len() {
        let b = s[i];
        let before = out.as_slice().last().copied();
        match b {
            b' ' => i += 1,
            b'0'..=b'9' | b'.' => {
                let (num, end) = angle(s, i, commas)?;
                out.push(Token::Num(num))?;
                i = end;
            }
            b'/' | b'|' | b';' | b'\\' | b',' => {
                out.push(Token::Slash)?;
                i += 1;
            }
            b'>' => {
                out.push(Token::Arrow)?;
                i += 1;
            }
            b'-' | b'=' => {
                let mut j = i;
                while matches!(s.get(j), Some(b'-' | b'=')) {
                    j += 1;
                }
                if s.get(j) == Some(&b'>') {
                    out.push(Token::Arrow)?;
                    i = j + 1;
                } else if b == b'=' {
                    return None;
                } else if s.get(i + 1).is_some_and(u8::is_ascii_digit)
                    && (i == 0 || s[i - 1] == b' ' || matches!(before, Some(Token::Slash | Token::Arrow)))
                {
                    let (num, end) = angle(s, i + 1, commas)?;
                    out.push(Token::Num(Num { degrees: -num.degrees, whole: false, ..num }))?;
                    i = end;
                } else {
                    out.push(Token::Dash)?;
                    i += 1;
                }
            }
            b'a'..=b'z' => i = word(s, i, &mut out)?,
            b'(' | b')' => i += 1,
            _ => return None,
        }
    }
    Some(out)
}

/// Reads the letters at `i` and returns where they end.
fn word(s: &[u8], i: usize, out: &mut Tokens) -> Option<usize> {
    let len = s[i..].iter().take_while(|b| b.is_ascii_alphabetic()).count();
    let mut end = i + len;
    let letters = std::str::from_utf8(&s[i..end]).ok()?;
    if s.get(end) == Some(&b'.') && !s.get(end + 1).is_some_and(u8::is_ascii_digit) {
        end += 1;
    }
    // "EW" is "E-W": both ends of one line.
    if let Some(ends) = match letters {
        "ew" => Some(["e", "w"]),
        "we" => Some(["w", "e"]),
        "ns" => Some(["n", "s"]),
        "sn" => Some(["s", "n"]),
        _ => None,
    } {
        out.push(Token::Point(compass_point(ends[0])?))?;
        out.push(Token::Dash)?;
        out.push(Token::Point(compass_point(ends[1])?))?;
        return Some(end);
    }
    let token = match letters {
        "due" => {
            let from = skip_blanks(s, end);
            let len = s[from..].iter().take_while(|b| b.is_ascii_alphabetic()).count();
            end = from + len;
            Token::Due(compass_point(std::str::from_utf8(&s[from..end]).ok()?)?)
        }
        "horizontal" | "flat" | "hor" | "horiz" => Token::Horizontal,
        "vertical" | "vert" => Token::Vertical,
        "rake" | "pitch" => Token::Rake,
        "overturned" | "inverted" | "ot" | "ovt" => Token::Overturned,
        "upright" | "rwu" => Token::Upright,
        _ => {
            // "north-east" and "south east" are one point each.
            let joined = s.get(end).filter(|b| matches!(b, b' ' | b'-')).and_then(|_| {
                let more = s[end + 1..].iter().take_while(|b| b.is_ascii_alphabetic()).count();
                let second = std::str::from_utf8(&s[end + 1..end + 1 + more]).ok()?;
                let pair = match (letters, second) {
                    ("north", "east") => "ne",
                    ("north", "west") => "nw",
                    ("south", "east") => "se",
                    ("south", "west") => "sw",
                    _ => return None,
                };
                end += 1 + more;
                compass_point(pair)
            });
            Token::Point(joined.or_else(|| compass_point(letters))?)
        }
    };
    out.push(token)?;
    Some(end)
}

/// Whether a comma between two digits is a decimal mark. "225,30" alone has two numbers to hold, so there it is not;
/// wherever anything else parts the numbers, it is.
fn decimal_commas(s: &[u8]) -> bool {
    let inner = s.windows(3).filter(|w| w[0].is_ascii_digit() && w[1] == b',' && w[2].is_ascii_digit()).count();
    let parted = s.iter().any(|b| matches!(b, b'/' | b'|' | b';' | b'>' | b' ' | b'\\'))
        || s.windows(2).any(|w| w[0] == b',' && !w[1].is_ascii_digit() || w[1] == b',' && !w[0].is_ascii_digit());
    inner != 1 || parted || !s.first().is_some_and(u8::is_ascii_digit)
}

/// As [`tokens`], for a cell that holds one angle: there a comma is always a decimal mark.
pub(super) fn cell_tokens(text: &str) -> Option<Tokens> {
    let plain = plain(text.trim())?;
    let s = &plain.bytes[..plain.len];
    if decimal_commas(s) || !s.contains(&b',') {
        return tokens(text);
    }
    let mut copy = plain.bytes;
    copy.iter_mut().filter(|b| **b == b',').for_each(|b| *b = b'.');
    tokens(std::str::from_utf8(&copy[..plain.len]).ok()?)
}

/// Two or three numbers at the start of `items` that are degrees, minutes, seconds parted by blanks: the angle and
/// how many tokens it took.
pub(super) fn blank_parted(items: &[Token]) -> Option<(Num, usize)> {
    let mut num = match items.first()? {
        Token::Num(n) => *n,
        _ => return None,
    };
    let mut used = 1;
    if !num.whole {
        return Some((num, used));
    }
    for unit in [60.0, 3600.0] {
        match items.get(used) {
            Some(Token::Num(part)) if (0.0..60.0).contains(&part.degrees) && part.width <= 2 => {
                num.degrees += part.degrees / unit;
                num.whole = false;
                used += 1;
                if !part.whole {
                    break;
                }
            }
            _ => break,
        }
    }
    Some((num, used))
}
