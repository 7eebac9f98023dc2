//! The psychrometric chart of one pressure: axes, saturation, families of lines, and what a check gives to be drawn.
//!
//! Dry bulb runs across, humidity ratio up the right side. Back to front: grid, fog, families, saturation, axes, what
//! happens to the air, states with their ±, marks on leaders, the cross.

mod axes;
mod curves;
mod process;
mod states;
mod words;

use dewledger_checks::doubt::StateDoubt;
use dewledger_checks::drawn::Line;
use dewledger_checks::form::Mark;
use dewledger_quantities::{Pressure, UnitChoice};

use crate::family::Family;
use crate::geometry::{Px, Rect};
use crate::labels::{Placer, Spot};
use crate::node::{Node, hundredths};
use crate::plot::{Plot, Sheet};
use crate::saturation::saturation;
use crate::text::{Anchor, bounds};
use crate::window::{Place, Window};

/// An air state to be drawn.
#[derive(Debug, Clone, PartialEq)]
pub struct State {
    /// "Entering air".
    pub label: String,
    /// Letter and shape of its place.
    pub mark: Option<Mark>,
    /// Where it is.
    pub place: Place,
    /// Its doubt; none where nothing is said of it.
    pub doubt: Option<StateDoubt>,
}

/// What the two legs of a process say.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Legs {
    /// Along the dry bulb: "33.4 kW".
    pub sensible: String,
    /// Along the humidity ratio: "7.9 kW".
    pub latent: String,
}

/// What is to be drawn.
#[derive(Debug, Clone)]
pub struct Chart<'a> {
    /// The pressure that the curves are worked out for.
    pub pressure: Pressure,
    /// The person's units.
    pub units: &'a UnitChoice,
    /// The air states, in the order of their table.
    pub states: &'a [State],
    /// Lines between states.
    pub lines: &'a [Line],
    /// What the legs of the one process say; none where there is no such process.
    pub legs: Option<Legs>,
    /// A family of lines beside relative humidity, one at a time.
    pub family: Family,
    /// What is looked at; none frames the states.
    pub window: Option<Window>,
    /// The paper.
    pub sheet: Sheet,
    /// A cross, where a person reads the chart.
    pub cross: Option<Place>,
    /// Begins every identifier in the drawing, so that two drawings on a page do not mix.
    pub id: &'a str,
}

/// A chart that was drawn.
#[derive(Debug, Clone, PartialEq)]
pub struct Drawing {
    /// The drawing.
    pub node: Node,
    /// Where what lies on it.
    pub plot: Plot,
    /// The same in words.
    pub says: String,
}

/// Draws a chart.
#[must_use]
pub fn draw(chart: &Chart<'_>) -> Drawing {
    let sheet = chart.sheet.kept();
    let window = chart.window.unwrap_or_else(|| chart.home());
    let plot = Plot::new(window, &sheet, chart.units);
    let (node, _) = Pen::new(chart, sheet, &plot).draw();
    Drawing { node, says: words::says(chart, &plot), plot }
}

impl Chart<'_> {
    /// The first look: the window that frames all that the check gives.
    #[must_use]
    pub fn home(&self) -> Window {
        let mut places: Vec<Place> = self.states.iter().map(|state| state.place).collect();
        places.extend(self.lines.iter().flat_map(process::ends));
        Window::around(&places, self.units, &self.sheet.kept())
    }
}

/// One drawing under way.
struct Pen<'a> {
    chart: &'a Chart<'a>,
    sheet: Sheet,
    plot: &'a Plot,
    placer: Placer,
}

impl<'a> Pen<'a> {
    fn new(chart: &'a Chart<'a>, sheet: Sheet, plot: &'a Plot) -> Self {
        let bounds = Rect::new(2.0, plot.area.top, plot.area.right() - 4.0, plot.area.height - 2.0);
        Self { chart, sheet, plot, placer: Placer::new(bounds) }
    }

