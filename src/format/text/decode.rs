//! Bytes of a text file to UTF-8, as far as a byte-order mark tells.

use encoding_rs::{Encoding, UTF_8};
use std::borrow::Cow;

/// The text of a file; not checked to be UTF-8.
pub(in crate::format) struct Text<'a> {
    /// The bytes behind the byte-order mark.
    pub bytes: Cow<'a, [u8]>,
    /// The encoding, where it was another than UTF-8.
    pub encoding: Option<&'static str>,
}

/// Strips a byte-order mark, and decodes what one declares to be UTF-16.
pub(in crate::format) fn to_utf8(bytes: &[u8]) -> Text<'_> {
    match Encoding::for_bom(bytes) {
        Some((encoding, mark)) if encoding != UTF_8 => {
            let (text, _) = encoding.decode_without_bom_handling(&bytes[mark..]);
            Text { bytes: Cow::Owned(text.into_owned().into_bytes()), encoding: Some(encoding.name()) }
        }
        mark => Text { bytes: Cow::Borrowed(&bytes[mark.map_or(0, |(_, length)| length)..]), encoding: None },
    }
}
