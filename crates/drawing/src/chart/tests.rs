use dewledger_checks::drawn::{Curve, LineKind};
use dewledger_properties::{Humidity, MoistAir, settle};
use dewledger_quantities::{
    Amount, Enthalpy, HumidityRatio, Kind, Quantity, RelativeHumidity, ThermodynamicTemperature,
};

use super::process::mixtures;
use super::*;
use crate::cross::{Cross, read};

const SEA_LEVEL: f64 = 101_325.0;
const HIGH: f64 = 70_109.0;
const PHONE: Sheet = Sheet { width: 358.0, height: 396.0, text: 14.0 };
const WIDE: Sheet = Sheet { width: 680.0, height: 560.0, text: 14.0 };

fn air(celsius: f64, rh: f64, pressure: f64) -> MoistAir {
    MoistAir::new(
        ThermodynamicTemperature::from_si(celsius + 273.15),
        Humidity::RelativeHumidity(RelativeHumidity::from_si(rh)),
        Pressure::from_si(pressure),
    )
    .unwrap()
}

fn state(label: &str, mark: Mark, air: &MoistAir) -> State {
    State {
        label: label.to_owned(),
        mark: Some(mark),
        place: process::place(air),
        doubt: Some(StateDoubt {
            dry_bulb_k: Some(0.15),
            humidity_ratio_kg_kg: Some(2e-4),
            correlation: -0.4,
        }),
    }
}

/// A coil with its line carried on; two streams mixed; one state alone: (states, lines, whether legs are known).
fn cases(pressure: f64) -> Vec<(Vec<State>, Vec<Line>, Option<Legs>)> {
    let (a, b) = (air(26.4, 0.43, pressure), air(12.6, 0.92, pressure));
    let d = air(10.3, 1.0, pressure);
    let coil = vec![
        state("Entering air", Mark::ENTERING, &a),
        state("Leaving air", Mark::LEAVING, &b),
        state(
            "Apparatus dew point",
            Mark { letter: 'D', shape: dewledger_checks::form::Shape::Diamond },
            &d,
        ),
    ];
    let line = |from: &MoistAir, to: &MoistAir, kind| Line { from: *from, to: *to, kind };
    let legs = Legs { sensible: "33.4\u{a0}kW".to_owned(), latent: "7.9\u{a0}kW".to_owned() };
    let (cold, warm) = (air(-22.0, 0.95, pressure), air(24.0, 0.85, pressure));
    let mix = |share: f64| {
        let h = share * cold.enthalpy().si() + (1.0 - share) * warm.enthalpy().si();
        let w = share * cold.humidity_ratio().si() + (1.0 - share) * warm.humidity_ratio().si();
        settle(Enthalpy::from_si(h), HumidityRatio::from_si(w), Pressure::from_si(pressure))
            .unwrap()
    };
    let mixed = vec![
        state("Stream 1", Mark::stream(1), &cold),
        state("Stream 2", Mark::stream(2), &warm),
        state("Mixed air", Mark::MIXED, &mix(0.5).air),
    ];
    vec![
        (
            coil,
            vec![line(&a, &b, LineKind::Process), line(&b, &d, LineKind::CarriedOn)],
            Some(legs),
        ),
        (mixed, vec![line(&cold, &warm, LineKind::Mixing)], None),
        (vec![state("The air", Mark::ENTERING, &a)], Vec::new(), None),
        // Two states in one place.
        (
            vec![
                state("Entering air", Mark::ENTERING, &a),
                state("Leaving air", Mark::LEAVING, &a),
            ],
            vec![line(&a, &a, LineKind::Process)],
            None,
        ),
    ]
}

