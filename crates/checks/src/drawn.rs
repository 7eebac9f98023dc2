//! What a check gives to be drawn or laid out beside its results: lines between states, curves, tables.

use dewledger_properties::MoistAir;
use dewledger_quantities::{Amount, Sentence};

use crate::form::Text;

/// A line between two states on the psychrometric chart.
#[derive(Debug, Clone)]
pub struct Line {
    /// Where it starts.
    pub from: MoistAir,
    /// Where it ends.
    pub to: MoistAir,
    /// What it stands for.
    pub kind: LineKind,
}

/// What a line on the chart stands for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum LineKind {
    /// What happens to the air, in the direction of the arrow.
    Process,
    /// Between two streams that are mixed: the mixture lies on it.
    Mixing,
    /// A process carried on beyond its end, as a coil's to its apparatus dew point.
    CarriedOn,
}

/// One result as it would be over a range of another quantity.
#[derive(Debug, Clone, PartialEq)]
pub struct Curve {
    /// What it shows.
    pub title: Text,
    /// What runs along the bottom.
    pub across: Text,
    /// What runs up the side.
    pub up: Text,
    /// Points in the order of the first amount.
    pub points: Vec<(Amount, Amount)>,
    /// Points with a name of their own.
    pub marks: Vec<(Text, Amount, Amount)>,
}

/// A table that is a result in itself: where to hold a probe, what each rule says.
#[derive(Debug, Clone, PartialEq)]
pub struct Table {
    /// What it shows.
    pub title: Text,
    /// Heads of its columns.
    pub columns: Vec<Text>,
    /// Its rows, as long as there are columns.
    pub rows: Vec<Vec<Cell>>,
}

/// What stands in a table.
#[derive(Debug, Clone, PartialEq)]
pub enum Cell {
    /// A quantity, shown in the person's unit.
    Amount(Amount),
    /// Words.
    Words(Sentence),
}
