//! What of a chart is looked at. A screen sends gestures in pixels and gets places back; it works out none.

use schemars::JsonSchema;
use serde::{Deserialize, Serialize};

use super::{Place, Typed};

/// Whose chart it is.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(tag = "of", rename_all = "snake_case", deny_unknown_fields)]
pub enum ChartOf {
    /// A form, as typed so far.
    Form {
        /// Identifier of the check.
        check: String,
        /// What is typed.
        typed: Typed,
        /// Where the check is made.
        #[serde(default)]
        place: Place,
    },
    /// A filed entry.
    Entry {
        /// The entry.
        entry: String,
    },
}

/// How a chart is looked at.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct ChartLook {
    /// Begins every identifier in the drawing, so that two charts on a page do not mix: letters and digits.
    pub name: String,
    /// Width of the paper in CSS pixels.
    pub width_px: f64,
    /// Its height.
    pub height_px: f64,
    /// Size of the text.
    pub text_px: f64,
    /// Family of lines beside relative humidity.
    #[serde(default)]
    pub family: Option<String>,
    /// What was looked at; none frames the states.
    #[serde(default)]
    pub window: Option<ChartWindow>,
    /// What was done to a drawing of that window.
    #[serde(default)]
    pub gesture: Option<ChartGesture>,
    /// Where the cross was.
    #[serde(default)]
    pub cross: Option<ChartPlace>,
    /// Where it is put on a drawing of that window.
    #[serde(default)]
    pub tap: Option<ChartPoint>,
}

/// What is looked at.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct ChartWindow {
    /// Left edge, K.
    pub coldest_k: f64,
    /// Right edge, K.
    pub warmest_k: f64,
    /// Lower edge, kg/kg.
    pub driest_kg_kg: f64,
    /// Upper edge, kg/kg.
    pub wettest_kg_kg: f64,
}

/// A drag, a pinch, or a step of zoom.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct ChartGesture {
    /// Drawn to the right by this, px.
    #[serde(default)]
    pub dx_px: f64,
    /// Drawn down by this, px.
    #[serde(default)]
    pub dy_px: f64,
    /// Made larger by this factor.
    pub zoom: f64,
    /// The point that stays where it is; none is the middle.
    #[serde(default)]
    pub about: Option<ChartPoint>,
}

/// A point of the drawing.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct ChartPoint {
    /// From the left, px.
    pub x_px: f64,
    /// From above, px.
    pub y_px: f64,
}

/// A place on the chart.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
pub struct ChartPlace {
    /// Dry bulb, K.
    pub dry_bulb_k: f64,
    /// Humidity ratio, kg/kg.
    pub humidity_ratio_kg_kg: f64,
}
