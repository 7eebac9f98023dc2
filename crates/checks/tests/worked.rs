//! The worked examples of `data/worked_air.json`, by both of its routes: an independent transcription of the
//! published equations, and the same balances with properties of CoolProp 8.0.0.
//!
//! Tolerances: 2e-6 relative for W, h, v and flows, 1e-4 K for temperatures, 5e-4 K below freezing; where two near
//! figures are subtracted, 1e-3 relative, since that is how far the two routes themselves are apart.

#![expect(clippy::unwrap_used, reason = "a reference that cannot be read fails the test")]

use dewledger_checks::{Given, Outcome, Reading, find};
use dewledger_quantities::{Amount, Kind, Unit};
use serde_json::Value;

fn case(id: &str) -> Value {
    let all: Value = serde_json::from_str(include_str!("data/worked_air.json")).unwrap();
    all["cases"].as_array().unwrap().iter().find(|case| case["id"] == id).unwrap().clone()
}

/// Puts a reading of `kind` in SI.
fn put(given: &mut Given, key: &str, kind: Kind, si: f64) {
    given.put(key, Reading::new(Amount::new(kind, si)));
}

/// Reads the inputs of a case by name.
struct Inputs(Value);

impl Inputs {
    fn number(&self, name: &str) -> f64 {
        self.0[name].as_f64().unwrap_or_else(|| panic!("no input {name}"))
    }

    fn kelvin(&self, name: &str) -> f64 {
        self.number(name) + 273.15
    }

    fn elevation(&self, given: &mut Given) {
        given.choose("pressure.by", "elevation");
        put(given, "pressure.elevation", Kind::Elevation, self.number("elevation_m"));
    }

    fn station(&self, given: &mut Given) {
        given.choose("pressure.by", "read");
        put(given, "pressure.read", Kind::Pressure, self.number("station_pressure_Pa"));
    }

    fn wet_bulb(&self, given: &mut Given, point: &str, dry: &str, wet: &str) {
        put(given, &format!("{point}.dry_bulb"), Kind::Temperature, self.kelvin(dry));
        put(given, &format!("{point}.wet_bulb"), Kind::Temperature, self.kelvin(wet));
    }

    fn humidity(
        &self,
        given: &mut Given,
        point: &str,
        dry: &str,
        by: &str,
        kind: Kind,
        name: &str,
    ) {
        put(given, &format!("{point}.dry_bulb"), Kind::Temperature, self.kelvin(dry));
        put(given, &format!("{point}.{by}"), kind, self.number(name));
        given.choose(format!("{point}.humidity_by"), by);
    }

    fn flow(&self, given: &mut Given, basis: &str, kind: Kind, name: &str) {
        put(given, "flow.rate", kind, self.number(name));
        given.choose("flow.basis", basis);
    }
}

/// Compares results with both routes of a case: figure key, output name, factor from SI, offset, relative and
/// absolute tolerance.
fn compare(id: &str, outcome: &Outcome, rows: &[(&str, &str, f64, f64, f64, f64)]) {
    let case = case(id);
    for (figure, name, factor, offset, relative, absolute) in rows {
        let si = outcome.amount(figure).unwrap_or_else(|| panic!("{id}: no figure {figure}")).si();
        let ours = si * factor + offset;
        for route in ["outputs", "second_route_CoolProp"] {
            let theirs =
                case[route][name].as_f64().unwrap_or_else(|| panic!("{id}: no {name} in {route}"));
            let allowed = absolute + relative * theirs.abs();
            assert!(
                (ours - theirs).abs() <= allowed,
                "{id} {figure}: {ours} against {theirs} ({route})"
            );
        }
    }
}

fn solve(check: &str, given: &Given) -> Outcome {
    find(check).unwrap().solve(given).unwrap_or_else(|stop| panic!("{check}: {stop:?}"))
}

const REL: f64 = 2e-6;
/// Differences of near-equal figures.
const DIFF: f64 = 1e-3;

#[test]
fn example_1a() {
    let inputs = Inputs(case("1a")["inputs"].clone());
    let mut given = Given::default();
    inputs.elevation(&mut given);
    inputs.wet_bulb(&mut given, "air", "dry_bulb_C", "wet_bulb_C");
    compare(
        "1a",
        &solve("air_state", &given),
        &[
            ("pressure", "p_Pa", 1.0, 0.0, 1e-8, 0.0),
            ("humidity_ratio", "W", 1.0, 0.0, REL, 0.0),
            ("enthalpy", "h_J_kg", 1.0, 0.0, REL, 0.0),
            ("specific_volume", "v_m3_kg", 1.0, 0.0, REL, 0.0),
            ("relative_humidity", "RH", 1.0, 0.0, REL, 0.0),
            ("dew_point", "dew_point_C", 1.0, -273.15, 0.0, 1e-4),
            ("density", "density_kg_m3", 1.0, 0.0, REL, 0.0),
            ("vapour_pressure", "p_w_Pa", 1.0, 0.0, REL, 0.0),
            ("humidity_ratio_at_sea_level", "W_if_sea_level", 1.0, 0.0, REL, 0.0),
            ("enthalpy_at_sea_level", "h_if_sea_level_J_kg", 1.0, 0.0, REL, 0.0),
        ],
    );
}

