//! Surface condensation: worked cases by two routes, elementary integration, refusals and laws.

mod support;

use dewledger_checks::Given;
use dewledger_checks::surface::{Construction, Shape};
use dewledger_quantities::{
    HeatTransfer, Kind, Length, Quantity, ThermalConductivity, ThermodynamicTemperature,
};
use support::{Case, given, note, refused, say, si, solve, waits, withheld};

const CASES: &str = include_str!("data/surface.json");

fn duct() -> Given {
    let case = Case::of(CASES, "10a");
    given(
        &[("surface.by", "flat"), ("air.humidity_by", "relative_humidity")],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("air.dry_bulb", Kind::Temperature, case.kelvin("ambient_t_C")),
            ("air.relative_humidity", Kind::RelativeHumidity, case.input("ambient_RH")),
            ("construction.inside", Kind::Temperature, case.kelvin("inside_t_C")),
            ("construction.thickness", Kind::Length, case.input("insulation_thickness_m")),
            (
                "construction.conductivity",
                Kind::ThermalConductivity,
                case.input("conductivity_W_mK"),
            ),
        ],
    )
}

fn pipe() -> Given {
    let case = Case::of(CASES, "10b");
    given(
        &[("surface.by", "pipe"), ("air.humidity_by", "relative_humidity")],
        &[
            ("pressure.elevation", Kind::Elevation, case.input("elevation_m")),
            ("air.dry_bulb", Kind::Temperature, case.kelvin("ambient_t_C")),
            ("air.relative_humidity", Kind::RelativeHumidity, case.input("ambient_RH")),
            ("construction.inside", Kind::Temperature, case.kelvin("fluid_t_C")),
            ("construction.diameter", Kind::Length, case.input("pipe_outer_diameter_m")),
            ("construction.thickness", Kind::Length, case.input("insulation_thickness_m")),
            (
                "construction.conductivity",
                Kind::ThermalConductivity,
                case.input("conductivity_W_mK"),
            ),
            ("construction.film_outside", Kind::FilmCoefficient, case.input("film_out_W_m2K")),
        ],
    )
}

#[test]
fn a_duct_in_a_ceiling_void() {
    Case::of(CASES, "10a").hold(
        &solve("surface", &duct()),
        &[
            ("dew_point", "dew_point_C", 1.0, -273.15, 0.0, 1e-4),
            ("surface", "surface_C", 1.0, -273.15, 0.0, 1e-6),
            ("margin", "margin_K", 1.0, 0.0, 0.0, 1e-4),
            ("heat_flux", "heat_flux_W_m2", 1.0, 0.0, 1e-9, 0.0),
            ("thinnest", "min_thickness_m", 1.0, 0.0, 1e-4, 0.0),
            ("largest_humidity", "max_ambient_RH", 1.0, 0.0, 2e-6, 0.0),
        ],
    );
}

#[test]
fn a_chilled_water_pipe() {
    Case::of(CASES, "10b").hold(
        &solve("surface", &pipe()),
        &[
            ("dew_point", "dew_point_C", 1.0, -273.15, 0.0, 1e-4),
            ("surface", "surface_C", 1.0, -273.15, 0.0, 1e-6),
            ("margin", "margin_K", 1.0, 0.0, 0.0, 1e-4),
            ("heat_gain", "heat_gain_W_m", 1.0, 0.0, 1e-9, 0.0),
            ("thinnest", "min_thickness_m", 1.0, 0.0, 1e-4, 0.0),
        ],
    );
}

fn construction(shape: Shape, thickness: f64) -> Construction {
    Construction {
        shape,
        inside: ThermodynamicTemperature::from_si(279.15),
        thickness: Length::from_si(thickness),
        conductivity: ThermalConductivity::from_si(0.036),
        film_outside: HeatTransfer::from_si(8.0),
    }
}

const ROOM: f64 = 302.15;

/// Elementary integration: 20 000 thin shells in series, each as if it were flat.
#[test]
fn a_pipe_is_a_sum_of_thin_shells() {
    let (r1, d, shells) = (0.030_15, 0.025, 20_000);
    let pipe = construction(Shape::Pipe { radius: Length::from_si(r1) }, d);
    let (surface, _) = pipe.surface(ThermodynamicTemperature::from_si(ROOM));
    let step = d / f64::from(shells);
    let round = std::f64::consts::TAU;
    let conduction: f64 = (0..shells)
        .map(|shell| step / (0.036 * round * (r1 + (f64::from(shell) + 0.5) * step)))
        .sum();
    let film = 1.0 / (8.0 * round * (r1 + d));
    let by_shells = ROOM - (ROOM - 279.15) * film / (conduction + film);
    assert!((surface.si() - by_shells).abs() < 1e-8, "{} against {by_shells}", surface.si());
}

/// A pipe of a very large radius is a flat wall; its thinnest insulation too.
#[test]
fn a_large_pipe_is_flat() {
    let inside = HeatTransfer::from_si(1e12);
    let flat = construction(Shape::Flat { inside }, 0.025);
    let pipe = construction(Shape::Pipe { radius: Length::from_si(1e4) }, 0.025);
    let room = ThermodynamicTemperature::from_si(ROOM);
    assert!((flat.surface(room).0.si() - pipe.surface(room).0.si()).abs() < 1e-4);
    let wanted = ThermodynamicTemperature::from_si(298.9);
    let thin = construction(Shape::Pipe { radius: Length::from_si(0.5) }, 0.025);
    let (flat, pipe) = (flat.thinnest(room, wanted).unwrap(), thin.thinnest(room, wanted).unwrap());
    assert!((pipe.si() / flat.si() - 1.0).abs() < 0.03 && pipe.si() < flat.si());
}