fn every(mut visit: impl FnMut(&Chart<'_>)) {
    for pressure in [SEA_LEVEL, 83_523.0, HIGH] {
        for (states, lines, legs) in cases(pressure) {
            for units in [UnitChoice::si(), UnitChoice::ip()] {
                for sheet in [PHONE, WIDE, Sheet { width: 288.0, height: 360.0, text: 28.0 }] {
                    for family in Family::ALL {
                        for window in [
                            None,
                            Some(Window::si((213.15, 363.15), (0.0, 0.4))),
                            Some(Window::si((284.0, 287.0), (0.007, 0.0085))),
                        ] {
                            visit(&Chart {
                                pressure: Pressure::from_si(pressure),
                                units: &units,
                                states: &states,
                                lines: &lines,
                                legs: legs.clone(),
                                family,
                                window,
                                sheet,
                                cross: Some(Place::si(290.0, 0.006)),
                                id: "t",
                            });
                        }
                    }
                }
            }
        }
    }
}

/// All of it is well formed, without a number that is not a number, and with identifiers of its own.
#[test]
fn every_drawing_is_well_formed() {
    let mut drawn = 0;
    every(|chart| {
        let svg = draw(chart).node.svg();
        let document = roxmltree::Document::parse(&svg).unwrap();
        assert_eq!(document.root_element().tag_name().name(), "svg");
        for node in document.descendants() {
            for attribute in node.attributes() {
                let value = attribute.value();
                assert!(!value.contains("NaN") && !value.contains("inf"), "{value}");
                assert!(attribute.name() != "style", "colours belong to the stylesheet");
                if attribute.name() == "id" {
                    assert!(value.starts_with("t-"), "{value}");
                }
            }
        }
        drawn += 1;
    });
    assert!(drawn > 800);
}

/// At the first look no words and no mark lie on a state or on each other. (Zoomed far out, states lie on each other.)
#[test]
fn words_and_marks_keep_off_the_states() {
    every(|chart| {
        // Doubled text on a small phone leaves no room for all words.
        if chart.window.is_some() || chart.sheet.text > 20.0 {
            return;
        }
        let sheet = chart.sheet.kept();
        let plot = Plot::new(chart.home(), &sheet, chart.units);
        let (_, placer) = Pen::new(chart, sheet, &plot).draw();
        let here = (chart.pressure, chart.units.preset(), chart.sheet, chart.family);
        let labels: Vec<_> = chart.states.iter().map(|state| &state.label).collect();
        assert_eq!(placer.collisions(), 0, "{labels:?} {here:?}");
    });
}

/// Marks and their words stay on the paper.
#[test]
fn nothing_is_written_beyond_the_paper() {
    every(|chart| {
        if chart.window.is_some() || chart.sheet.text > 20.0 {
            return;
        }
        let svg = draw(chart).node.svg();
        let document = roxmltree::Document::parse(&svg).unwrap();
        for node in document.descendants().filter(|node| node.has_tag_name("text")) {
            let of = |name: &str| node.attribute(name).map(|value| value.parse::<f64>().unwrap());
            let (x, y) = (of("x").unwrap(), of("y").unwrap());
            let anchor = match node.attribute("text-anchor") {
                Some("middle") => Anchor::Middle,
                Some("end") => Anchor::End,
                _ => Anchor::Start,
            };
            let fills =
                bounds(node.text().unwrap(), Px::new(x, y), anchor, chart.sheet.text, false);
            let paper = Rect::new(0.0, 0.0, chart.sheet.width, chart.sheet.height).grown(3.0);
            assert!(fills.outside(&paper) <= 0.0, "{:?} {fills:?}", node.text());
        }
    });
}

/// Enthalpy and humidity ratio of a mixture go in step (balances of energy and water).
#[test]
fn mixtures_keep_water_and_energy() {
    let pressure = Pressure::from_si(HIGH);
    let (cold, warm) = (air(-15.0, 0.9, HIGH), air(22.0, 0.5, HIGH));
    let line = Line { from: cold, to: warm, kind: LineKind::Mixing };
    for place in mixtures(&line) {
        let mixed = MoistAir::unchecked(place.dry_bulb, place.humidity_ratio, pressure);
        let share = |of: fn(&MoistAir) -> f64| (of(&mixed) - of(&cold)) / (of(&warm) - of(&cold));
        let water = share(|air| air.humidity_ratio().si());
        let energy = share(|air| air.enthalpy().si());
        assert!((water - energy).abs() < 1e-9, "{water} {energy}");
    }
}

/// Cold and warm damp air: part of the line is drawn as fog, and that is said.
#[test]
fn fog_is_shown_on_a_mixing_line() {
    let (states, lines, _) = cases(SEA_LEVEL).remove(1);
    let units = UnitChoice::si();
    let chart = |lines| Chart {
        pressure: Pressure::from_si(SEA_LEVEL),
        units: &units,
        states: &states,
        lines,
        legs: None,
        family: Family::RelativeHumidity,
        window: None,
        sheet: WIDE,
        cross: None,
        id: "t",
    };
    let drawing = draw(&chart(&lines));
    assert!(drawing.node.svg().contains("pc-mixing-fog"));
    assert!(drawing.says.contains("part of which is fog"), "{}", drawing.says);
    let dry = Line {
        from: air(-10.0, 0.5, SEA_LEVEL),
        to: air(24.0, 0.3, SEA_LEVEL),
        kind: LineKind::Mixing,
    };
    let drawing = draw(&chart(std::slice::from_ref(&dry)));
    assert!(!drawing.node.svg().contains("pc-mixing-fog"));
    assert!(!drawing.says.contains("fog"), "{}", drawing.says);
}

#[test]
fn the_chart_is_told_in_words() {
    let (states, lines, legs) = cases(83_523.0).remove(0);
    let units = UnitChoice::si();
    let chart = Chart {
        pressure: Pressure::from_si(83_523.0),
        units: &units,
        states: &states,
        lines: &lines,
        legs,
        family: Family::RelativeHumidity,
        window: None,
        sheet: PHONE,
        cross: None,
        id: "t",
    };
    let says = draw(&chart).says;
    for part in [
        "Psychrometric chart at 83.52\u{a0}kPa: dry bulb from 5.0\u{a0}°C to 35.0\u{a0}°C",
        "A, Entering air: dry bulb 26.4\u{a0}°C, humidity ratio",
        "The air goes from A, Entering air to B, Leaving air.",
        "The line is carried on from B, Leaving air to D, Apparatus dew point.",
        "Sensible 33.4\u{a0}kW, latent 7.9\u{a0}kW.",
    ] {
        assert!(says.contains(part), "{part}: {says}");
    }
}

/// What is read at a point of the drawing is the air that is drawn there.
#[test]
fn a_point_reads_back_as_the_state_that_is_drawn_there() {
    every(|chart| {
        let drawing = draw(chart);
        for state in chart.states.iter().filter(|state| drawing.plot.window.holds(&state.place)) {
            let place = drawing.plot.place(drawing.plot.px(&state.place));
            if let Cross::Air(found) = read(&place, chart.pressure) {
                assert!((found.dry_bulb().si() - state.place.dry_bulb.si()).abs() < 1e-6);
                let w = state.place.humidity_ratio.si();
                assert!((found.humidity_ratio().si() - w).abs() < 1e-9);
            }
        }
    });
}

#[test]
fn a_graph_shows_its_points_and_its_marks() {
    let amount = |kind, si| Amount::new(kind, si);
    let curve = Curve {
        title: "Fan heat".into(),
        across: "Air flow".into(),
        up: "Temperature rise".into(),
        points: (0..20)
            .map(|i| {
                let flow = 1.0 + 0.1 * f64::from(i);
                (amount(Kind::AirFlow, flow), amount(Kind::TemperatureDifference, 2.0 / flow))
            })
            .chain([(amount(Kind::AirFlow, f64::NAN), amount(Kind::TemperatureDifference, 1.0))])
            .collect(),
        marks: vec![(
            "here <now>".into(),
            amount(Kind::AirFlow, 2.0),
            amount(Kind::TemperatureDifference, 1.0),
        )],
    };
    for units in [UnitChoice::si(), UnitChoice::ip()] {
        let svg = crate::graph(&curve, &units, Sheet { width: 340.0, height: 240.0, text: 14.0 })
            .unwrap()
            .svg();
        let document = roxmltree::Document::parse(&svg).unwrap();
        let texts: Vec<_> = document.descendants().filter_map(|node| node.text()).collect();
        assert!(texts.contains(&"here <now>"));
        let title = format!("Air flow, {}", units.get(Kind::AirFlow).symbol);
        assert!(texts.contains(&title.as_str()), "{texts:?}");
        assert!(!svg.contains("NaN"));
        let line =
            document.descendants().find(|n| n.attribute("class") == Some("pc-curve")).unwrap();
        assert_eq!(line.attribute("d").unwrap().matches('L').count(), 19);
    }
    let flat = Curve { points: vec![curve.points[0]], ..curve };
    assert_eq!(crate::graph(&flat, &UnitChoice::si(), PHONE), None);
}