#[test]
fn example_1b_in_both_systems() {
    let inputs = Inputs(case("1b")["inputs"].clone());
    let mut given = Given::default();
    inputs.station(&mut given);
    inputs.humidity(
        &mut given,
        "air",
        "dry_bulb_C",
        "relative_humidity",
        Kind::RelativeHumidity,
        "RH",
    );
    let outcome = solve("air_state", &given);
    let ip = 1.0 / 2326.0;
    compare(
        "1b",
        &outcome,
        &[
            ("humidity_ratio", "W", 1.0, 0.0, REL, 0.0),
            ("humidity_ratio", "W_grains_lb", 7000.0, 0.0, REL, 0.0),
            ("enthalpy", "h_J_kg", 1.0, 0.0, REL, 0.0),
            ("enthalpy", "h_ip_Btu_lb", ip, 7.6857, REL, 0.0),
            ("specific_volume", "v_m3_kg", 1.0, 0.0, REL, 0.0),
            ("wet_bulb", "wet_bulb_C", 1.0, -273.15, 0.0, 1e-4),
            ("dew_point", "dew_point_F", 1.8, -459.67, 0.0, 2e-4),
        ],
    );
    // The units of the screen give the same Btu/lb and grains.
    let btu = Unit::find("Btu/lb").unwrap();
    let shown = btu.from_si(Kind::Enthalpy, outcome.amount("enthalpy").unwrap().si()).unwrap();
    assert!((shown - 30.641_298_7).abs() < 1e-4);
}

#[test]
fn example_1c_pressures_of_a_weather_service() {
    let inputs = Inputs(case("1c")["inputs"].clone());
    let with = |by: &str, key: &str, name: &str| {
        let mut given = Given::default();
        inputs.elevation(&mut given);
        given.choose("pressure.by", by);
        put(&mut given, key, Kind::Pressure, inputs.number(name));
        put(
            &mut given,
            "pressure.outdoor_temperature",
            Kind::Temperature,
            inputs.kelvin("outdoor_C"),
        );
        // 0.008 kg/kg at 31 °C and this pressure, as a relative humidity.
        put(&mut given, "pressure.outdoor_humidity", Kind::RelativeHumidity, 0.2342);
        // 80 °F / 62 °F.
        put(&mut given, "air.dry_bulb", Kind::Temperature, (80.0 + 459.67) / 1.8);
        put(&mut given, "air.wet_bulb", Kind::Temperature, (62.0 + 459.67) / 1.8);
        given
    };
    let setting =
        solve("air_state", &with("altimeter", "pressure.altimeter", "altimeter_setting_Pa"));
    compare("1c", &setting, &[("pressure", "p_station_from_altimeter_Pa", 1.0, 0.0, 1e-8, 0.0)]);
    let reduced =
        solve("air_state", &with("sea_level", "pressure.sea_level", "sea_level_pressure_Pa"));
    compare("1c", &reduced, &[("pressure", "p_station_from_sea_level_Pa", 1.0, 0.0, 2e-5, 0.0)]);
    let standard = solve("air_state", &with("elevation", "pressure.read", "altimeter_setting_Pa"));
    compare("1c", &standard, &[("pressure", "p_isa_Pa", 1.0, 0.0, 1e-8, 0.0)]);
    compare(
        "1c",
        &setting,
        &[
            ("humidity_ratio", "W_right_80_62F", 1.0, 0.0, REL, 0.0),
            ("enthalpy", "h_right_J_kg", 1.0, 0.0, REL, 0.0),
            ("specific_volume", "v_right_m3_kg", 1.0, 0.0, REL, 0.0),
        ],
    );
}

