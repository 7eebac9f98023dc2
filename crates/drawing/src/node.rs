//! A tree of SVG elements.

use std::fmt::Write as _;

/// One SVG element: its name, attributes, text and children. Text and attributes are plain; they are escaped when the
/// tree is written.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Node {
    /// Name of the element: `path`.
    pub name: &'static str,
    /// Attributes in the order in which they were given.
    pub attributes: Vec<(&'static str, String)>,
    /// Its text; none for most.
    pub text: Option<String>,
    /// What stands in it, back to front.
    pub children: Vec<Node>,
}

impl Node {
    /// An empty element.
    #[must_use]
    pub fn new(name: &'static str) -> Self {
        Self { name, attributes: Vec::new(), text: None, children: Vec::new() }
    }

    /// An element of a class.
    pub(crate) fn of(name: &'static str, class: &str) -> Self {
        Self::new(name).with("class", class)
    }

    /// With one more attribute.
    #[must_use]
    pub fn with(mut self, name: &'static str, value: impl Into<String>) -> Self {
        self.attributes.push((name, value.into()));
        self
    }

    /// With a length or a coordinate in pixels, to a hundredth.
    pub(crate) fn px(self, name: &'static str, value: f64) -> Self {
        self.with(name, hundredths(value))
    }

    /// With a text in it.
    #[must_use]
    pub fn saying(mut self, text: impl Into<String>) -> Self {
        self.text = Some(text.into());
        self
    }

    /// With children.
    #[must_use]
    pub fn holding(mut self, children: impl IntoIterator<Item = Node>) -> Self {
        self.children.extend(children);
        self
    }

    /// Adds a child in front of the others.
    pub fn push(&mut self, child: Node) {
        self.children.push(child);
    }

    /// The value of an attribute.
    #[must_use]
    pub fn attribute(&self, name: &str) -> Option<&str> {
        self.attributes.iter().find(|(known, _)| *known == name).map(|(_, value)| value.as_str())
    }

    /// Written as SVG, the root with its namespace.
    #[must_use]
    pub fn svg(&self) -> String {
        let mut out = String::with_capacity(32 * 1024);
        self.write(&mut out, true);
        out
    }

    fn write(&self, out: &mut String, root: bool) {
        // Writing to a string cannot fail.
        let _ = write!(out, "<{}", self.name);
        if root {
            out.push_str(" xmlns=\"http://www.w3.org/2000/svg\"");
        }
        for (name, value) in &self.attributes {
            let _ = write!(out, " {name}=\"");
            escape(value, out);
            out.push('"');
        }
        if self.text.is_none() && self.children.is_empty() {
            out.push_str("/>");
            return;
        }
        out.push('>');
        if let Some(text) = &self.text {
            escape(text, out);
        }
        for child in &self.children {
            child.write(out, false);
        }
        let _ = write!(out, "</{}>", self.name);
    }
}

fn escape(text: &str, out: &mut String) {
    for character in text.chars() {
        match character {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            // XML 1.0 knows no other control characters.
            control if control.is_control() && !matches!(control, '\t' | '\n' | '\r') => {}
            other => out.push(other),
        }
    }
}

/// A number of pixels to a hundredth, without a needless end.
pub(crate) fn hundredths(value: f64) -> String {
    let rounded = (value * 100.0).round() / 100.0;
    // Adding zero takes the sign off a zero.
    format!("{}", rounded + 0.0)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_a_person_typed_stays_text() {
        let node = Node::of("text", "a\"b").saying("<script>&\u{1}").px("x", 1.005);
        assert_eq!(
            node.svg(),
            "<text xmlns=\"http://www.w3.org/2000/svg\" class=\"a&quot;b\" x=\"1\">&lt;script&gt;&amp;</text>"
        );
    }

    #[test]
    fn pixels_are_short() {
        let of = |value: f64| hundredths(value);
        assert_eq!([of(1.0), of(0.125), of(-0.001), of(12.345)], ["1", "0.13", "0", "12.35"]);
    }
}
