//! What a person may type, and what is refused: tables.

use dewledger_quantities::{Entry, Kind, ReadError, Typed, Unit, read};

fn unit(id: &str) -> &'static Unit {
    Unit::find(id).expect("a unit of the table")
}

fn typed(kind: Kind, text: &str, id: &str) -> Typed {
    match read(kind, text, unit(id)) {
        Ok(Entry::Read(typed)) => typed,
        other => panic!("{text}: {other:?}"),
    }
}

fn value(kind: Kind, text: &str, id: &str) -> f64 {
    typed(kind, text, id).value
}

fn says(kind: Kind, text: &str, id: &str) -> String {
    read(kind, text, unit(id)).expect_err(text).to_string()
}

#[test]
fn blank_is_not_read() {
    for blank in ["", "  ", "\u{a0}", "\t\n"] {
        assert_eq!(read(Kind::Temperature, blank, unit("degC")), Ok(Entry::NotRead));
    }
}

#[test]
fn zero_is_read() {
    for zero in ["0", "0.0", "0,00", "-0", ".0"] {
        assert!(value(Kind::Temperature, zero, "degC").abs() < f64::MIN_POSITIVE, "{zero}");
    }
}

#[test]
fn both_marks_and_every_minus_are_read() {
    for text in
        ["-17.5", "−17.5", "–17,5", "—17.5", "17.5-", "17,5−", " - 17.5 ", "-17.5 °C", "−17,5C"]
    {
        assert!((value(Kind::Temperature, text, "degC") + 17.5).abs() < 1e-12, "{text}");
    }
    assert!(typed(Kind::Temperature, "17,1", "degC").comma);
    assert!(!typed(Kind::Temperature, "17.1", "degC").comma);
    assert!((value(Kind::AirFlow, "12 400", "cfm") - 12_400.0).abs() < 1e-9);
    assert!((value(Kind::AirFlow, "12’400,5 cfm", "L/s") - 12_400.5).abs() < 1e-9);
    assert!((value(Kind::HumidityRatio, "9.1e-3", "kg/kg") - 9.1e-3).abs() < 1e-15);
}

#[test]
fn a_unit_typed_with_the_number_wins() {
    let cases = [
        (Kind::Temperature, "55 F", "degC", "degF"),
        (Kind::Temperature, "55°F", "degC", "degF"),
        (Kind::Temperature, "55 º f", "degC", "degF"),
        (Kind::Temperature, "55 deg. F", "degC", "degF"),
        (Kind::Temperature, "55℉", "degC", "degF"),
        (Kind::Temperature, "25C", "degF", "degC"),
        (Kind::Temperature, "298.2 K", "degF", "K"),
        (Kind::TemperatureDifference, "5 °F", "K", "degF_difference"),
        (Kind::TemperatureDifference, "5 °C", "degF_difference", "K"),
        (Kind::AirFlow, "12400 cfm", "L/s", "cfm"),
        (Kind::AirFlow, "12400CFM", "L/s", "cfm"),
        (Kind::AirFlow, "12400 acfm", "L/s", "cfm"),
        (Kind::StandardAirFlow, "12400 scfm", "L/s", "cfm"),
        (Kind::AirFlow, "12400 ft³/min", "L/s", "ft3/min"),
        (Kind::AirFlow, "12400 cu ft/min", "L/s", "ft3/min"),
        (Kind::AirFlow, "2 m^3/s", "cfm", "m3/s"),
        (Kind::AirFlow, "7200 m³/hr", "cfm", "m3/h"),
        (Kind::Pressure, "83.4 kPa", "inHg", "kPa"),
        (Kind::Pressure, "29.42 inHg", "kPa", "inHg"),
        (Kind::Pressure, "29.42 in. Hg", "kPa", "inHg"),
        (Kind::Pressure, "14.696 psia", "kPa", "psi"),
        (Kind::PressureDifference, "1.2 in. w.c.", "Pa", "inH2O"),
        (Kind::PressureDifference, "1.2\" wc", "Pa", "inH2O"),
        (Kind::PressureDifference, "1.2 in. of water", "Pa", "inH2O"),
        (Kind::Power, "3 tons", "kW", "ton"),
        (Kind::Power, "3 ton", "kW", "ton"),
        (Kind::Power, "318874 Btuh", "kW", "Btu/h"),
        (Kind::Power, "318.9 kBtu/hr", "kW", "kBtu/h"),
        (Kind::HumidityRatio, "5 gr/lb", "g/kg", "gr/lb"),
        (Kind::HumidityRatio, "5 grains/lb", "g/kg", "gr/lb"),
        (Kind::WaterFlow, "24 gpm", "L/s", "gal/min"),
        (Kind::WaterFlow, "24 gal per min", "L/s", "gal/min"),
        (Kind::MoistureFlow, "3 lbs/hr", "kg/h", "lb/h"),
        (Kind::RelativeHumidity, "45 %", "1", "%"),
        (Kind::RelativeHumidity, "45% RH", "1", "%"),
        (Kind::RelativeHumidity, "45 percent", "1", "%"),
        (Kind::Elevation, "5280 ft", "m", "ft"),
        (Kind::Elevation, "5280'", "m", "ft"),
        (Kind::Length, "24\"", "mm", "in"),
        (Kind::PowerPerArea, "12 Btu/(h·ft²)", "W/m2", "Btu/h.ft2"),
        (Kind::Duration, "2.5 min", "s", "min"),
    ];
    for (kind, text, field, used) in cases {
        let typed = typed(kind, text, field);
        assert_eq!((typed.unit.id, typed.unit_typed), (used, true), "{text}");
    }
}