#[test]
fn example_1d_in_frost() {
    let inputs = Inputs(case("1d")["inputs"].clone());
    let mut given = Given::default();
    inputs.station(&mut given);
    inputs.humidity(
        &mut given,
        "air",
        "dry_bulb_C",
        "relative_humidity",
        Kind::RelativeHumidity,
        "RH_over_liquid",
    );
    let outcome = solve("air_state", &given);
    // Supercooled water is beyond CoolProp's own range: its route differs by 2.4e-5.
    compare(
        "1d",
        &outcome,
        &[
            ("humidity_ratio", "W", 1.0, 0.0, 3e-5, 0.0),
            ("relative_humidity_over_ice", "RH_over_ice", 1.0, 0.0, 3e-5, 0.0),
            ("frost_point", "frost_point_C", 1.0, -273.15, 0.0, 5e-4),
            ("dew_point", "dew_point_over_liquid_C", 1.0, -273.15, 0.0, 5e-4),
            ("enthalpy", "h_J_kg", 1.0, 0.0, 5e-5, 0.0),
            ("wet_bulb", "wet_bulb_ice_C", 1.0, -273.15, 0.0, 5e-4),
        ],
    );
}

fn coil_2a() -> Given {
    let inputs = Inputs(case("2a")["inputs"].clone());
    let mut given = Given::default();
    inputs.elevation(&mut given);
    inputs.wet_bulb(&mut given, "entering", "t1_C", "twb1_C");
    inputs.wet_bulb(&mut given, "leaving", "t2_C", "twb2_C");
    inputs.flow(&mut given, "actual_entering", Kind::AirFlow, "flow_actual_at_entering_m3_s");
    given
}

#[test]
fn example_2a_cooling_coil() {
    let btu_h = 3600.0 / 1_055.055_852_62;
    compare(
        "2a",
        &solve("air_heat", &coil_2a()),
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, REL, 0.0),
            ("delta_h", "delta_h_J_kg", 1.0, 0.0, 2e-5, 0.0),
            ("delta_w", "delta_W", 1.0, 0.0, DIFF, 0.0),
            ("total", "q_total_W", 1.0, 0.0, 2e-5, 0.0),
            ("sensible", "q_sensible_W", 1.0, 0.0, 2e-5, 0.0),
            ("latent", "q_latent_W", 1.0, 0.0, DIFF, 0.0),
            ("shr", "shr", 1.0, 0.0, 1e-4, 0.0),
            ("moisture", "moisture_added_kg_s", 1.0, 0.0, DIFF, 0.0),
            ("slope", "process_slope_J_kg", 1.0, 0.0, DIFF, 0.0),
            ("duty", "q_duty_W", 1.0, 0.0, 2e-5, 0.0),
            ("latent_net", "q_latent_duty_W", 1.0, 0.0, DIFF, 0.0),
            ("total", "q_total_Btu_h", btu_h, 0.0, 2e-5, 0.0),
            ("duty", "q_duty_ton", 1.0 / 3_516.852_842, 0.0, 2e-5, 0.0),
            ("dry_air", "m_da_lb_h", 3600.0 / 0.453_592_37, 0.0, REL, 0.0),
            ("condensate", "condensate_gal_h", 3600.0 / 0.003_785_411_784, 0.0, DIFF, 0.0),
        ],
    );
}

#[test]
fn example_2b_preheat_and_humidifying() {
    let inputs = Inputs(case("2b")["inputs"].clone());
    let mut given = Given::default();
    inputs.elevation(&mut given);
    inputs.humidity(
        &mut given,
        "entering",
        "t1_C",
        "relative_humidity",
        Kind::RelativeHumidity,
        "RH1",
    );
    inputs.humidity(
        &mut given,
        "leaving",
        "t2_C",
        "relative_humidity",
        Kind::RelativeHumidity,
        "RH2",
    );
    inputs.flow(&mut given, "standard", Kind::StandardAirFlow, "flow_standard_m3_s");
    put(
        &mut given,
        "flow.standard_density",
        Kind::Density,
        inputs.number("standard_density_kg_m3"),
    );
    let outcome = solve("air_heat", &given);
    compare(
        "2b",
        &outcome,
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, REL, 0.0),
            ("delta_h", "delta_h_J_kg", 1.0, 0.0, 5e-6, 0.0),
            ("delta_w", "delta_W", 1.0, 0.0, 5e-6, 0.0),
            ("total", "q_total_W", 1.0, 0.0, 5e-6, 0.0),
            ("sensible", "q_sensible_W", 1.0, 0.0, 5e-6, 0.0),
            ("latent", "q_latent_W", 1.0, 0.0, 5e-6, 0.0),
            ("shr", "shr", 1.0, 0.0, 5e-6, 0.0),
            ("moisture", "moisture_added_kg_s", 1.0, 0.0, 5e-6, 0.0),
            ("slope", "process_slope_J_kg", 1.0, 0.0, 5e-6, 0.0),
            ("flow_entering", "actual_flow_entering_m3_s", 1.0, 0.0, REL, 0.0),
            ("flow_leaving", "actual_flow_leaving_m3_s", 1.0, 0.0, REL, 0.0),
        ],
    );
    let counting_moist = given.choosing("flow.density_counts", "moist_air");
    compare(
        "2b",
        &solve("air_heat", &counting_moist),
        &[("dry_air", "moist_mass_variant_m_da_kg_s", 1.0, 0.0, REL, 0.0)],
    );
}

