//! Every refusal of the five checks: which field, which code, and the sentence that a person reads.

use dewledger_checks::{Given, Reading, Refusal, Stop, find};
use dewledger_quantities::{Amount, Kind, Unit, UnitChoice};

/// A reading of a unit, as typed.
fn put(given: &mut Given, key: &str, kind: Kind, value: f64, unit: &str) {
    let unit = Unit::find(unit).unwrap_or_else(|| panic!("no unit {unit}"));
    let si =
        unit.to_si(kind, value).unwrap_or_else(|| panic!("{unit:?} does not measure {kind:?}"));
    given.put(key, Reading { unit: Some(unit), ..Reading::new(Amount::new(kind, si)) });
}

struct Air(Given);

impl Air {
    /// At an elevation in metres.
    fn at(metres: f64) -> Self {
        let mut given = Given::default();
        put(&mut given, "pressure.elevation", Kind::Elevation, metres, "m");
        Self(given)
    }

    fn dry(mut self, point: &str, celsius: f64) -> Self {
        put(&mut self.0, &format!("{point}.dry_bulb"), Kind::Temperature, celsius, "degC");
        self
    }

    fn by(mut self, point: &str, by: &str, kind: Kind, value: f64, unit: &str) -> Self {
        self.0.choose(format!("{point}.humidity_by"), by);
        put(&mut self.0, &format!("{point}.{by}"), kind, value, unit);
        self
    }

    fn wet(self, point: &str, celsius: f64) -> Self {
        self.by(point, "wet_bulb", Kind::Temperature, celsius, "degC")
    }

    fn put(mut self, key: &str, kind: Kind, value: f64, unit: &str) -> Self {
        put(&mut self.0, key, kind, value, unit);
        self
    }

    fn choose(mut self, key: &str, value: &str) -> Self {
        self.0.choose(key, value);
        self
    }

    /// The coil of the examples at 1609 m, with its flow.
    fn coil() -> Self {
        Self::at(1609.344)
            .dry("entering", 26.7)
            .wet("entering", 16.7)
            .dry("leaving", 12.2)
            .wet("leaving", 11.1)
            .put("flow.rate", Kind::AirFlow, 12_400.0, "cfm")
            .choose("flow.basis", "actual_entering")
    }

    fn refused(&self, check: &str) -> Refusal {
        match find(check).unwrap_or_else(|| panic!("no check {check}")).solve(&self.0) {
            Err(Stop::Refused(refusal)) => *refusal,
            other => panic!("{check} is not refused: {other:?}"),
        }
    }
}

/// Field, code and sentence of a refusal, in SI.
fn expect(air: &Air, check: &str, field: &str, code: &str, says: &str) {
    let refusal = air.refused(check);
    let said = refusal.says.say(&UnitChoice::si()).replace('\u{a0}', " ");
    assert_eq!((refusal.field.as_ref(), refusal.code), (field, code), "{said}");
    assert!(said.contains(says), "{code}: {said}");
}

#[test]
fn impossible_humidities_are_refused_with_what_mends_them() {
    let at = || Air::at(0.0).dry("air", 25.0);
    let rh = |value| at().by("air", "relative_humidity", Kind::RelativeHumidity, value, "%");
    let cases: Vec<(Air, &str, &str, &str)> = vec![
        (
            at().wet("air", 27.0),
            "air.wet_bulb",
            "wet_bulb_above_dry_bulb",
            "Wet bulb 27.0 °C is above dry bulb 25.0 °C. Air cannot do that. Swap the two, or wet the wick and read again.",
        ),
        (
            at().wet("air", 8.0),
            "air.wet_bulb",
            "drier_than_bone_dry",
            "the lowest possible here is 8.2 °C",
        ),
        (
            rh(-2.0),
            "air.relative_humidity",
            "relative_humidity_out_of_range",
            "is not between 0 and 100 %",
        ),
        (
            rh(108.0),
            "air.relative_humidity",
            "relative_humidity_out_of_range",
            "A probe that shows 101 to 103 % is within its own error",
        ),
        (
            at().by("air", "dew_point", Kind::Temperature, 26.0, "degC"),
            "air.dew_point",
            "dew_point_above_dry_bulb",
            "Dew point 26.0 °C is above dry bulb 25.0 °C.",
        ),
        (
            at().by("air", "frost_point", Kind::Temperature, 4.0, "degC"),
            "air.frost_point",
            "frost_point_above_freezing",
            "there is only a dew point there",
        ),
        (
            at().by("air", "humidity_ratio", Kind::HumidityRatio, 22.0, "g/kg"),
            "air.humidity_ratio",
            "above_saturation",
            "saturated it holds 20.17 g/kg",
        ),
        (
            at().by("air", "humidity_ratio", Kind::HumidityRatio, -1.0, "g/kg"),
            "air.humidity_ratio",
            "above_saturation",
            "more than air of 25.0 °C can hold here",
        ),
        (
            at().by("air", "enthalpy", Kind::Enthalpy, 90.0, "kJ/kg"),
            "air.enthalpy",
            "enthalpy_out_of_range",
            "runs from 25.1 kJ/kg to 76.5 kJ/kg",
        ),
    ];
    for (air, field, code, says) in &cases {
        expect(air, "air_state", field, code, says);
    }
}

