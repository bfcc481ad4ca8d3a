//! Named streams of random numbers: each (domain, structure, purpose) has its own seed, so that no result depends
//! on threads, row order or another domain.

use sha2::{Digest, Sha256};

/// The seed of a named stream of the area's seed.
pub(super) fn seed(area: u64, domain: &str, structure: &str, purpose: &str) -> u64 {
    let mut hasher = Sha256::new();
    hasher.update(area.to_le_bytes());
    for part in [domain, structure, purpose] {
        hasher.update((part.len() as u64).to_le_bytes());
        hasher.update(part);
    }
    let hash = hasher.finalize();
    u64::from_le_bytes(hash[..8].try_into().expect("a hash is longer than 8 bytes"))
}

#[cfg(test)]
mod tests {
    use super::seed;

    #[test]
    fn streams_differ_and_repeat() {
        let one = seed(1, "north", "bedding", "sets");
        assert_eq!(one, seed(1, "north", "bedding", "sets"));
        for other in [
            seed(2, "north", "bedding", "sets"),
            seed(1, "northbedding", "", "sets"),
            seed(1, "north", "bedding", "cone"),
        ] {
            assert_ne!(one, other);
        }
    }
}
