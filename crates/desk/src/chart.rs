//! The psychrometric chart of a form or an entry: drawn, moved, read at a cross, put into the form.

use dewledger_checks::doubt::COVERAGE_95;
use dewledger_checks::form::{Item, Mark, Section, Shape};
use dewledger_drawing::{
    Chart, Cross, Family, Gesture, Legs, Place, Plot, Px, Sheet, State, Window, draw, read,
};
use dewledger_ledger::RecordId;
use dewledger_properties::MoistAir;
use dewledger_quantities::{
    Amount, HumidityRatio, Kind, Pressure, Quantity, ThermodynamicTemperature, UnitChoice, show,
    show_to, show_with,
};

use crate::answer::{Answer, StoredState};
use crate::desk::Asked;
use crate::drafts::check;
use crate::drawn::{StoredLine, shape};
use crate::entries;
use crate::form_view::work;
use crate::places;
use crate::reply::{
    Act, CellView, Change, ChartView, CrossView, Fault, FaultCode, OptionView, Reply, TableView,
};
use crate::request::{ChartLook, ChartOf, ChartPlace, ChartPoint, ChartWindow};
use crate::result_view;
use crate::typed::read_check;

/// The chart of a form or an entry as it is looked at.
pub(crate) fn chart(at: &Asked<'_>, of: &ChartOf, look: &ChartLook) -> Result<Reply, Fault> {
    let units = &at.state.units;
    let (answer, sections) = match of {
        ChartOf::Form { check: id, typed, place } => {
            let check = check(id)?;
            let around = places::around(at, place, id, None)?;
            let sections = read_check(check, typed, units, &around.bench).sections;
            (work(check, typed, &around, units).answer, sections)
        }
        ChartOf::Entry { entry } => {
            let record =
                RecordId::Entry(entry.parse().map_err(|_| Fault::not_found("That entry"))?);
            let head = at.state.ledger.head(record)?;
            (entries::filed(&head).map(|filed| filed.answer), Vec::new())
        }
    };
    answer
        .filter(|answer| !answer.states.is_empty())
        .and_then(|answer| Looked::of(&answer, &sections, look, units))
        .map(|view| Reply::Chart(Box::new(view)))
        .ok_or_else(|| Fault::new(FaultCode::NotSolved, "There is no air state to draw yet."))
}

/// One look at the chart of an answer.
struct Looked<'a> {
    answer: &'a Answer,
    sections: &'a [Section],
    pressure: Pressure,
    units: &'a UnitChoice,
}