#[test]
fn a_wick_too_cold_to_be_wet_is_iced() {
    let air = Air::at(0.0).dry("air", -2.0).wet("air", -4.0).choose("air.wick", "wet");
    expect(
        &air,
        "air_state",
        "air.wet_bulb",
        "wick_is_iced",
        "is iced: no wet one can be that cold",
    );
    let offered = &air.refused("air_state").offers[0];
    assert_eq!(offered.label.say(&UnitChoice::si()), "It is iced");
}

#[test]
fn readings_out_of_range_are_refused() {
    let hot = Air::at(0.0).dry("air", 95.0).wet("air", 30.0);
    expect(&hot, "air_state", "air.dry_bulb", "dry_bulb_out_of_range", "−60 to 90 °C");
    assert_eq!(hot.refused("air_state").offers.len(), 1, "95 is an everyday temperature in °F");
    let duct = Air::coil().put("entering.duct_pressure", Kind::PressureDifference, 12_000.0, "Pa");
    expect(
        &duct,
        "air_heat",
        "entering.duct_pressure",
        "duct_pressure_out_of_range",
        "is outside ±10 kPa",
    );
}

#[test]
fn pressures_that_cannot_be_here_are_refused() {
    let air = |by: &str, key: &str, kpa: f64, metres: f64| {
        Air::at(metres).dry("air", 24.0).wet("air", 15.0).choose("pressure.by", by).put(
            key,
            Kind::Pressure,
            kpa,
            "kPa",
        )
    };
    let read = |kpa, metres| air("read", "pressure.read", kpa, metres);
    expect(
        &read(102.0, 1609.0),
        "air_state",
        "pressure.read",
        "sea_level_pressure",
        "cannot be at 1609 m, where it is near 83.43 kPa. It is probably a sea-level figure",
    );
    expect(
        &read(70.0, 1609.0),
        "air_state",
        "pressure.read",
        "pressure_too_low_for_elevation",
        "Check the number, its unit and the elevation",
    );
    let setting = air("altimeter", "pressure.altimeter", 83.0, 1609.0);
    expect(
        &setting,
        "air_state",
        "pressure.altimeter",
        "not_a_sea_level_figure",
        "choose “Read here”",
    );
    let high = Air::at(6000.0).dry("air", 24.0).wet("air", 15.0);
    expect(
        &high,
        "air_state",
        "pressure.elevation",
        "elevation_out_of_range",
        "is outside −430 to 5 000 m",
    );
}

#[test]
fn flows_that_cannot_be_are_refused() {
    let flow = |value, unit: &str| Air::coil().put("flow.rate", Kind::AirFlow, value, unit);
    expect(&flow(0.0, "cfm"), "air_heat", "flow.rate", "flow_not_above_zero", "moves no heat");
    expect(
        &flow(12_400.0, "m3/s"),
        "air_heat",
        "flow.rate",
        "flow_too_large",
        "cfm typed as m³/s looks like this",
    );
    let standard = Air::coil().choose("flow.basis", "standard").put(
        "flow.standard_density",
        Kind::Density,
        0.8,
        "kg/m3",
    );
    expect(
        &standard,
        "air_heat",
        "flow.standard_density",
        "standard_density_out_of_range",
        "is no standard",
    );
    let nothing = Air::at(0.0)
        .dry("stream1", 20.0)
        .wet("stream1", 12.0)
        .put("stream1_flow.rate", Kind::AirFlow, 0.0, "L/s")
        .choose("stream1_flow.basis", "actual")
        .dry("stream2", 20.0)
        .wet("stream2", 12.0)
        .put("stream2_flow.rate", Kind::AirFlow, 0.0, "L/s")
        .choose("stream2_flow.basis", "actual");
    expect(
        &nothing,
        "mixing",
        "stream1_flow.rate",
        "no_flow_to_mix",
        "Give at least two flows above zero.",
    );
    let plenum = nothing.put("stream1_flow.rate", Kind::AirFlow, 100.0, "L/s").put(
        "stream1.duct_pressure",
        Kind::PressureDifference,
        3000.0,
        "Pa",
    );
    expect(
        &plenum,
        "mixing",
        "stream1.duct_pressure",
        "two_pressures_in_one_plenum",
        "one plenum has one pressure",
    );
}