    fn draw(mut self) -> (Node, Placer) {
        let id = self.chart.id;
        let curve = saturation(&self.plot.window, self.chart.pressure);
        let (plot_id, clear_id, hatch_id) =
            (format!("{id}-plot"), format!("{id}-clear"), format!("{id}-hatch"));
        // What counts most is placed first, and drawn last.
        let process = self.process();
        let states = self.states();
        let legs = self.leg_names();
        let fog_words = self.saturation_names(&curve);
        let (families, family_names) = self.families();

        let defs = Node::new("defs").holding([
            self.plot_clip(&plot_id),
            self.clear_clip(&clear_id, &curve),
            self.hatch(&hatch_id),
        ]);
        let clipped = |class: &str, id: &str, children: Vec<Node>| {
            Node::of("g", class).with("clip-path", format!("url(#{id})")).holding(children)
        };
        let root = Node::of("svg", "pc-chart")
            .with(
                "viewBox",
                format!("0 0 {} {}", hundredths(self.sheet.width), hundredths(self.sheet.height)),
            )
            .px("width", self.sheet.width)
            .px("height", self.sheet.height)
            .px("font-size", self.sheet.text)
            .holding([
                defs,
                clipped("pc-grid", &clear_id, self.grid()),
                clipped("pc-beyond", &plot_id, vec![self.fog(&hatch_id, &curve)]),
                clipped("pc-families", &plot_id, families),
                clipped("pc-saturation", &plot_id, self.saturation_lines(&curve)),
                self.axes(),
                Node::of("g", "pc-names").holding(fog_words.into_iter().chain(family_names)),
                clipped("pc-air", &plot_id, process),
                Node::of("g", "pc-legs").holding(legs),
                states,
            ])
            .holding(self.cross());
        (root, self.placer)
    }

    /// A path through places.
    fn path(&self, class: &str, places: impl IntoIterator<Item = Place>) -> Node {
        polyline(class, places.into_iter().map(|place| self.plot.px(&place)))
    }

    /// Words at a spot, with a halo so that they can be read on lines.
    fn words(&self, class: &str, spot: &Spot, text: &str) -> Node {
        Node::of("text", class)
            .px("x", spot.at.x)
            .px("y", spot.at.y)
            .with("text-anchor", spot.anchor.name())
            .saying(text)
    }

    /// A choice of where to put a line of text.
    fn spot(&self, text: &str, at: Px, anchor: Anchor, bold: bool, cost: f64) -> Spot {
        let fills = bounds(text, at, anchor, self.sheet.text, bold);
        Spot { at, anchor, fills, cost }
    }

    fn cross(&self) -> Option<Node> {
        let place = self.chart.cross.filter(|place| self.plot.window.holds(place))?;
        let (at, area) = (self.plot.px(&place), self.plot.area);
        let lines = Node::of("path", "pc-cross-line").with(
            "d",
            format!(
                "M{x} {}V{}M{} {y}H{}",
                hundredths(area.top),
                hundredths(area.bottom()),
                hundredths(area.left),
                hundredths(area.right()),
                x = hundredths(at.x),
                y = hundredths(at.y),
            ),
        );
        let ring = Node::of("circle", "pc-cross-ring").px("cx", at.x).px("cy", at.y).px("r", 7.0);
        Some(Node::of("g", "pc-cross").holding([lines, ring]))
    }
}

/// A path through points of the drawing.
pub(crate) fn polyline(class: &str, points: impl IntoIterator<Item = Px>) -> Node {
    let mut d = String::new();
    for (index, point) in points.into_iter().enumerate() {
        d.push(if index == 0 { 'M' } else { 'L' });
        d.push_str(&hundredths(point.x));
        d.push(' ');
        d.push_str(&hundredths(point.y));
    }
    Node::of("path", class).with("d", d)
}

#[cfg(test)]
mod tests;