/// At the thinnest insulation the surface is where it was wanted.
#[test]
fn the_thinnest_insulation_brings_the_surface_there() {
    let room = ThermodynamicTemperature::from_si(ROOM);
    let wanted = ThermodynamicTemperature::from_si(298.9);
    let inside = HeatTransfer::from_si(25.0);
    for shape in [Shape::Flat { inside }, Shape::Pipe { radius: Length::from_si(0.03) }] {
        let thinnest = construction(shape, 0.01).thinnest(room, wanted).unwrap();
        let (surface, _) = construction(shape, thinnest.si()).surface(room);
        assert!((surface.si() - wanted.si()).abs() < 1e-9, "{shape:?}");
    }
}

#[test]
fn a_sweating_diffuser() {
    // 24 °C and 60 %: dew point 15.8 °C; face 13.9 °C is short by 1.9 K (a field visit of this project).
    let outcome = solve(
        "surface",
        &given(
            &[("air.humidity_by", "relative_humidity")],
            &[
                ("pressure.elevation", Kind::Elevation, 0.0),
                ("air.dry_bulb", Kind::Temperature, 297.15),
                ("air.relative_humidity", Kind::RelativeHumidity, 0.60),
                ("surface.temperature", Kind::Temperature, 287.05),
            ],
        ),
    );
    assert!((si(&outcome, "margin") + 1.9).abs() < 0.06, "{}", si(&outcome, "margin"));
    assert!(say(&note(&outcome, "plain_run").lead).starts_with("This is the plain run."));
}

#[test]
fn what_cannot_be_is_refused() {
    let with = |base: Given, key: &str, kind: Kind, si: f64| {
        let mut given = base;
        given.put(key, dewledger_checks::Reading::new(dewledger_quantities::Amount::new(kind, si)));
        refused("surface", &given)
    };
    let (field, code, says) = with(duct(), "construction.inside", Kind::Temperature, 310.15);
    assert_eq!((field.as_str(), code), ("construction.inside", "inside_warmer"));
    assert_eq!(
        says,
        "Inside it is 37.0 °C, warmer than the air around it at 27.8 °C: the outside of this surface cannot sweat. Read the surface itself."
    );
    let (_, _, says) = with(duct(), "construction.conductivity", Kind::ThermalConductivity, 40.0);
    assert!(
        says.ends_with(
            "is outside 0.01 to 2 W/(m·K): no insulation is that. Check the number and its unit."
        ),
        "{says}"
    );
    let (_, _, says) = with(duct(), "construction.thickness", Kind::Length, 0.0);
    assert!(says.contains("is outside 1 to 500 mm"), "{says}");
    let (_, _, says) = with(pipe(), "construction.diameter", Kind::Length, 3.0);
    assert!(says.contains("is outside 5 mm to 2 m"), "{says}");
    let (_, _, says) = with(duct(), "construction.film_outside", Kind::FilmCoefficient, 0.5);
    assert!(says.contains("is beyond any surface of this kind"), "{says}");
    let (_, _, says) = with(duct(), "margin.wanted", Kind::TemperatureDifference, 30.0);
    assert!(says.contains("is outside 0 to 10 K"), "{says}");
}

#[test]
fn where_no_insulation_reaches_the_margin_it_is_said() {
    let mut damp = duct();
    damp.put(
        "air.relative_humidity",
        dewledger_checks::Reading::new(dewledger_quantities::Amount::new(
            Kind::RelativeHumidity,
            0.96,
        )),
    );
    let outcome = solve("surface", &damp);
    assert_eq!(
        withheld(&outcome, "thinnest"),
        "At this humidity no insulation reaches the margin: dry the air"
    );
    let lead = say(&note(&outcome, "humid_room").lead);
    assert_eq!(lead, "At 96.0 % two points of humidity move the dew point by 0.4 K.");
}

#[test]
fn the_film_is_swept_and_a_low_one_is_colder() {
    let outcome = solve("surface", &duct());
    let table = &outcome.tables[0];
    assert_eq!((table.columns.len(), table.rows.len()), (4, 6));
    let surface = |row: usize| match &table.rows[row][1] {
        dewledger_checks::drawn::Cell::Amount(amount) => amount.si(),
        dewledger_checks::drawn::Cell::Words(words) => panic!("{words:?}"),
    };
    assert!((0..5).all(|row| surface(row) < surface(row + 1)));
}

#[test]
fn it_waits_for_what_it_needs() {
    let bare = given(&[("surface.by", "pipe")], &[("pressure.elevation", Kind::Elevation, 0.0)]);
    assert_eq!(waits("surface", &bare), ["air.dry_bulb", "air.wet_bulb"]);
    let mut air = duct();
    air.choose("surface.by", "pipe");
    assert_eq!(waits("surface", &air), ["construction.diameter"]);
}