#[test]
fn example_2c_evaporative_pad() {
    let inputs = Inputs(case("2c")["inputs"].clone());
    let mut given = Given::default();
    inputs.elevation(&mut given);
    inputs.wet_bulb(&mut given, "entering", "t1_C", "twb1_C");
    inputs.wet_bulb(&mut given, "leaving", "t2_C", "twb2_C");
    inputs.flow(&mut given, "actual_leaving", Kind::AirFlow, "flow_actual_at_leaving_m3_s");
    let liquid = given.choosing("water.state", "liquid").with(
        "water.temperature",
        dewledger_quantities::ThermodynamicTemperature::from_si_kelvin(17.833_333_333),
    );
    let outcome = solve("air_heat", &liquid);
    compare(
        "2c",
        &outcome,
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, REL, 0.0),
            ("delta_w", "delta_W", 1.0, 0.0, 5e-6, 0.0),
            ("total", "q_total_W", 1.0, 0.0, DIFF, 0.0),
            ("sensible", "q_sensible_W", 1.0, 0.0, 5e-6, 0.0),
            ("latent", "q_latent_W", 1.0, 0.0, 5e-6, 0.0),
            ("moisture", "moisture_added_kg_s", 1.0, 0.0, 5e-6, 0.0),
        ],
    );
    let shr = outcome.figure("shr").unwrap();
    assert!(shr.amount.is_none() && shr.withheld.is_some(), "sensible and latent oppose");
}

/// Celsius to the typed temperature, for the one reading above that is not in the file's kelvin keys.
trait FromCelsius {
    fn from_si_kelvin(celsius: f64) -> Self;
}

impl FromCelsius for dewledger_quantities::ThermodynamicTemperature {
    fn from_si_kelvin(celsius: f64) -> Self {
        dewledger_quantities::Quantity::from_si(celsius + 273.15)
    }
}

#[test]
fn example_2d_desiccant_rotor_with_a_flow_at_another_plane() {
    let inputs = Inputs(case("2d")["inputs"].clone());
    let mut given = Given::default();
    inputs.station(&mut given);
    inputs.humidity(&mut given, "entering", "t1_C", "humidity_ratio", Kind::HumidityRatio, "W1");
    inputs.humidity(&mut given, "leaving", "t2_C", "humidity_ratio", Kind::HumidityRatio, "W2");
    inputs.humidity(
        &mut given,
        "plane",
        "flow_state_t_C",
        "humidity_ratio",
        Kind::HumidityRatio,
        "flow_state_W",
    );
    inputs.flow(&mut given, "actual_at_plane", Kind::AirFlow, "flow_actual_m3_s");
    compare(
        "2d",
        &solve("air_heat", &given),
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, REL, 0.0),
            ("delta_h", "delta_h_J_kg", 1.0, 0.0, 2e-5, 0.0),
            ("total", "q_total_W", 1.0, 0.0, 2e-5, 0.0),
            ("sensible", "q_sensible_W", 1.0, 0.0, 5e-6, 0.0),
            ("latent", "q_latent_W", 1.0, 0.0, 5e-6, 0.0),
            ("moisture", "moisture_added_kg_s", 1.0, 0.0, 5e-6, 0.0),
            ("slope", "process_slope_J_kg", 1.0, 0.0, 2e-5, 0.0),
        ],
    );
}

