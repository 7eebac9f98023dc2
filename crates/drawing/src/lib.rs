//! Drawings of what a check gives: the psychrometric chart, and plain line graphs.
//!
//! A drawing is a tree of SVG elements ([`Node`]) in CSS pixels, one to one with the screen, so that text never scales.
//! It carries no colour: classes name what each line is (`pc-sat`, `pc-rh`), and the stylesheet of the place where it
//! is shown gives them ink. What a line is can be told by its width and its dashes alone. Beside each drawing stands
//! the same in words.
//!
//! No I/O, no clock, no JSON. Curves are worked out by `properties` point by point; nothing is fitted or stored.

mod chart;
mod cross;
mod doubt;
mod family;
mod geometry;
mod graph;
mod labels;
mod marks;
mod node;
mod plot;
mod saturation;
mod scale;
mod text;
mod window;

pub use chart::{Chart, Drawing, Legs, State, draw};
pub use cross::{Cross, read};
pub use family::{Contour, Family, contours};
pub use geometry::{Px, Rect};
pub use graph::graph;
pub use node::Node;
pub use plot::{Plot, Sheet};
pub use saturation::{Saturation, saturation};
pub use window::{Gesture, Place, Window};
