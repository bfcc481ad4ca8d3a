//! What can be wrong with an area file.

use super::area_keys::UnknownKey;
use thiserror::Error;

/// Why an area file could not be used.
#[derive(Debug, Error)]
pub enum AreaFileError {
    /// It could not be opened.
    #[error("{file}: cannot be read: {cause}")]
    Unreadable {
        /// The file.
        file: String,
        /// What the system says.
        cause: std::io::Error,
    },
    /// It is no area file but a source of stations.
    #[error(
        "{file}: is not an area file (TOML); to run on a station file alone: homocline run --stations {file} --out FOLDER"
    )]
    NotToml {
        /// The file.
        file: String,
    },
    /// It is not text.
    #[error("{file}: is not UTF-8 text; save it as UTF-8")]
    NotUtf8 {
        /// The file.
        file: String,
    },
    /// It is not TOML, or a value has the wrong type.
    #[error("{file}, line {line}: {message}")]
    Syntax {
        /// The file.
        file: String,
        /// Line, from 1.
        line: usize,
        /// What is wrong.
        message: String,
    },
    /// A key that does not exist.
    #[error("{file}{}: {unknown}", .line.map(|l| format!(", line {l}")).unwrap_or_default())]
    UnknownKey {
        /// The file.
        file: String,
        /// Line, where it could be found.
        line: Option<usize>,
        /// The key and the nearest known one.
        unknown: Box<UnknownKey>,
    },
    /// A value that is typed right but makes no sense.
    #[error("{file}: {key} = {value}: {message}")]
    Value {
        /// The file.
        file: String,
        /// The key, with its table.
        key: String,
        /// The value as written.
        value: String,
        /// What is allowed.
        message: String,
    },
    /// Something the job needs is not there.
    #[error("{file}: {message}")]
    Missing {
        /// The file.
        file: String,
        /// What is missing, and the key that sets it.
        message: String,
    },
}

impl AreaFileError {
    /// From the parser's error, with the line counted from its position.
    pub fn syntax(file: &str, text: &str, error: &toml::de::Error) -> Self {
        let start = error.span().map_or(0, |span| span.start.min(text.len()));
        let line = text.as_bytes()[..start].iter().filter(|&&b| b == b'\n').count() + 1;
        // The parser speaks of Rust's types; the user knows numbers, texts and lists.
        let words = [
            ("a sequence", "a list"),
            ("u64", "a whole number"),
            ("u32", "a whole number"),
            ("f64", "a number"),
            (" a string", " a text"),
            ("string \"", "the text \""),
            ("map", "a table"),
        ];
        let plain = error.message().trim().replace('\n', " ");
        let message = words.iter().fold(plain, |text, (typed, said)| text.replace(typed, said));
        Self::Syntax { file: file.to_owned(), line, message }
    }
    /// A value outside what is allowed.
    pub fn value(file: &str, key: &str, value: impl ToString, message: impl Into<String>) -> Self {
        Self::Value { file: file.to_owned(), key: key.to_owned(), value: value.to_string(), message: message.into() }
    }
}