#[test]
fn water_streams_that_cannot_be_are_refused() {
    let steam = Air::coil().choose("water.state", "steam").put(
        "water.steam_enthalpy",
        Kind::WaterEnthalpy,
        419.0,
        "kJ/kg",
    );
    expect(
        &steam,
        "air_heat",
        "water.steam_enthalpy",
        "steam_enthalpy_out_of_range",
        "Check its zero and unit",
    );
    let water = Air::coil().choose("water.state", "liquid").put(
        "water.temperature",
        Kind::Temperature,
        130.0,
        "degC",
    );
    expect(
        &water,
        "air_heat",
        "water.temperature",
        "water_temperature_out_of_range",
        "is outside 0 to 100 °C",
    );
}

#[test]
fn air_that_cannot_hold_its_water_is_refused() {
    let air = Air::at(0.0)
        .dry("entering", 24.0)
        .by("entering", "humidity_ratio", Kind::HumidityRatio, 9.0, "g/kg")
        .dry("leaving", 9.0)
        .by("leaving", "humidity_ratio", Kind::HumidityRatio, 9.0, "g/kg");
    // At 9 °C saturated air holds less than 9 g/kg, which is what the state block says first.
    assert_eq!(air.refused("air_heat").code, "above_saturation");
}

#[test]
fn book_numbers_of_another_unit_are_refused() {
    let air = Air::coil().put("book.total", Kind::TotalConstant, 4.5, "kg/m3");
    expect(
        &air,
        "book_constants",
        "book.total",
        "book_number_far_off",
        "is no book constant for this air",
    );
    let air = Air::coil().choose("flow.basis", "dry_air").put(
        "flow.dry_air",
        Kind::DryAirFlow,
        5.0,
        "kg/s",
    );
    expect(
        &air,
        "book_constants",
        "flow.basis",
        "no_volume_flow",
        "Book constants are for volume flows",
    );
}

#[test]
fn drains_that_cannot_be_are_refused() {
    let fill = |litres: f64, seconds: f64| {
        Air(Given::default()).put("fill1.volume", Kind::WaterVolume, litres, "L").put(
            "fill1.time",
            Kind::Duration,
            seconds,
            "s",
        )
    };
    expect(
        &fill(0.0, 600.0),
        "condensate",
        "fill1.volume",
        "fill_volume_out_of_range",
        "is outside 0.05 to 200 L",
    );
    expect(
        &fill(4.0, 10.0),
        "condensate",
        "fill1.time",
        "fill_time_out_of_range",
        "times the hand, not the drain",
    );
    let warm = fill(4.0, 600.0).put("drain.water_temperature", Kind::Temperature, 60.0, "degC");
    expect(
        &warm,
        "condensate",
        "drain.water_temperature",
        "water_temperature_out_of_range",
        "is outside 0 to 40 °C",
    );
    let wetter = Air::coil()
        .dry("leaving", 24.0)
        .wet("leaving", 18.0)
        .put("fill1.volume", Kind::WaterVolume, 4.0, "L")
        .put("fill1.time", Kind::Duration, 600.0, "s");
    expect(
        &wetter,
        "condensate",
        "leaving.wet_bulb",
        "not_condensing",
        "yet water came. Swap the two points",
    );
    let year = Air::coil().choose("bins", "1").put("bin1.hours", Kind::Duration, 9000.0, "h").put(
        "bin1.humidity_ratio",
        Kind::HumidityRatio,
        14.0,
        "g/kg",
    );
    expect(&year, "condensate", "bin1.hours", "more_than_a_year", "is more than a year has");
}

#[test]
fn readings_within_their_plus_minus_of_saturation_are_taken_as_saturated() {
    let cases = [
        Air::at(0.0).dry("air", 12.0).wet("air", 12.2),
        Air::at(0.0).dry("air", 12.0).by(
            "air",
            "relative_humidity",
            Kind::RelativeHumidity,
            102.0,
            "%",
        ),
        Air::at(0.0).dry("air", 12.0).by("air", "dew_point", Kind::Temperature, 12.1, "degC"),
    ];
    for air in cases {
        let outcome = find("air_state")
            .and_then(|check| check.solve(&air.0).ok())
            .unwrap_or_else(|| panic!("refused"));
        assert_eq!(outcome.saturated, ["air"]);
        let rh = outcome.amount("relative_humidity").map_or(0.0, Amount::si);
        assert!((rh - 1.0).abs() < 1e-6, "{rh}");
    }
    // A stated ± narrows the band: 0.2 K above with ±0.1 K on both is impossible.
    let air = Air::at(0.0).dry("air", 12.0).wet("air", 12.2);
    let narrow = air.0.within("air.dry_bulb", 0.1).within("air.wet_bulb", 0.1);
    assert!(find("air_state").is_some_and(|check| check.solve(&narrow).is_err()));
}