impl Looked<'_> {
    fn of(
        answer: &Answer,
        sections: &[Section],
        look: &ChartLook,
        units: &UnitChoice,
    ) -> Option<ChartView> {
        let pressure_pa =
            answer.pressure_pa.or_else(|| answer.states.first().map(|state| state.pressure_pa))?;
        Looked { answer, sections, pressure: Pressure::from_si(pressure_pa), units }.view(look)
    }

    fn view(&self, look: &ChartLook) -> Option<ChartView> {
        let states: Vec<State> = self.answer.states.iter().map(state).collect();
        let lines: Vec<_> = self.answer.lines.iter().filter_map(StoredLine::line).collect();
        let sheet =
            Sheet { width: look.width_px, height: look.height_px, text: look.text_px }.kept();
        let family = look
            .family
            .as_deref()
            .and_then(|id| Family::ALL.into_iter().find(|family| family.id() == id))
            .unwrap_or(Family::RelativeHumidity);
        let id: String = look.name.chars().filter(char::is_ascii_alphanumeric).collect();
        let mut chart = Chart {
            pressure: self.pressure,
            units: self.units,
            states: &states,
            lines: &lines,
            legs: self.legs(),
            family,
            window: None,
            sheet,
            cross: None,
            id: if id.is_empty() { "chart" } else { &id },
        };
        let home = chart.home();
        let before = look.window.map_or(home, window);
        let plot = Plot::new(before, &sheet, self.units);
        chart.cross = look.tap.map(|tap| plot.nearest(px(tap))).or_else(|| look.cross.map(place));
        let after = look.gesture.map_or(before, |gesture| {
            let middle = Px {
                x: plot.area.left + 0.5 * plot.area.width,
                y: plot.area.top + 0.5 * plot.area.height,
            };
            let gesture = Gesture {
                dx: gesture.dx_px,
                dy: gesture.dy_px,
                zoom: gesture.zoom,
                about: gesture.about.map_or(middle, px),
            };
            before.after(gesture, &sheet, self.units)
        });
        chart.window = Some(after);
        let drawing = draw(&chart);
        let outlined = states.iter().filter_map(|state| state.doubt).any(|doubt| {
            doubt.dry_bulb_k.is_some_and(|u| u > 0.0)
                && doubt.humidity_ratio_kg_kg.is_some_and(|u| u > 0.0)
        });
        Some(ChartView {
            drawing: shape(drawing.node),
            says: drawing.says,
            table: self.table(&states),
            window: ChartWindow {
                coldest_k: after.coldest.si(),
                warmest_k: after.warmest.si(),
                driest_kg_kg: after.driest.si(),
                wettest_kg_kg: after.wettest.si(),
            },
            moved: after != home,
            families: Family::ALL
                .into_iter()
                .map(|family| OptionView {
                    value: family.id().to_owned(),
                    label: family.short().to_owned(),
                    help: Some(family.help().to_owned()),
                })
                .collect(),
            family: family.id().to_owned(),
            cross: chart.cross.map(|place| self.cross(place, &drawing.plot)),
            outlines: outlined.then(|| {
                "A dotted outline holds the whole state, dry bulb and humidity ratio together, 95 times in 100."
                    .to_owned()
            }),
        })
    }

    /// What the legs of the one process say, where both parts are known.
    fn legs(&self) -> Option<Legs> {
        let part = |role: &str| {
            let figure = self.answer.figures.iter().find(|figure| figure.role == role)?;
            result_view::in_words(figure, self.units)
        };
        Some(Legs { sensible: part("sensible_part")?, latent: part("latent_part")? })
    }

    /// The states with the ± of what is drawn.
    fn table(&self, states: &[State]) -> TableView {
        let cell = |amount: Amount, u: Option<f64>, known: bool| {
            let unit = self.units.get(amount.kind());
            let text = match u.filter(|u| *u > 0.0) {
                Some(u) => {
                    let (value, width) = show_with(amount, COVERAGE_95 * u, unit);
                    format!("{} ±\u{a0}{}", value.text(), width.number)
                }
                None if known => show(amount, unit).text(),
                None => format!("{} ±\u{a0}not\u{a0}known", show(amount, unit).text()),
            };
            CellView { text, number: true }
        };
        let row = |state: &State| {
            let name = match state.mark {
                Some(mark) => format!("{} {}", mark.letter, state.label),
                None => state.label.clone(),
            };
            let doubt = state.doubt.as_ref();
            let dry_bulb = doubt.and_then(|doubt| doubt.dry_bulb_k);
            let humidity_ratio = doubt.and_then(|doubt| doubt.humidity_ratio_kg_kg);
            vec![
                CellView { text: name, number: false },
                cell(
                    state.place.dry_bulb.amount(),
                    dry_bulb,
                    doubt.is_none() || dry_bulb.is_some(),
                ),
                cell(
                    state.place.humidity_ratio.amount(),
                    humidity_ratio,
                    doubt.is_none() || humidity_ratio.is_some(),
                ),
            ]
        };
        TableView {
            title: "The same as a table".to_owned(),
            columns: ["State", "Dry bulb", "Humidity ratio"].map(str::to_owned).to_vec(),
            rows: states.iter().map(row).collect(),
        }
    }

    fn cross(&self, place: Place, plot: &Plot) -> CrossView {
        let at = plot.window.holds(&place).then(|| plot.px(&place));
        let (rows, fog, acts) = match read(&place, self.pressure) {
            Cross::Air(air) => {
                (result_view::state_rows(&air, None, self.units), None, self.acts(&air))
            }
            Cross::Fog { most } => {
                let text = |amount: Amount| show(amount, self.units.get(amount.kind())).text();
                let says = format!(
                    "Fog: air of {} holds {} at most here.",
                    text(place.dry_bulb.amount()),
                    text(most.amount()),
                );
                let amounts = [
                    ("dry_bulb", "Dry bulb", place.dry_bulb.amount()),
                    ("humidity_ratio", "Water in all", place.humidity_ratio.amount()),
                ];
                let row =
                    |(key, label, amount)| result_view::plain_row(key, label, amount, self.units);
                (amounts.map(row).to_vec(), Some(says), Vec::new())
            }
        };
        CrossView {
            place: ChartPlace {
                dry_bulb_k: place.dry_bulb.si(),
                humidity_ratio_kg_kg: place.humidity_ratio.si(),
            },
            at: at.map(|at| ChartPoint { x_px: at.x, y_px: at.y }),
            rows,
            fog,
            acts,
        }
    }

    /// One act for each part of the form that asks for an air state, by the humidity that is read there.
    fn acts(&self, air: &MoistAir) -> Vec<Act> {
        self.sections.iter().filter_map(|section| self.act(section, air)).collect()
    }

    fn act(&self, section: &Section, air: &MoistAir) -> Option<Act> {
        let mut dry_bulb = None;
        let mut humidity = None;
        for item in &section.items {
            let Item::Reading(item) = item else { continue };
            if item.key.ends_with(".dry_bulb") && item.kind == Kind::Temperature {
                dry_bulb = Some(item.key.to_string());
            } else if let (Some(_), Some((_, by))) = (&item.pick, item.key.rsplit_once('.')) {
                humidity = humidity_of(air, by).map(|amount| (item.key.to_string(), amount));
            }
        }
        let (humidity_key, humidity) = humidity?;
        let put = |key: String, amount: Amount| {
            let unit = self.units.get(amount.kind());
            // Finer than an instrument shows, so that rounding puts no air beyond saturation.
            let text = show_to(amount, unit.decimals(amount.kind()) + 1, unit).number;
            Change::Type { key, text, unit: unit.id.to_owned() }
        };
        Some(Act {
            label: format!("Put the cross into {}", lower_first(&section.title)),
            changes: vec![put(dry_bulb?, air.dry_bulb().amount()), put(humidity_key, humidity)],
        })
    }
}

