//! What is counted while rows are read, and said once at the end.

use super::attitude::Also;
use super::choose::Columns;
use super::rows::Job;
use super::value::written;
use crate::notice::{Notice, Place};
use crate::orientation::notation::Notation;

/// A count with the first example.
#[derive(Debug, Default)]
pub(super) struct Tally {
    count: usize,
    first: Option<(usize, Option<usize>)>,
}

impl Tally {
    pub fn add(&mut self, row: usize, column: Option<usize>) {
        self.count += 1;
        self.first.get_or_insert((row, column));
    }
    fn merge(&mut self, later: Self) {
        self.count += later.count;
        self.first = self.first.or(later.first);
    }
}

#[derive(Debug, Default)]
pub(super) struct Tallies {
    pub wrapped: Tally,
    /// Wrapped ones that are more than just 360.
    pub over: usize,
    pub assumed: Tally,
    pub polarity: Tally,
    pub year_only: Tally,
    followed: Tally,
    rake_unused: Tally,
    raked: Tally,
    line_unused: Tally,
    plane_unused: Tally,
    right: Tally,
    left: Tally,
}

impl Tallies {
    pub fn also(&mut self, row: usize, also: &Also, columns: &Columns) {
        let strike = columns.strike.map(|(i, _)| i);
        if also.rake_unused {
            self.rake_unused.add(row, columns.rake);
        }
        if also.raked {
            self.raked.add(row, columns.rake);
        }
        if also.followed {
            self.followed.add(row, strike);
        }
        if also.line_unused.is_some() {
            self.line_unused.add(row, also.line_unused);
        }
        if also.plane_unused.is_some() {
            self.plane_unused.add(row, also.plane_unused);
        }
        match also.hand {
            Some(Notation::LeftHand) => self.left.add(row, strike),
            Some(_) => self.right.add(row, strike),
            None => {}
        }
    }

    pub fn merge(&mut self, later: Self) {
        self.wrapped.merge(later.wrapped);
        self.over += later.over;
        self.assumed.merge(later.assumed);
        self.polarity.merge(later.polarity);
        self.year_only.merge(later.year_only);
        self.followed.merge(later.followed);
        self.rake_unused.merge(later.rake_unused);
        self.raked.merge(later.raked);
        self.line_unused.merge(later.line_unused);
        self.plane_unused.merge(later.plane_unused);
        self.right.merge(later.right);
        self.left.merge(later.left);
    }
}

/// "1 row has", "2 rows have".
fn rows(n: usize, one: &str, many: &str) -> String {
    if n == 1 { format!("1 row {one}") } else { format!("{n} rows {many}") }
}

/// Turns counts into notices.
struct Report<'a> {
    job: &'a Job<'a>,
    notices: &'a mut Vec<Notice>,
}

