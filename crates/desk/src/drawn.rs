//! What a check gives to be drawn or laid out, as it is stored with an answer, and as it is shown.

use dewledger_checks::doubt::StateDoubt;
use dewledger_checks::drawn::{Cell, Curve, Line, LineKind, Table};
use dewledger_drawing::{Node, Sheet, graph};
use dewledger_properties::MoistAir;
use dewledger_quantities::{
    Amount, HumidityRatio, Kind, Pressure, Quantity, ThermodynamicTemperature, UnitChoice, show,
};
use serde::{Deserialize, Serialize};

use crate::answer::{Answer, StoredAmount, Words};
use crate::reply::{CellView, CurveView, ShapeView, TableView};

/// A stored line between two states.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredLine {
    kind: String,
    from: StoredAir,
    to: StoredAir,
}

/// A stored end of a line.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
struct StoredAir {
    dry_bulb_k: f64,
    humidity_ratio_kg_kg: f64,
    pressure_pa: f64,
}

impl StoredAir {
    fn of(air: &MoistAir) -> Self {
        Self {
            dry_bulb_k: air.dry_bulb().si(),
            humidity_ratio_kg_kg: air.humidity_ratio().si(),
            pressure_pa: air.pressure().si(),
        }
    }

    fn air(self) -> MoistAir {
        MoistAir::unchecked(
            ThermodynamicTemperature::from_si(self.dry_bulb_k),
            HumidityRatio::from_si(self.humidity_ratio_kg_kg),
            Pressure::from_si(self.pressure_pa),
        )
    }
}

impl StoredLine {
    pub(crate) fn of(line: &Line) -> Self {
        let kind = match line.kind {
            LineKind::Process => "process",
            LineKind::Mixing => "mixing",
            LineKind::CarriedOn => "carried_on",
        };
        Self { kind: kind.to_owned(), from: StoredAir::of(&line.from), to: StoredAir::of(&line.to) }
    }

    /// The line; none of a kind that this version does not know.
    pub(crate) fn line(&self) -> Option<Line> {
        let kind = match self.kind.as_str() {
            "process" => LineKind::Process,
            "mixing" => LineKind::Mixing,
            "carried_on" => LineKind::CarriedOn,
            _ => return None,
        };
        Some(Line { from: self.from.air(), to: self.to.air(), kind })
    }
}

/// The stored doubt of a state: standard uncertainties and how far they go together.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredStateDoubt {
    dry_bulb_k: Option<f64>,
    humidity_ratio_kg_kg: Option<f64>,
    correlation: f64,
}

impl StoredStateDoubt {
    pub(crate) fn of(doubt: &StateDoubt) -> Self {
        Self {
            dry_bulb_k: doubt.dry_bulb_k,
            humidity_ratio_kg_kg: doubt.humidity_ratio_kg_kg,
            correlation: doubt.correlation,
        }
    }

    pub(crate) fn doubt(self) -> StateDoubt {
        StateDoubt {
            dry_bulb_k: self.dry_bulb_k,
            humidity_ratio_kg_kg: self.humidity_ratio_kg_kg,
            correlation: self.correlation,
        }
    }
}

/// A stored curve.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredCurve {
    title: String,
    across: String,
    up: String,
    /// Quantities of the two.
    across_quantity: String,
    up_quantity: String,
    /// Points in stored SI units.
    points: Vec<(f64, f64)>,
    marks: Vec<(String, f64, f64)>,
}

impl StoredCurve {
    /// The curve as stored; none without a point.
    pub(crate) fn of(curve: &Curve) -> Option<Self> {
        let (across, up) = curve.points.first()?;
        Some(Self {
            title: curve.title.to_string(),
            across: curve.across.to_string(),
            up: curve.up.to_string(),
            across_quantity: across.kind().id().to_owned(),
            up_quantity: up.kind().id().to_owned(),
            points: curve.points.iter().map(|(across, up)| (across.si(), up.si())).collect(),
            marks: curve
                .marks
                .iter()
                .map(|(name, across, up)| (name.to_string(), across.si(), up.si()))
                .collect(),
        })
    }