/// What the readings of 2a can carry: the ± of every reading stated.
#[test]
fn example_2e_the_doubt_of_2a() {
    let u = Inputs(case("2e")["inputs"].clone());
    let k = 1.959_964;
    // The pressure as read and known, as in the example: from elevation alone it would add its own doubt.
    let mut given = coil_2a().choosing("pressure.by", "read");
    put(&mut given, "pressure.read", Kind::Pressure, 83_427.577);
    given = given.within("pressure.read", 1e-3);
    for point in ["entering", "leaving"] {
        given = given
            .within(&format!("{point}.dry_bulb"), k * u.number("u_t_K"))
            .within(&format!("{point}.wet_bulb"), k * u.number("u_twb_K"));
    }
    let flow = given.reading("flow.rate").unwrap().amount.si();
    given = given.within("flow.rate", k * u.number("u_flow_rel") * flow);
    let worked = dewledger_checks::doubt::work_out(find("air_heat").unwrap(), &given).unwrap();
    let outputs = case("2e")["outputs"].clone();
    for (figure, name) in
        [("sensible", "U95_sensible_rel"), ("latent", "U95_latent_rel"), ("total", "U95_total_rel")]
    {
        let doubt = &worked.doubts[figure];
        let relative =
            doubt.half_width_si.unwrap() / worked.outcome.amount(figure).unwrap().si().abs();
        let theirs = outputs[name].as_f64().unwrap();
        assert!((relative / theirs - 1.0).abs() < 0.01, "{figure}: {relative} against {theirs}");
    }
    let total = &worked.doubts["total"];
    let share = |source: &str| {
        total.shares.iter().find(|(name, _)| name == source).map_or(0.0, |(_, share)| *share)
    };
    assert!((share("Entering air, wet bulb") - 0.4989).abs() < 0.01);
    assert!((share("Leaving air, wet bulb") - 0.3268).abs() < 0.01);
    assert!((share("Air flow, volume flow") - 0.1742).abs() < 0.01);
    assert!((total.shares.iter().map(|(_, share)| share).sum::<f64>() - 1.0).abs() < 1e-12);
    assert!(worked.outcome.notes.iter().any(|note| note.code == "latent_not_determined"));
}

#[test]
fn example_3a_book_constants_at_altitude() {
    let mut given = coil_2a();
    // Typed in cfm: the book's IP constants stand beside it.
    let flow = *given.reading("flow.rate").unwrap();
    given.put("flow.rate", Reading { unit: Unit::find("cfm"), ..flow });
    let outcome = solve("book_constants", &given);
    let per_cfm = 3600.0 / 1_055.055_852_62 * 4.719_474_432e-4;
    compare(
        "3a",
        &outcome,
        &[
            ("sensible_here", "ks_here", per_cfm / 1.8, 0.0, 2e-5, 0.0),
            ("total_here", "kt_here", 3600.0 / 0.453_592_37 * 4.719_474_432e-4, 0.0, REL, 0.0),
            ("latent_air_here", "kl_air_here", per_cfm, 0.0, DIFF, 0.0),
            ("latent_here", "kl_net_here", per_cfm, 0.0, DIFF, 0.0),
            ("sensible_error", "ks_book_error_rel", 1.0, 0.0, 2e-4, 0.0),
            ("total_error", "kt_book_error_rel", 1.0, 0.0, 2e-5, 0.0),
            ("latent_error", "kl_book_error_rel", 1.0, 0.0, DIFF, 0.0),
            ("chart_total", "book_total_with_sea_level_chart_W", 1.0, 0.0, 2e-5, 0.0),
            ("chart_error", "err_total_with_chart_rel", 1.0, 0.0, DIFF, 0.0),
            ("chart_delta_w", "sea_level_chart_dW", 1.0, 0.0, 2e-3, 1e-8),
        ],
    );
    let outputs = case("3a")["outputs"].clone();
    let versus =
        |figure: &str| outcome.versus.iter().find(|versus| versus.figure == figure).unwrap();
    for (figure, prefix) in [("sensible", "ks"), ("total", "kt"), ("latent_net", "kl")] {
        let versus = versus(figure);
        for (cause, part) in &versus.parts {
            let name = format!("{prefix}_error_part_{}", cause.replace(' ', "_"));
            let theirs = outputs[&name].as_f64().unwrap();
            assert!(
                (part - theirs).abs() < 1e-4 + 1e-3 * theirs.abs(),
                "{name}: {part} against {theirs}"
            );
        }
        let sum: f64 = versus.parts.iter().map(|(_, part)| part).sum();
        assert!((sum - versus.error).abs() < 1e-12, "parts of {figure} add up to the error");
    }
    for (figure, name) in [
        ("total", "book_total_W"),
        ("sensible", "book_sensible_W"),
        ("latent_net", "book_latent_W"),
    ] {
        let theirs = outputs[name].as_f64().unwrap();
        assert!((versus(figure).book.si() / theirs - 1.0).abs() < DIFF, "{name}");
    }
}

