//! The full state (W, h, v, wet bulb, dew point) from dry bulb, relative humidity and pressure, on one thread.

use std::hint::black_box;

use criterion::{Criterion, criterion_group, criterion_main};
use dewledger_properties::{Humidity, MoistAir};
use dewledger_quantities::{Pressure, Quantity, RelativeHumidity, ThermodynamicTemperature};

/// A walk through the range that visits every branch: freezing, mild, hot; sea level and altitude.
fn inputs() -> Vec<(f64, f64, f64)> {
    (0..1000)
        .map(|i| {
            let i = f64::from(i);
            (
                253.15 + (i * 0.618_034).fract() * 70.0,
                0.05 + 0.95 * (i * 0.324_717).fract(),
                55_000.0 + 55_000.0 * (i * 0.754_877).fract(),
            )
        })
        .collect()
}

fn full_state((t, rh, p): (f64, f64, f64)) -> [f64; 5] {
    let air = MoistAir::new(
        ThermodynamicTemperature::from_si(t),
        Humidity::RelativeHumidityOverIce(RelativeHumidity::from_si(rh)),
        Pressure::from_si(p),
    )
    .expect("the inputs are air");
    let wet_bulb = air.wet_bulb().expect("air has a wet bulb").reading();
    let dew_point = air.frost_point().expect("these inputs are not that dry");
    [
        air.humidity_ratio().si(),
        air.enthalpy().si(),
        air.specific_volume().si(),
        wet_bulb.si(),
        dew_point.si(),
    ]
}

fn bench(criterion: &mut Criterion) {
    let inputs = inputs();
    criterion.bench_function("thousand full states", |bencher| {
        bencher.iter(|| inputs.iter().map(|input| full_state(black_box(*input))[3]).sum::<f64>());
    });
}

criterion_group!(benches, bench);
criterion_main!(benches);