    fn curve(&self) -> Option<Curve> {
        let across = Kind::from_id(&self.across_quantity)?;
        let up = Kind::from_id(&self.up_quantity)?;
        let amounts = |a: f64, u: f64| (Amount::new(across, a), Amount::new(up, u));
        Some(Curve {
            title: self.title.clone().into(),
            across: self.across.clone().into(),
            up: self.up.clone().into(),
            points: self.points.iter().map(|(a, u)| amounts(*a, *u)).collect(),
            marks: self
                .marks
                .iter()
                .map(|(name, a, u)| {
                    let (across, up) = amounts(*a, *u);
                    (name.clone().into(), across, up)
                })
                .collect(),
        })
    }
}

/// A stored table.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
pub(crate) struct StoredTable {
    title: String,
    columns: Vec<String>,
    rows: Vec<Vec<StoredCell>>,
}

/// What stands in a stored table.
#[derive(Debug, Clone, PartialEq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
enum StoredCell {
    Amount(StoredAmount),
    Words(Words),
}

impl StoredTable {
    pub(crate) fn of(table: &Table) -> Self {
        let cell = |cell: &Cell| match cell {
            Cell::Amount(amount) => StoredCell::Amount(StoredAmount::of(*amount)),
            Cell::Words(words) => StoredCell::Words(Words::of(words)),
        };
        Self {
            title: table.title.to_string(),
            columns: table.columns.iter().map(ToString::to_string).collect(),
            rows: table.rows.iter().map(|row| row.iter().map(cell).collect()).collect(),
        }
    }

    fn view(&self, units: &UnitChoice) -> TableView {
        let cell = |cell: &StoredCell| match cell {
            StoredCell::Amount(amount) => number(amount.amount(), units),
            StoredCell::Words(words) => CellView { text: words.say(units), number: false },
        };
        TableView {
            title: self.title.clone(),
            columns: self.columns.clone(),
            rows: self.rows.iter().map(|row| row.iter().map(cell).collect()).collect(),
        }
    }
}

fn number(amount: Amount, units: &UnitChoice) -> CellView {
    CellView { text: show(amount, units.get(amount.kind())).text(), number: true }
}

/// The paper of a curve: as wide as the text of a phone.
const CURVE_SHEET: Sheet = Sheet { width: 340.0, height: 240.0, text: 14.0 };
/// A curve's table holds about this many of its points.
const CURVE_ROWS: usize = 11;

/// The curves of an answer, drawn, and as tables.
pub(crate) fn curves(answer: &Answer, units: &UnitChoice) -> Vec<CurveView> {
    let drawn = answer.curves.iter().filter_map(StoredCurve::curve);
    drawn.filter_map(|curve| curve_view(&curve, units)).collect()
}

fn curve_view(curve: &Curve, units: &UnitChoice) -> Option<CurveView> {
    let node = graph(curve, units, CURVE_SHEET)?;
    let text = |amount: Amount| show(amount, units.get(amount.kind())).text();
    let (first, last) = (curve.points.first()?, curve.points.last()?);
    let mut says = format!(
        "{}: {} is {} at {} and {} at {}.",
        curve.title,
        curve.up,
        text(first.1),
        text(first.0),
        text(last.1),
        text(last.0),
    );
    for (name, across, up) in &curve.marks {
        says.push_str(&format!(" {name}: {} at {}.", text(*up), text(*across)));
    }
    let every = curve.points.len().div_ceil(CURVE_ROWS).max(1);
    let end = curve.points.len() - 1;
    let rows = curve
        .points
        .iter()
        .enumerate()
        .filter(|(index, _)| index % every == 0 || *index == end)
        .map(|(_, (across, up))| vec![number(*across, units), number(*up, units)])
        .collect();
    Some(CurveView {
        title: curve.title.to_string(),
        drawing: shape(node),
        says,
        table: TableView {
            title: format!("{}, as a table", curve.title),
            columns: vec![curve.across.to_string(), curve.up.to_string()],
            rows,
        },
    })
}

/// The tables of an answer.
pub(crate) fn tables(answer: &Answer, units: &UnitChoice) -> Vec<TableView> {
    answer.tables.iter().map(|table| table.view(units)).collect()
}

/// A drawing as it crosses to a screen.
pub(crate) fn shape(node: Node) -> ShapeView {
    ShapeView {
        name: node.name.to_owned(),
        attributes: node
            .attributes
            .into_iter()
            .map(|(name, value)| (name.to_owned(), value))
            .collect(),
        text: node.text,
        children: node.children.into_iter().map(shape).collect(),
    }
}