#[test]
fn example_3b_book_constants_in_si() {
    let inputs = Inputs(case("3b")["inputs"].clone());
    let mut given = Given::default();
    inputs.elevation(&mut given);
    inputs.humidity(
        &mut given,
        "entering",
        "t1_C",
        "relative_humidity",
        Kind::RelativeHumidity,
        "RH1",
    );
    inputs.humidity(
        &mut given,
        "leaving",
        "t2_C",
        "relative_humidity",
        Kind::RelativeHumidity,
        "RH2",
    );
    inputs.flow(&mut given, "actual_leaving", Kind::AirFlow, "flow_actual_at_leaving_m3_s");
    let outcome = solve("book_constants", &given);
    compare(
        "3b",
        &outcome,
        &[
            ("sensible_here", "ks_here_kW_per_m3s_K", 1e-3, 0.0, 5e-6, 0.0),
            ("total_here", "kt_here_kg_m3", 1.0, 0.0, REL, 0.0),
            ("latent_air_here", "kl_air_here", 1e-3, 0.0, 2e-5, 0.0),
            ("latent_here", "kl_net_here", 1e-3, 0.0, 2e-5, 0.0),
            ("sensible_error", "ks_book_error_rel", 1.0, 0.0, 1e-4, 0.0),
            ("total_error", "kt_book_error_rel", 1.0, 0.0, 1e-4, 0.0),
            ("latent_error", "kl_book_error_rel", 1.0, 0.0, 2e-4, 0.0),
            ("sensible", "q_sensible_W", 1.0, 0.0, 5e-6, 0.0),
            ("latent", "q_latent_W", 1.0, 0.0, 2e-5, 0.0),
            ("total", "q_total_W", 1.0, 0.0, 5e-6, 0.0),
        ],
    );
}

#[test]
fn example_3c_the_book_is_good_enough_at_sea_level() {
    let inputs = Inputs(case("3c")["inputs"].clone());
    let mut given = Given::default();
    inputs.elevation(&mut given);
    inputs.wet_bulb(&mut given, "entering", "t1_C", "twb1_C");
    inputs.wet_bulb(&mut given, "leaving", "t2_C", "twb2_C");
    inputs.flow(&mut given, "actual_leaving", Kind::AirFlow, "flow_actual_at_leaving_m3_s");
    let flow = *given.reading("flow.rate").unwrap();
    given.put("flow.rate", Reading { unit: Unit::find("cfm"), ..flow });
    let k = 1.959_964;
    for point in ["entering", "leaving"] {
        given = given
            .within(&format!("{point}.dry_bulb"), k * inputs.number("u_t_K"))
            .within(&format!("{point}.wet_bulb"), k * inputs.number("u_twb_K"));
    }
    given = given.within("flow.rate", k * inputs.number("u_flow_rel") * flow.amount.si());
    let worked =
        dewledger_checks::doubt::work_out(find("book_constants").unwrap(), &given).unwrap();
    let per_cfm = 3600.0 / 1_055.055_852_62 * 4.719_474_432e-4;
    compare(
        "3c",
        &worked.outcome,
        &[
            ("sensible_here", "ks_here", per_cfm / 1.8, 0.0, 2e-5, 0.0),
            ("sensible_error", "ks_book_error_rel", 1.0, 0.0, 1e-3, 0.0),
            ("total_error", "kt_book_error_rel", 1.0, 0.0, 1e-3, 0.0),
        ],
    );
    let verdicts: Vec<_> =
        worked.outcome.notes.iter().filter(|note| note.code.starts_with("verdict.")).collect();
    assert_eq!(verdicts.len(), 3);
    let si = dewledger_quantities::UnitChoice::ip();
    for verdict in verdicts {
        let says = verdict.lead.say(&si);
        assert!(
            says.contains("good enough here") || says.contains("within the readings’ doubt"),
            "{says}"
        );
    }
}

