//! From a source as the user names it to where it lies.

use std::path::{Path, PathBuf};

/// A source as named in the area file or on the command line, and where that is.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Located {
    /// As the user named it, without its layer: what messages and outputs say.
    pub named: String,
    /// Where it lies.
    pub location: PathBuf,
    /// The layer, where one was named with `file:layer`.
    pub layer: Option<String>,
}

impl Located {
    /// `named` relative to `base`. GDAL's virtual paths and connection strings are left as they are. A layer
    /// may follow a colon, unless the whole is a file.
    pub fn new(named: &str, base: &Path) -> Self {
        let whole = Self { named: named.to_owned(), location: resolved(named, base), layer: None };
        if whole.location.exists() || is_connection(named) {
            return whole;
        }
        match named.rsplit_once(':') {
            // One letter before the colon is a drive, not a file.
            Some((file, layer)) if file.len() > 1 && !layer.is_empty() && !layer.contains(['/', '\\']) => {
                Self { named: file.to_owned(), location: resolved(file, base), layer: Some(layer.to_owned()) }
            }
            _ => whole,
        }
    }
}

fn resolved(named: &str, base: &Path) -> PathBuf {
    if named.starts_with("/vsi") || is_connection(named) { PathBuf::from(named) } else { base.join(named) }
}

/// A database or service that GDAL opens by a connection string: letters, a colon, and no path.
fn is_connection(named: &str) -> bool {
    let Some((scheme, _)) = named.split_once(':') else { return false };
    scheme.len() > 1 && scheme.bytes().all(|b| b.is_ascii_uppercase() || b.is_ascii_digit())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn layers_follow_a_colon_and_connections_stay_whole() {
        let base = Path::new("/home/field");
        let at = |named: &str| {
            let l = Located::new(named, base);
            (l.location.display().to_string(), l.layer)
        };
        assert_eq!(at("a.csv"), ("/home/field/a.csv".into(), None));
        assert_eq!(at("a.gpkg:domains"), ("/home/field/a.gpkg".into(), Some("domains".into())));
        assert_eq!(at("/abs/a.gpkg:d"), ("/abs/a.gpkg".into(), Some("d".into())));
        assert_eq!(at("PG:dbname=x"), ("PG:dbname=x".into(), None));
        assert_eq!(at("/vsizip/x.zip/a.shp"), ("/vsizip/x.zip/a.shp".into(), None));
        assert_eq!(at("/vsizip/x.zip/a.gpkg:d"), ("/vsizip/x.zip/a.gpkg".into(), Some("d".into())));
    }

    #[test]
    fn a_file_with_a_colon_in_its_name_is_a_file() {
        let home = tempfile::tempdir().unwrap();
        std::fs::write(home.path().join("a:b"), "").unwrap();
        assert_eq!(Located::new("a:b", home.path()).layer, None);
    }
}
