//! Drawings and tables as they cross to a screen.

use std::collections::BTreeMap;

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::{Act, OptionView, ResultRow};
use crate::request::{ChartPlace, ChartPoint, ChartWindow};

/// An SVG element, to be made as such: no text of it is ever read as markup.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ShapeView {
    /// Name of the element: `path`.
    pub name: String,
    /// Its attributes. Classes say what a line is; the stylesheet gives it its ink.
    pub attributes: BTreeMap<String, String>,
    /// Its text.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub text: Option<String>,
    /// What stands in it, back to front.
    #[serde(default, skip_serializing_if = "Vec::is_empty")]
    pub children: Vec<ShapeView>,
}

/// A table.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct TableView {
    /// What it shows.
    pub title: String,
    /// Heads of its columns.
    pub columns: Vec<String>,
    /// Its rows, as long as there are columns.
    pub rows: Vec<Vec<CellView>>,
}

/// What stands in a table.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CellView {
    /// The text, with its unit.
    pub text: String,
    /// It is a number: to the right.
    pub number: bool,
}

/// One result over a range of another quantity.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CurveView {
    /// What it shows.
    pub title: String,
    /// The line graph.
    pub drawing: ShapeView,
    /// The same in words.
    pub says: String,
    /// The same as a table.
    pub table: TableView,
}

/// The psychrometric chart of a check.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct ChartView {
    /// The chart.
    pub drawing: ShapeView,
    /// The same in words.
    pub says: String,
    /// The states as a table, with their ±.
    pub table: TableView,
    /// What is looked at: send it back to look at the same.
    pub window: ChartWindow,
    /// It is not the first look.
    pub moved: bool,
    /// Families of lines that can be drawn.
    pub families: Vec<OptionView>,
    /// The one that is drawn.
    pub family: String,
    /// What is read at the cross.
    pub cross: Option<CrossView>,
    /// What the outlines around the states mean, where there are any.
    pub outlines: Option<String>,
}

/// What is read at the cross of a chart.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
pub struct CrossView {
    /// Where it is: send it back to keep it there.
    pub place: ChartPlace,
    /// Where it is drawn; none outside of what is looked at.
    pub at: Option<ChartPoint>,
    /// The full state; the two coordinates alone where air cannot be.
    pub rows: Vec<ResultRow>,
    /// Why there is no air there.
    pub fog: Option<String>,
    /// One tap each: put it into a part of the form.
    pub acts: Vec<Act>,
}