#[test]
fn example_4a_three_streams() {
    let inputs = case("4a")["inputs"].clone();
    let mut given = Given::default();
    given.choose("streams", "3");
    put(&mut given, "pressure.elevation", Kind::Elevation, 300.0);
    for (index, stream) in inputs["streams"].as_array().unwrap().iter().enumerate() {
        let number = index + 1;
        let prefix = format!("stream{number}");
        put(
            &mut given,
            &format!("{prefix}.dry_bulb"),
            Kind::Temperature,
            stream["t_C"].as_f64().unwrap() + 273.15,
        );
        given.choose(format!("{prefix}.humidity_by"), "relative_humidity");
        let rh = stream["RH"].as_f64().or_else(|| stream["RH_over_liquid"].as_f64()).unwrap();
        put(&mut given, &format!("{prefix}.relative_humidity"), Kind::RelativeHumidity, rh);
        put(
            &mut given,
            &format!("{prefix}_flow.rate"),
            Kind::AirFlow,
            stream["flow_actual_m3_s"].as_f64().unwrap(),
        );
        given.choose(format!("{prefix}_flow.basis"), "actual");
    }
    compare(
        "4a",
        &solve("mixing", &given),
        &[
            ("dry_air_1", "m_return_kg_s", 1.0, 0.0, REL, 0.0),
            ("dry_air_2", "m_outdoor_kg_s", 1.0, 0.0, REL, 0.0),
            ("dry_air", "m_total_kg_s", 1.0, 0.0, REL, 0.0),
            // One stream is over supercooled water, where the two routes differ by 2.4e-5.
            ("humidity_ratio", "W", 1.0, 0.0, 5e-6, 0.0),
            ("enthalpy", "h_J_kg", 1.0, 0.0, REL, 0.0),
            ("dry_bulb", "t_C", 1.0, -273.15, 0.0, 1e-4),
            ("relative_humidity", "RH", 1.0, 0.0, 5e-6, 0.0),
            ("specific_volume", "v_m3_kg", 1.0, 0.0, REL, 0.0),
            ("flow", "flow_mixed_m3_s", 1.0, 0.0, REL, 0.0),
            ("share_mass_2", "outdoor_share_mass", 1.0, 0.0, REL, 0.0),
            ("share_volume_2", "outdoor_share_volume", 1.0, 0.0, REL, 0.0),
            ("dry_bulb_by_volume", "t_by_volume_weighting_C", 1.0, -273.15, 0.0, 1e-4),
        ],
    );
}

#[test]
fn example_4b_fog() {
    let inputs = case("4b")["inputs"].clone();
    let mut given = Given::default();
    put(&mut given, "pressure.elevation", Kind::Elevation, inputs["elevation_m"].as_f64().unwrap());
    for (index, stream) in inputs["streams"].as_array().unwrap().iter().enumerate() {
        let prefix = format!("stream{}", index + 1);
        put(
            &mut given,
            &format!("{prefix}.dry_bulb"),
            Kind::Temperature,
            stream["t_C"].as_f64().unwrap() + 273.15,
        );
        let (by, rh) = match stream["RH_over_ice"].as_f64() {
            Some(rh) => ("relative_humidity_over_ice", rh),
            None => ("relative_humidity", stream["RH"].as_f64().unwrap()),
        };
        given.choose(format!("{prefix}.humidity_by"), by);
        put(&mut given, &format!("{prefix}.{by}"), Kind::RelativeHumidity, rh);
        put(
            &mut given,
            &format!("{prefix}_flow.rate"),
            Kind::AirFlow,
            stream["flow_actual_m3_s"].as_f64().unwrap(),
        );
        given.choose(format!("{prefix}_flow.basis"), "actual");
    }
    let outcome = solve("mixing", &given);
    compare(
        "4b",
        &outcome,
        &[
            ("dry_air_1", "m1_kg_s", 1.0, 0.0, REL, 0.0),
            ("dry_air_2", "m2_kg_s", 1.0, 0.0, REL, 0.0),
            ("water_total", "W_total", 1.0, 0.0, REL, 0.0),
            ("enthalpy", "h_J_kg", 1.0, 0.0, 5e-6, 0.0),
            ("dry_bulb", "t_C", 1.0, -273.15, 0.0, 1e-4),
            ("humidity_ratio", "W_vapour", 1.0, 0.0, 1e-5, 0.0),
            ("fog", "fog_liquid_kg_kg", 1.0, 0.0, DIFF, 0.0),
            ("fog_flow", "fog_kg_h", 3600.0, 0.0, DIFF, 0.0),
        ],
    );
    assert!(outcome.notes.iter().any(|note| note.code == "fog"));
}