#[test]
fn every_spelling_of_every_unit_is_read() {
    for kind in Kind::ALL {
        let field = Unit::of(*kind).last().unwrap();
        for unit in Unit::of(*kind) {
            for spelling in unit.spellings_for(*kind) {
                for text in [format!("7 {spelling}"), format!("7\u{a0}{}", spelling.to_uppercase())]
                {
                    let Ok(Entry::Read(typed)) = read(*kind, &text, field) else {
                        panic!("{text} as {kind:?}")
                    };
                    assert_eq!(
                        (typed.unit.id, typed.unit_typed),
                        (unit.id, true),
                        "{text} as {kind:?}"
                    );
                }
            }
        }
    }
}

#[test]
fn a_degree_sign_alone_leaves_the_scale_to_the_field() {
    let typed = typed(Kind::Temperature, "55°", "degF");
    assert_eq!((typed.unit.id, typed.unit_typed), ("degF", false));
    assert!(read(Kind::AirFlow, "55°", unit("cfm")).is_err());
}

/// Number, kind, unit, and the two readings.
#[test]
fn what_could_be_two_numbers_is_refused_with_both() {
    let cases = [
        ("10,000", Kind::AirFlow, "cfm", "10.0", "10\u{a0}000"),
        ("10.000", Kind::AirFlow, "cfm", "10.0", "10\u{a0}000"),
        ("10,000 cfm", Kind::AirFlow, "L/s", "10.0 cfm", "10\u{a0}000 cfm"),
        ("-1,250", Kind::Power, "Btu/h", "−1.25", "−1250"),
        ("1,234", Kind::AirFlow, "L/s", "1.2340", "1234"),
        ("1.234,5", Kind::AirFlow, "cfm", "1234.5", "1.2345"),
        ("1,234.5", Kind::AirFlow, "cfm", "1234.5", "1.2345"),
        ("1,234,567", Kind::Power, "Btu/h", "1234.5670", "1\u{a0}234\u{a0}567"),
        ("1.013", Kind::Pressure, "hPa", "1.0130", "1013"),
        ("101,325", Kind::Pressure, "Pa", "101.3250", "101\u{a0}325"),
        ("5,280", Kind::Elevation, "ft", "5.28", "5280"),
        ("1,200", Kind::MoleFraction, "ppm", "1.2", "1200"),
        ("1.250", Kind::Length, "mm", "1.25", "1250"),
    ];
    for (text, kind, id, first, second) in cases {
        match read(kind, text, unit(id)) {
            Err(ReadError::Ambiguous { one, other, .. }) => {
                assert_eq!((one.as_str(), other.as_str()), (first, second));
            }
            other => panic!("{text}: {other:?}"),
        }
    }
    assert_eq!(
        says(Kind::AirFlow, "10,000", "cfm"),
        "“10,000” can be read as 10.0 or as 10\u{a0}000. Type it without the mark, or say which."
    );
}

