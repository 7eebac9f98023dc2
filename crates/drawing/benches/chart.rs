//! A whole chart, from states to SVG text, as large as a wide window shows it, with the family that is the dearest.

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use dewledger_checks::doubt::StateDoubt;
use dewledger_checks::drawn::{Line, LineKind};
use dewledger_checks::form::Mark;
use dewledger_drawing::{Chart, Family, Legs, Place, Sheet, State, draw};
use dewledger_properties::{Humidity, MoistAir};
use dewledger_quantities::{
    Pressure, Quantity, RelativeHumidity, ThermodynamicTemperature, UnitChoice,
};

fn air(celsius: f64, rh: f64, pressure: Pressure) -> MoistAir {
    MoistAir::new(
        ThermodynamicTemperature::from_si(celsius + 273.15),
        Humidity::RelativeHumidity(RelativeHumidity::from_si(rh)),
        pressure,
    )
    .expect("it is air")
}

fn chart(criterion: &mut Criterion) {
    let pressure = Pressure::from_si(83_523.0);
    let airs =
        [(26.4, 0.43), (12.6, 0.92), (34.0, 0.3), (24.0, 0.5)].map(|(t, rh)| air(t, rh, pressure));
    let states: Vec<State> = airs
        .iter()
        .enumerate()
        .map(|(index, air)| State {
            label: format!("Stream {}", index + 1),
            mark: Some(Mark::stream(index + 1)),
            place: Place { dry_bulb: air.dry_bulb(), humidity_ratio: air.humidity_ratio() },
            doubt: Some(StateDoubt {
                dry_bulb_k: Some(0.15),
                humidity_ratio_kg_kg: Some(2e-4),
                correlation: -0.4,
            }),
        })
        .collect();
    let lines = [
        Line { from: airs[0], to: airs[1], kind: LineKind::Process },
        Line { from: airs[2], to: airs[3], kind: LineKind::Mixing },
    ];
    let units = UnitChoice::si();
    for family in Family::ALL {
        criterion.bench_function(&format!("chart, {}", family.id()), |bencher| {
            bencher.iter(|| {
                let chart = Chart {
                    pressure: black_box(pressure),
                    units: &units,
                    states: &states,
                    lines: &lines,
                    legs: Some(Legs {
                        sensible: "33.4 kW".to_owned(),
                        latent: "7.9 kW".to_owned(),
                    }),
                    family,
                    window: None,
                    sheet: Sheet { width: 900.0, height: 700.0, text: 14.0 },
                    cross: None,
                    id: "bench",
                };
                draw(&chart).node.svg().len()
            });
        });
    }
}

criterion_group!(benches, chart);
criterion_main!(benches);
