//! A sum that does not depend on the order of its terms.
//!
//! Floating-point addition is not associative, so a tensor summed by two threads, or from shuffled rows,
//! would differ in its last digits. Here every term is rounded once to a multiple of 2^-64 and added as an
//! integer, which is associative: the same readings give the same bits in any order and any split.

use std::iter::Sum;
use std::ops::{Add, AddAssign};

/// Fixed-point sum with a resolution of 2^-64. Terms must be finite and below 2^40 in size; up to 2^22 of
/// the largest fit. Readings' terms are products of unit-vector components and weights of at most 1e6.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct ExactSum(i128);

/// 2^64, the unit of the fixed point.
const UNIT: f64 = 18_446_744_073_709_551_616.0;

impl ExactSum {
    /// The largest term allowed, 2^40.
    pub const LARGEST_TERM: f64 = 1_099_511_627_776.0;

    /// The sum of one term.
    pub fn of(term: f64) -> Self {
        debug_assert!(term.abs() <= Self::LARGEST_TERM, "{term} is outside the range of an exact sum");
        // Scaling by a power of two is exact; the cast rounds towards zero, at most 2^-64.
        Self((term * UNIT) as i128)
    }
    /// One more term.
    pub fn add_term(&mut self, term: f64) {
        self.0 += Self::of(term).0;
    }
    /// The sum as a double.
    pub fn value(self) -> f64 {
        self.0 as f64 / UNIT
    }
}

impl Add for ExactSum {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self(self.0 + other.0)
    }
}

impl AddAssign for ExactSum {
    fn add_assign(&mut self, other: Self) {
        self.0 += other.0;
    }
}

impl Sum for ExactSum {
    fn sum<I: Iterator<Item = Self>>(terms: I) -> Self {
        terms.fold(Self::default(), Add::add)
    }
}

impl FromIterator<f64> for ExactSum {
    fn from_iter<I: IntoIterator<Item = f64>>(terms: I) -> Self {
        terms.into_iter().map(Self::of).sum()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn order_does_not_matter_where_it_does_for_floats() {
        let terms: Vec<f64> = (1..=10_000).map(|i| (i as f64).sin() / (i as f64)).collect();
        let forward: f64 = terms.iter().sum();
        let backward: f64 = terms.iter().rev().sum();
        assert_ne!(forward, backward, "the naive sum is expected to show the trouble");
        let exact: ExactSum = terms.iter().copied().collect();
        assert_eq!(exact, terms.iter().rev().copied().collect());
        assert!((exact.value() - forward).abs() < 1e-12);
    }

    #[test]
    fn beats_the_naive_sum_of_many_tenths() {
        let exact: ExactSum = std::iter::repeat_n(0.1, 1_000_000).collect();
        let naive: f64 = std::iter::repeat_n(0.1, 1_000_000).sum();
        // The true sum of a million doubles nearest 0.1 is 100000.00000000000555.
        assert!((exact.value() - 100_000.0).abs() < 1e-10);
        assert!((naive - 100_000.0).abs() > 1e-7);
    }
}