fn lower_first(text: &str) -> String {
    let mut characters = text.chars();
    characters
        .next()
        .map_or_else(String::new, |first| first.to_lowercase().chain(characters).collect())
}

/// The humidity that is read by this identifier; none where the air has none.
fn humidity_of(air: &MoistAir, by: &str) -> Option<Amount> {
    match by {
        "wet_bulb" => Some(air.wet_bulb().ok()?.reading().amount()),
        "relative_humidity" => Some(air.relative_humidity().amount()),
        "relative_humidity_over_ice" => Some(air.relative_humidity_over_ice().amount()),
        "dew_point" => Some(air.dew_point().ok()?.amount()),
        "frost_point" => Some(air.frost_point().ok()?.amount()),
        "humidity_ratio" => Some(air.humidity_ratio().amount()),
        "enthalpy" => Some(air.enthalpy().amount()),
        _ => None,
    }
}

fn px(point: ChartPoint) -> Px {
    Px { x: point.x_px, y: point.y_px }
}

fn window(window: ChartWindow) -> Window {
    Window::si((window.coldest_k, window.warmest_k), (window.driest_kg_kg, window.wettest_kg_kg))
}

fn place(place: ChartPlace) -> Place {
    Place {
        dry_bulb: ThermodynamicTemperature::from_si(place.dry_bulb_k),
        humidity_ratio: HumidityRatio::from_si(place.humidity_ratio_kg_kg),
    }
}

fn state(state: &StoredState) -> State {
    State {
        label: state.label.clone(),
        mark: state.mark.as_ref().and_then(|(letter, shape)| {
            let shape = match shape.as_str() {
                "square" => Shape::Square,
                "triangle" => Shape::Triangle,
                "hanging_triangle" => Shape::HangingTriangle,
                "diamond" => Shape::Diamond,
                _ => Shape::Circle,
            };
            Some(Mark { letter: letter.chars().next()?, shape })
        }),
        place: Place {
            dry_bulb: ThermodynamicTemperature::from_si(state.dry_bulb_k),
            humidity_ratio: HumidityRatio::from_si(state.humidity_ratio_kg_kg),
        },
        doubt: state.doubt.map(crate::drawn::StoredStateDoubt::doubt),
    }
}
