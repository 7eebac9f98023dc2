//! Every check with a ± on each reading: one solve, first order over all its sources, and 20 000 draws. First order
//! must stay live while a person types (5 ms); draws must be done within a second.

use std::hint::black_box;
use std::sync::atomic::AtomicBool;

use criterion::{Criterion, criterion_group, criterion_main};
use dewledger_checks::doubt::{DRAWS, draw, work_out};
use dewledger_checks::{Given, Reading, find};
use dewledger_quantities::{Amount, Kind};

/// A cooling coil with a ± on every reading.
fn coil() -> Given {
    let mut given = Given::default();
    for (key, choice) in
        [("pressure.by", "read"), ("flow.basis", "actual_leaving"), ("water.state", "condensate")]
    {
        given.choose(key, choice);
    }
    for (key, kind, si, half_width) in [
        ("pressure.read", Kind::Pressure, 101_325.0, 300.0),
        ("flow.rate", Kind::AirFlow, 2.0, 0.1),
        ("entering.dry_bulb", Kind::Temperature, 299.85, 0.3),
        ("entering.wet_bulb", Kind::Temperature, 292.55, 0.3),
        ("leaving.dry_bulb", Kind::Temperature, 285.95, 0.3),
        ("leaving.wet_bulb", Kind::Temperature, 285.35, 0.3),
    ] {
        let half_width_si = Some(half_width);
        given.put(key, Reading { half_width_si, ..Reading::new(Amount::new(kind, si)) });
    }
    given
}

fn bench(criterion: &mut Criterion) {
    let check = find("air_heat").expect("it is one of the checks");
    let given = coil();
    let worked = work_out(check, &given).expect("the readings are complete");
    let keys: Vec<String> = worked.doubts.keys().cloned().collect();
    let never = AtomicBool::new(false);
    criterion.bench_function("air heat: one solve", |bencher| {
        bencher.iter(|| check.solve(black_box(&given)).is_ok());
    });
    criterion.bench_function("air heat: first order", |bencher| {
        bencher.iter(|| work_out(check, black_box(&given)).is_ok());
    });
    let mut group = criterion.benchmark_group("draws");
    group.sample_size(10);
    group.bench_function("air heat: 20 000", |bencher| {
        bencher.iter(|| draw(check, black_box(&given), &keys, DRAWS, &never).is_some());
    });
    group.finish();
}

criterion_group!(benches, bench);
criterion_main!(benches);
