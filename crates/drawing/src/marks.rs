//! Letter and outline of a place, the same as beside its fields.

use dewledger_checks::form::{Mark, Shape};

use crate::geometry::Px;
use crate::node::{Node, hundredths};

/// Half the size of a mark over the size of the text.
const HALF: f64 = 0.86;

/// Half the width and height that a mark needs, px.
pub(crate) fn reach(text_px: f64) -> f64 {
    HALF * text_px + 1.5
}

/// A mark with its letter around `at`.
pub(crate) fn draw(mark: Mark, at: Px, text_px: f64) -> Node {
    let r = HALF * text_px;
    let path = |points: &[(f64, f64)]| {
        let mut d = String::new();
        for (index, (x, y)) in points.iter().enumerate() {
            d.push(if index == 0 { 'M' } else { 'L' });
            d.push_str(&hundredths(at.x + x * r));
            d.push(' ');
            d.push_str(&hundredths(at.y + y * r));
        }
        d.push('Z');
        Node::of("path", "pc-mark").with("d", d)
    };
    let (outline, lowered) = match mark.shape {
        Shape::Circle => {
            (Node::of("circle", "pc-mark").px("cx", at.x).px("cy", at.y).px("r", 0.95 * r), 0.34)
        }
        Shape::Square => {
            (path(&[(-0.85, -0.85), (0.85, -0.85), (0.85, 0.85), (-0.85, 0.85)]), 0.34)
        }
        Shape::Triangle => (path(&[(0.0, -1.2), (1.2, 0.95), (-1.2, 0.95)]), 0.52),
        Shape::HangingTriangle => (path(&[(0.0, 1.2), (1.2, -0.95), (-1.2, -0.95)]), 0.12),
        Shape::Diamond => (path(&[(0.0, -1.2), (1.2, 0.0), (0.0, 1.2), (-1.2, 0.0)]), 0.34),
    };
    let letter = Node::of("text", "pc-letter")
        .px("x", at.x)
        .px("y", at.y + lowered * text_px)
        .with("text-anchor", "middle")
        .px("font-size", 0.92 * text_px)
        .saying(mark.letter.to_string());
    Node::new("g").holding([outline, letter])
}
