//! Reads `T_K,RH,P_Pa` lines, answers each with `W,h,v,T_wb,T_dp`, and says on standard error how long a full state
//! took on one thread, without reading and writing. Used by `scripts/bench-reference`.

#![expect(clippy::print_stdout, reason = "an example that answers on standard output")]

use std::hint::black_box;
use std::io::BufRead;
use std::time::Instant;

use dewledger_properties::{Humidity, MoistAir};
use dewledger_quantities::{Pressure, Quantity, RelativeHumidity, ThermodynamicTemperature};

/// How often the whole list is worked out; the quickest round counts, since the machine may be shared.
const ROUNDS: usize = 25;

fn state([t, rh, p]: [f64; 3]) -> Option<[f64; 5]> {
    let humidity = Humidity::RelativeHumidityOverIce(RelativeHumidity::from_si(rh));
    let air =
        MoistAir::new(ThermodynamicTemperature::from_si(t), humidity, Pressure::from_si(p)).ok()?;
    let wet_bulb = air.wet_bulb().ok()?.reading();
    let dew_point = air.frost_point().ok()?;
    Some([
        air.humidity_ratio().si(),
        air.enthalpy().si(),
        air.specific_volume().si(),
        wet_bulb.si(),
        dew_point.si(),
    ])
}

fn main() {
    let mut inputs = Vec::new();
    for line in std::io::stdin().lock().lines().map_while(Result::ok) {
        let cells: Vec<f64> = line.split(',').filter_map(|cell| cell.trim().parse().ok()).collect();
        if let [t, rh, p] = cells[..] {
            inputs.push([t, rh, p]);
        }
    }
    let mut best = f64::INFINITY;
    for _ in 0..ROUNDS {
        let begun = Instant::now();
        for input in &inputs {
            black_box(state(black_box(*input)));
        }
        best = best.min(begun.elapsed().as_secs_f64() / inputs.len() as f64);
    }
    eprintln!("{best:e}");
    for input in &inputs {
        match state(*input) {
            Some([w, h, v, wet_bulb, dew_point]) => {
                println!("{w:e},{h:e},{v:e},{wet_bulb},{dew_point}");
            }
            None => println!("nan,nan,nan,nan,nan"),
        }
    }
}