impl Report<'_> {
    fn name(&self, column: usize) -> &str {
        &self.job.table.fields[column].name
    }
    fn place(&self, tally: &Tally) -> Place {
        let place = Place::file(&self.job.spec.file);
        match tally.first {
            None => place,
            Some((row, None)) => place.at_row(self.job.source_row(row)),
            Some((row, Some(i))) => place.at_row(self.job.source_row(row)).in_column(self.name(i)),
        }
    }
    fn example(&self, tally: &Tally) -> String {
        match tally.first {
            Some((row, Some(i))) => written(&self.job.table.fields[i].column, row).unwrap_or_default(),
            _ => String::new(),
        }
    }
    fn row(&self, tally: &Tally) -> u64 {
        tally.first.map_or(0, |(row, _)| self.job.source_row(row))
    }

    fn wrapped(&mut self, t: &Tally, over: usize) {
        if t.count == 0 {
            return;
        }
        let text = format!(
            "{} an azimuth from 360 to 720, which was taken back by one turn; the first is {}",
            rows(t.count, "had", "had"),
            self.example(t)
        );
        let make = if over > 0 { Notice::warning } else { Notice::info };
        let notice = make("azimuth-wrapped", self.place(t), text);
        self.notices.push(notice);
    }

    fn hands(&mut self, t: &Tallies) {
        const SAY: &str = "say notation = \"right-hand\", \"left-hand\", \"dip-direction\" or \"quadrant\"";
        if t.assumed.count > 0 {
            let mut at = Place::file(&self.job.spec.file);
            if let Some(i) = self.job.columns.strike.map(|(i, _)| i).or(self.job.columns.attitude) {
                at = at.in_column(self.name(i));
            }
            let text = format!(
                "azimuths of planes were read as right-hand strike because nothing says otherwise ({})",
                rows(t.assumed.count, "", "").trim_end()
            );
            self.notices.push(Notice::info("right-hand-assumed", at, text).hint(SAY));
        }
        if t.followed.count > 0 {
            let (hand, shown) = match self.job.evidence.hand {
                Some(Notation::LeftHand) => ("left-hand", t.left.count),
                _ => ("right-hand", t.right.count),
            };
            let text = format!(
                "{} a strike without a dip direction, which was read as {hand}, as in the {shown} with both",
                rows(t.followed.count, "has", "have"),
            );
            let notice = Notice::info("hand-from-rows", self.place(&t.followed), text).hint(SAY);
            self.notices.push(notice);
        }
        if t.right.count > 0 && t.left.count > 0 {
            let text = format!(
                "right-hand and left-hand strikes occur in one source, by their dip directions: {} right-hand (the \
                 first is row {}), {} left-hand (the first is row {})",
                rows(t.right.count, "is", "are"),
                self.row(&t.right),
                rows(t.left.count, "is", "are"),
                self.row(&t.left)
            );
            let rarer = if t.left.count <= t.right.count { &t.left } else { &t.right };
            let notice = Notice::warning("hands-mixed", self.place(rarer), text).hint(
                "each was read by its dip direction; check whether the source has two habits or wrong rows, or say \
                 notation = \"right-hand\" or \"left-hand\" to have the others refused",
            );
            self.notices.push(notice);
        }
    }

    fn left_aside(&mut self, t: &Tally, read_as: &str, left: &str) {
        let columns = self.job.columns;
        let list = |of: [Option<usize>; 4]| {
            let names: Vec<&str> = of.into_iter().flatten().map(|i| self.name(i)).collect();
            names.join(", ")
        };
        if t.count == 0 {
            return;
        }
        let plane = list([columns.strike.map(|(i, _)| i), columns.dip_direction, columns.dip, None]);
        let line = list([columns.trend, columns.plunge, None, None]);
        let text = format!(
            "{} both a plane ({plane}) and a line ({line}); by the structure the {read_as} was read and the {left} left \
             aside",
            rows(t.count, "holds", "hold")
        );
        let notice = Notice::warning("plane-and-line", self.place(t), text).hint(format!(
            "to read the {left}s too, give the file twice as [[stations]], each with its notation, and azimuth, dip and \
             structure under its columns"
        ));
        self.notices.push(notice);
    }

    fn rakes(&mut self, t: &Tallies) {
        if t.rake_unused.count > 0 {
            let text = format!(
                "{} a plane and a rake, which is a line's and was left aside",
                rows(t.rake_unused.count, "has", "have")
            );
            let notice = Notice::info("rake-unused", self.place(&t.rake_unused), text)
                .hint("give the line a row of its own, with a linear structure");
            self.notices.push(notice);
        }
        if t.raked.count > 0 {
            let text = format!(
                "{} a line by its rake, counted downward in the plane from the right-hand strike direction (0 to 180) \
                 whatever the notation, or from the end that letters name (0 to 90)",
                rows(t.raked.count, "gives", "give")
            );
            let notice = Notice::info("rake-from-right-hand-strike", self.place(&t.raked), text);
            self.notices.push(notice);
        }
    }

    fn unclear(&mut self, t: &Tallies) {
        if t.polarity.count > 0 {
            let text = format!(
                "{} a polarity that does not say upright or overturned, kept as unknown; the first is {:?}",
                rows(t.polarity.count, "has", "have"),
                self.example(&t.polarity)
            );
            let notice = Notice::warning("polarity-unclear", self.place(&t.polarity), text)
                .hint("write upright, overturned or unknown");
            self.notices.push(notice);
        }
        if t.year_only.count > 0 {
            let text = format!(
                "{} a year without a day, of which the middle was taken for the declination",
                rows(t.year_only.count, "has", "have")
            );
            let notice = Notice::info("year-only", self.place(&t.year_only), text).hint("write dates as 2024-06-01");
            self.notices.push(notice);
        }
    }
}

pub(super) fn report(job: &Job<'_>, tallies: &Tallies, notices: &mut Vec<Notice>) {
    let mut report = Report { job, notices };
    report.wrapped(&tallies.wrapped, tallies.over);
    report.hands(tallies);
    report.left_aside(&tallies.line_unused, "plane", "line");
    report.left_aside(&tallies.plane_unused, "line", "plane");
    report.rakes(tallies);
    report.unclear(tallies);
}
