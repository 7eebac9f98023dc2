//! How much room words take. The face is the screen's own, so this is an estimate on the wide side.

use crate::geometry::{Px, Rect};

/// Width of a character over the size of the text, of the sans face of the screens, from its own metrics in groups.
fn em(character: char) -> f64 {
    match character {
        'i' | 'j' | 'l' | '.' | ',' | ':' | ';' | '\'' | '’' | '|' | ' ' | '\u{a0}' => 0.28,
        'f' | 't' | 'r' | 'I' | '(' | ')' | '/' | '°' => 0.40,
        'm' | 'w' | 'M' | 'W' | '%' => 0.88,
        'A'..='Z' => 0.68,
        '0'..='9' | '−' | '+' | '±' => 0.63,
        _ => 0.57,
    }
}

/// Width of a line of text, px.
pub(crate) fn width(text: &str, size_px: f64, bold: bool) -> f64 {
    let ems: f64 = text.chars().map(em).sum();
    ems * size_px * if bold { 1.05 } else { 1.0 }
}

/// Where the anchor of a text is.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum Anchor {
    Start,
    Middle,
    End,
}

impl Anchor {
    pub(crate) const fn name(self) -> &'static str {
        match self {
            Anchor::Start => "start",
            Anchor::Middle => "middle",
            Anchor::End => "end",
        }
    }

    /// Left edge of a text of this width.
    fn left(self, x: f64, width: f64) -> f64 {
        match self {
            Anchor::Start => x,
            Anchor::Middle => x - width / 2.0,
            Anchor::End => x - width,
        }
    }
}

/// The box that a line of text fills when its baseline begins at `at`.
pub(crate) fn bounds(text: &str, at: Px, anchor: Anchor, size_px: f64, bold: bool) -> Rect {
    let width = width(text, size_px, bold);
    Rect::new(anchor.left(at.x, width), at.y - 0.8 * size_px, width, 1.05 * size_px)
}