#[test]
fn example_6a_bucket_against_states() {
    let inputs = Inputs(case("6a")["inputs"].clone());
    let mut given = Given::default();
    inputs.elevation(&mut given);
    inputs.humidity(
        &mut given,
        "entering",
        "t1_C",
        "relative_humidity",
        Kind::RelativeHumidity,
        "RH1",
    );
    inputs.humidity(
        &mut given,
        "leaving",
        "t2_C",
        "relative_humidity",
        Kind::RelativeHumidity,
        "RH2",
    );
    inputs.flow(&mut given, "actual_leaving", Kind::AirFlow, "flow_actual_at_leaving_m3_s");
    put(&mut given, "fill1.volume", Kind::WaterVolume, inputs.number("bucket_L") * 1e-3);
    put(&mut given, "fill1.time", Kind::Duration, inputs.number("time_s"));
    put(&mut given, "drain.water_temperature", Kind::Temperature, inputs.kelvin("water_C"));
    compare(
        "6a",
        &solve("condensate", &given),
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, REL, 0.0),
            ("states", "rate_states_kg_s", 1.0, 0.0, 1e-5, 0.0),
            ("states_volume", "rate_states_L_h", 3.6e6, 0.0, 1e-5, 0.0),
            ("drain", "rate_bucket_kg_s", 1.0, 0.0, REL, 0.0),
            ("drain_volume", "rate_bucket_L_h", 3.6e6, 0.0, REL, 0.0),
            ("ratio", "ratio", 1.0, 0.0, 1e-5, 0.0),
            ("latent_air", "latent_air_W", 1.0, 0.0, 1e-5, 0.0),
            ("latent_net", "latent_net_W", 1.0, 0.0, 1e-5, 0.0),
            ("latent_net_drain", "latent_from_bucket_net_W", 1.0, 0.0, 1e-5, 0.0),
            ("latent_air_drain", "latent_from_bucket_air_W", 1.0, 0.0, 1e-5, 0.0),
            ("dry_air_from_drain", "m_da_from_bucket_kg_s", 1.0, 0.0, 1e-5, 0.0),
            ("flow_from_drain", "flow_from_bucket_m3_s", 1.0, 0.0, 1e-5, 0.0),
            ("w2_from_drain", "W2_from_bucket", 1.0, 0.0, 1e-5, 0.0),
            ("states_daily", "litres_per_day", 1e3, 0.0, 1e-5, 0.0),
        ],
    );
}

#[test]
fn example_6b_a_season_by_outdoor_states() {
    let inputs = case("6b")["inputs"].clone();
    let number = |name: &str| inputs[name].as_f64().unwrap();
    let mut given = Given::default();
    put(&mut given, "pressure.elevation", Kind::Elevation, number("elevation_m"));
    let air = [("entering", 27.0, 0.6), ("leaving", number("leaving_t_C"), number("leaving_RH"))];
    for (point, t, rh) in air {
        put(&mut given, &format!("{point}.dry_bulb"), Kind::Temperature, t + 273.15);
        put(&mut given, &format!("{point}.relative_humidity"), Kind::RelativeHumidity, rh);
        given.choose(format!("{point}.humidity_by"), "relative_humidity");
    }
    put(&mut given, "flow.rate", Kind::StandardAirFlow, number("flow_standard_m3_s"));
    put(&mut given, "flow.standard_density", Kind::Density, number("standard_density_kg_m3"));
    given.choose("flow.basis", "standard");
    let bins = inputs["bins"].as_array().unwrap();
    given.choose("bins", bins.len().to_string());
    for (index, bin) in bins.iter().enumerate() {
        let number = index + 1;
        put(
            &mut given,
            &format!("bin{number}.hours"),
            Kind::Duration,
            bin["hours"].as_f64().unwrap() * 3600.0,
        );
        put(
            &mut given,
            &format!("bin{number}.humidity_ratio"),
            Kind::HumidityRatio,
            bin["W"].as_f64().unwrap(),
        );
    }
    compare(
        "6b",
        &solve("condensate", &given),
        &[
            ("dry_air", "m_da_kg_s", 1.0, 0.0, REL, 0.0),
            ("bin_1", "bin1_kg", 1.0, 0.0, 1e-5, 0.0),
            ("bin_2", "bin2_kg", 1.0, 0.0, 1e-5, 0.0),
            ("bin_3", "bin3_kg", 1.0, 0.0, 1e-5, 0.0),
            ("bin_4", "bin4_kg", 1.0, 0.0, 1e-5, 0.0),
            ("season", "total_kg", 1.0, 0.0, 1e-5, 0.0),
            // By the density at the leaving dry bulb there, at the wet bulb here.
            ("season_volume", "total_L", 1e3, 0.0, 1e-4, 0.0),
        ],
    );
}

/// Repeated fills: 4.0 L in 612, 548, 505 s are one filling coil (elementary arithmetic).
#[test]
fn fills_that_rise_are_a_filling_coil() {
    let mut given = Given::default();
    given.choose("fills", "3");
    for (index, seconds) in [612.0, 548.0, 505.0].into_iter().enumerate() {
        put(&mut given, &format!("fill{}.volume", index + 1), Kind::WaterVolume, 4e-3);
        put(&mut given, &format!("fill{}.time", index + 1), Kind::Duration, seconds);
    }
    let outcome = solve("condensate", &given);
    for (key, litres_an_hour) in
        [("fill_1", 23.529_412), ("fill_2", 26.277_372), ("fill_3", 28.514_851)]
    {
        assert!((outcome.amount(key).unwrap().si() * 3.6e6 - litres_an_hour).abs() < 1e-6);
    }
    assert!(outcome.notes.iter().any(|note| note.code == "still_rising"));
    assert!(outcome.amount("drain_volume").is_none(), "no mean is offered");
}