#[test]
fn three_decimals_are_read_where_an_instrument_shows_them_or_thousands_cannot_be() {
    let cases = [
        (Kind::Density, "1,204", "kg/m3", 1.204),
        (Kind::Pressure, "14.696", "psi", 14.696),
        (Kind::Pressure, "101.325", "kPa", 101.325),
        (Kind::Pressure, "29.921", "inHg", 29.921),
        (Kind::PressureDifference, "1.250", "inH2O", 1.25),
        (Kind::Temperature, "0.125", "degC", 0.125),
        (Kind::Temperature, "21.375", "degC", 21.375),
        (Kind::RelativeHumidity, "45,125", "%", 45.125),
        (Kind::HumidityRatio, "10.361", "g/kg", 10.361),
        (Kind::AirFlow, "1.250", "m3/s", 1.25),
        (Kind::Velocity, "2.540", "m/s", 2.54),
        (Kind::WaterVolume, "1.250", "L", 1.25),
        (Kind::Ratio, "1.150", "1", 1.15),
        (Kind::AirFlow, "1 234.567", "cfm", 1234.567),
        (Kind::AirFlow, "0.250", "L/s", 0.25),
        (Kind::AirFlow, "1234.567", "cfm", 1234.567),
        (Kind::AirFlow, "10.00", "cfm", 10.0),
        (Kind::AirFlow, "10,0000", "cfm", 10.0),
    ];
    for (kind, text, id, expected) in cases {
        assert!((value(kind, text, id) - expected).abs() < 1e-12, "{text} {id}");
    }
}

#[test]
fn refusals_say_what_and_what_mends_it() {
    let cases = [
        (
            Kind::Temperature,
            "x",
            "“x” is not a number. Type digits, with a point or a comma for decimals.",
        ),
        (
            Kind::Temperature,
            "21 5",
            "“21 5” looks like two numbers. Type one; a space may only part thousands.",
        ),
        (
            Kind::Temperature,
            "55 zz",
            "“zz” is not a unit of temperature here. Choose one beside the field.",
        ),
        (
            Kind::Temperature,
            "55 cfm",
            "“cfm” is a unit of air flow, actual. This field takes temperature.",
        ),
        (
            Kind::AirFlow,
            "55 scfm",
            "“scfm” is a unit of air flow, standard. This field takes air flow, actual.",
        ),
        (
            Kind::StandardAirFlow,
            "55 acfm",
            "“acfm” is a unit of air flow, actual. This field takes air flow, standard.",
        ),
        (
            Kind::Pressure,
            "2 psig",
            "“psig” is a unit of pressure difference. This field takes pressure of the air.",
        ),
        (
            Kind::AirFlow,
            "3 tons",
            "“tons” is a unit of heat or power. This field takes air flow, actual.",
        ),
        (
            Kind::Mass,
            "3 tons",
            "“tons” can mean tons of 2000 lb or tonnes of 1000 kg. Type lb or kg.",
        ),
        (Kind::Power, "3 MBH", "“MBH” can mean thousand Btu/h or million Btu/h. Type kBtu/h."),
        (
            Kind::HumidityRatio,
            "72 gr",
            "“gr” can mean grains per pound or grams per kilogram. Type gr/lb or g/kg.",
        ),
        (
            Kind::PressureDifference,
            "2 in.",
            "“in.” can mean inches of water or inches of mercury. Type in. of water or inHg.",
        ),
        (Kind::Power, "1e999", "“1e999” is too large to be a reading."),
        (Kind::Power, "1e308", "“1e308” is too large to be a reading."),
    ];
    for (kind, text, sentence) in cases {
        let field = Unit::of(kind).next().unwrap();
        assert_eq!(read(kind, text, field).unwrap_err().to_string(), sentence, "{text}");
    }
}

#[test]
fn what_is_no_number_is_never_read() {
    for text in [
        "NaN", "inf", "-inf", "infinity", "1,,2", "--5", "5-6", "0x10", "1.2.3", "½", "٣", "five",
        "%", "°F",
    ] {
        assert!(read(Kind::Temperature, text, unit("degC")).is_err(), "{text}");
    }
    assert!(matches!(
        read(Kind::Temperature, &"9".repeat(61), unit("degC")),
        Err(ReadError::NotANumber { text }) if text.chars().count() == 24
    ));
}
