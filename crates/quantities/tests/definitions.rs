//! Every unit against definitions from outside: UCUM's composed from its base units, and the factors that NIST SP 811
//! prints.

mod ucum;

use dewledger_quantities::{Kind, Unit};

/// The stored SI unit of a kind as a UCUM code.
fn stored(kind: Kind) -> &'static str {
    match kind.si_suffix() {
        "k" => "K",
        "ratio" | "kg_kg" => "1",
        "j_kg" => "J/kg",
        "m3_kg" => "m3/kg",
        "kg_m3" => "kg/m3",
        "j_kg_k" => "J/(kg.K)",
        "m3_s" => "m3/s",
        "kg_s" => "kg/s",
        "w" => "W",
        "j" => "J",
        "w_m2" => "W/m2",
        "w_m" => "W/m",
        "w_m2_k" => "W/(m2.K)",
        "w_m_k" => "W/(m.K)",
        "pa" => "Pa",
        "m" => "m",
        "m2" => "m2",
        "m3" => "m3",
        "kg" => "kg",
        "m_s" => "m/s",
        "s" => "s",
        "v" => "V",
        "a" => "A",
        "per_s" => "1/s",
        "j_m3_k" => "J/(m3.K)",
        "j_m3" => "J/m3",
        other => panic!("{other} has no UCUM code here"),
    }
}

/// One step of a unit in stored SI units.
fn step(unit: &Unit, kind: Kind) -> f64 {
    // A thousand steps, so that the offset of a scale does not eat the digits.
    let si = |value| unit.to_si(kind, value).expect("it measures the kind");
    (si(1000.0) - si(0.0)) / 1000.0
}

#[test]
fn every_factor_is_what_its_ucum_code_weighs() {
    let mut checked = 0;
    for unit in Unit::all() {
        for kind in unit.kinds() {
            let (code, si) = (ucum::weigh(unit.ucum), ucum::weigh(stored(kind)));
            assert_eq!(
                code.powers, si.powers,
                "{} does not have the dimension of {kind:?}",
                unit.id
            );
            let outside = code.size / si.size;
            // UCUM keeps six digits of mercury's density; all else is exact up to rounding of the products.
            let tolerance = if unit.ucum.contains("Hg") { 3e-6 } else { 4e-13 };
            let off = step(unit, kind) / outside - 1.0;
            assert!(off.abs() < tolerance, "{} for {kind:?}: {off:e} from {outside}", unit.id);
            checked += 1;
        }
    }
    assert!(checked > 100, "{checked}");
}

/// NIST SP 811 (2008) appendix B.8, as printed there, to its seven digits.
#[test]
fn factors_are_those_of_nist_sp_811() {
    let cases = [
        ("cfm", Kind::AirFlow, 4.719_474e-4),
        ("Btu/h", Kind::Power, 2.930_711e-1),
        ("ton", Kind::Power, 3.516_853e3),
        ("Btu/lb", Kind::EnthalpyDifference, 2.326e3),
        ("Btu/lb.F", Kind::SpecificHeat, 4.1868e3),
        ("lb/ft3", Kind::Density, 1.601_846e1),
        ("psi", Kind::Pressure, 6.894_757e3),
        ("gal/min", Kind::WaterFlow, 6.309_020e-5),
        ("gal", Kind::WaterVolume, 3.785_412e-3),
        ("ft3", Kind::RoomVolume, 2.831_685e-2),
        ("Btu/ft3", Kind::HeatingValue, 3.725_895e4),
        ("lb/h", Kind::MoistureFlow, 1.259_979e-4),
        ("fpm", Kind::Velocity, 5.08e-3),
        ("Btu/h.ft2", Kind::PowerPerArea, 3.154_591),
        ("Btu/h.ft2.F", Kind::FilmCoefficient, 5.678_263),
        ("Btu.in/h.ft2.F", Kind::ThermalConductivity, 0.144_227_9),
        ("Btu/h.ft.F", Kind::ThermalConductivity, 1.730_735),
        ("kWh", Kind::Energy, 3.6e6),
        ("inHg", Kind::Pressure, 3.386_389e3),
        ("inH2O", Kind::PressureDifference, 2.490_889e2),
    ];
    for (id, kind, factor) in cases {
        let off = step(Unit::find(id).unwrap(), kind) / factor - 1.0;
        // Half a unit of the seventh digit.
        assert!(off.abs() < 3e-7, "{id}: {off:e}");
    }
}

/// The constants of the handbooks from the same units: 1.08, 4.5, 0.68 and 4840 at 0.075 lb/ft³ (common practice).
#[test]
fn book_constants_come_out_of_their_units() {
    let density = Unit::find("lb/ft3").unwrap().to_si(Kind::Density, 0.075).unwrap();
    let total = Unit::find("lb/h.cfm").unwrap();
    // 0.075 lb/ft³ * 60 min/h = 4.5, exactly.
    assert!((total.from_si(Kind::TotalConstant, density).unwrap() - 4.5).abs() < 1e-12);
    let heat = Unit::find("Btu/lb.F").unwrap().to_si(Kind::SpecificHeat, 0.24).unwrap();
    let sensible = Unit::find("Btu/h.cfm.F").unwrap();
    assert!(
        (sensible.from_si(Kind::SensibleConstant, density * heat).unwrap() - 1.08).abs() < 1e-12
    );
    let of_water = Unit::find("Btu/lb").unwrap().to_si(Kind::ProcessSlope, 1076.0).unwrap();
    let latent = |id: &str| {
        Unit::find(id).unwrap().from_si(Kind::LatentConstant, density * of_water).unwrap()
    };
    assert!((latent("Btu/h.cfm.(lb/lb)") - 4842.0).abs() < 1e-9);
    assert!((latent("Btu/h.cfm.(gr/lb)") - 4842.0 / 7000.0).abs() < 1e-12);
}

/// Fixed points of the scales: ice and steam point of both (by their definitions), and where they meet.
#[test]
fn temperatures_meet_at_their_fixed_points() {
    let si = |id: &str, value| Unit::find(id).unwrap().to_si(Kind::Temperature, value).unwrap();
    for (c, f, k) in [(0.0, 32.0, 273.15), (100.0, 212.0, 373.15), (-40.0, -40.0, 233.15)] {
        for other in [si("degF", f), si("K", k)] {
            assert!((si("degC", c) - other).abs() < 1e-10, "{c}");
        }
    }
}

/// Dry air at 0 °C has 7.6857 Btu/lb on the scale that is zero at 0 °F (the tables' two reference states).
#[test]
fn enthalpy_of_moist_air_has_two_zeros_and_its_differences_one() {
    let unit = Unit::find("Btu/lb").unwrap();
    assert!((unit.from_si(Kind::Enthalpy, 0.0).unwrap() - 7.6857).abs() < 1e-12);
    assert!(unit.to_si(Kind::Enthalpy, 7.6857).unwrap().abs() < 1e-9);
    for kind in [Kind::EnthalpyDifference, Kind::WaterEnthalpy, Kind::ProcessSlope] {
        assert!(unit.from_si(kind, 0.0).unwrap().abs() < 1e-12);
    }
}
