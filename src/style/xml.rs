//! A small tree of XML elements, written by quick-xml, which does the escaping.

use quick_xml::Writer;
use quick_xml::events::{BytesDecl, BytesEnd, BytesStart, BytesText, Event};
use std::io;

/// An element with its attributes and what it holds.
#[derive(Debug, Clone)]
pub(super) struct Element {
    name: &'static str,
    attributes: Vec<(&'static str, String)>,
    children: Vec<Element>,
    text: Option<String>,
}

/// An empty element.
pub(super) fn element(name: &'static str) -> Element {
    Element { name, attributes: Vec::new(), children: Vec::new(), text: None }
}

impl Element {
    /// The same with an attribute.
    pub fn with(mut self, name: &'static str, value: impl ToString) -> Self {
        self.attributes.push((name, value.to_string()));
        self
    }
    /// The same with a child at the end.
    pub fn child(mut self, child: Element) -> Self {
        self.children.push(child);
        self
    }
    /// The same with children at the end.
    pub fn children(mut self, children: impl IntoIterator<Item = Element>) -> Self {
        self.children.extend(children);
        self
    }
    /// The same holding text.
    pub fn text(mut self, text: impl ToString) -> Self {
        self.text = Some(text.to_string());
        self
    }

    /// A whole document, in UTF-8, with a comment before the root.
    pub fn document(&self, comment: &str) -> String {
        let mut writer = Writer::new_with_indent(Vec::new(), b' ', 1);
        let written = (|| {
            writer.write_event(Event::Decl(BytesDecl::new("1.0", Some("UTF-8"), None)))?;
            if !comment.is_empty() {
                writer.write_event(Event::Comment(BytesText::from_escaped(format!(" {comment} "))))?;
            }
            self.write(&mut writer)
        })();
        // Writing to memory fails for want of memory alone, which ends the program anyway.
        debug_assert!(written.is_ok());
        let mut text = String::from_utf8_lossy(&writer.into_inner()).into_owned();
        text.push('\n');
        text
    }

    fn write(&self, writer: &mut Writer<Vec<u8>>) -> io::Result<()> {
        let mut start = BytesStart::new(self.name);
        for (name, value) in &self.attributes {
            start.push_attribute((*name, value.as_str()));
        }
        if self.children.is_empty() && self.text.is_none() {
            return writer.write_event(Event::Empty(start));
        }
        writer.write_event(Event::Start(start))?;
        if let Some(text) = &self.text {
            writer.write_event(Event::Text(BytesText::new(text)))?;
        }
        for child in &self.children {
            child.write(writer)?;
        }
        writer.write_event(Event::End(BytesEnd::new(self.name)))
    }
}
