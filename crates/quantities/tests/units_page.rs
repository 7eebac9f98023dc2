//! `docs/units.md` is the table of units as a page. This writes it anew in memory and holds it against the file.

use std::collections::BTreeSet;
use std::fmt::Write as _;
use std::path::PathBuf;

use dewledger_quantities::{Kind, Unit, UnitChoice};

/// Set to write the page instead of checking it.
const WRITE: &str = "DEWLEDGER_WRITE_DOCS";

const HEAD: &str = "\
# Units

This page is made from the table in `crates/quantities/src/unit/table.rs`. After a change there, write it anew:

    DEWLEDGER_WRITE_DOCS=1 cargo test -p dewledger-quantities --test units_page

A value is stored in the SI unit named under each quantity, and as it was typed. *One is* says what one of the unit is in
that SI unit; where a scale begins elsewhere, what is added stands behind it. *Decimals* are shown at least; small values
get more. Behind a number, the identifier, the symbol and the further spellings are read as the unit, in capitals or
not, with or without spaces, full stops and brackets; a power may be `3`, `^3` or `³`.

The inch is 25.4 mm, the pound 0.453 592 37 kg, the US gallon 231 cubic inches, the Btu that of the International Table,
1055.055 852 62 J, the refrigeration ton 12 000 Btu/h (NIST SP 811, 2008). An inch of mercury is that of 0 °C, an inch of
water that of 4 °C, both at standard gravity, 9.806 65 m/s². Enthalpy of moist air is zero for dry air at 0 °C in SI units and
at 0 °F in IP units, 7.6857 Btu/lb apart; its differences and the enthalpy of water and steam have one zero.
UCUM codes are those of The Unified Code for Units of Measure; a difference in °F is written as its degree Rankine.
";

/// A factor with as many digits as it needs, at most ten.
fn factor(value: f64) -> String {
    let text = if value == 0.0 || (1e-3..1e6).contains(&value.abs()) {
        format!("{:.*}", places(value), value)
    } else {
        return scientific(value);
    };
    if text.contains('.') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// Decimals that give ten significant digits.
fn places(value: f64) -> usize {
    let whole = value.abs().log10().floor().max(-3.0);
    (1_u8..=13).find(|places| 9.0 - whole <= f64::from(*places)).map_or(0, usize::from)
}

fn scientific(value: f64) -> String {
    let text = format!("{value:.9e}");
    let (mantissa, exponent) = text.split_once('e').expect("a power of ten stands in it");
    let mantissa = mantissa.trim_end_matches('0').trim_end_matches('.');
    let exponent = exponent.replace('-', "−");
    if mantissa == "1" { format!("10^{exponent}") } else { format!("{mantissa} × 10^{exponent}") }
}

fn one_is(unit: &Unit, kind: Kind) -> String {
    let zero = unit.to_si(kind, 0.0).expect("it measures the kind");
    let step = 1.0 / unit.width_from_si(kind, 1.0).expect("it measures the kind");
    if zero.abs() > 0.0 {
        let sign = if zero < 0.0 { '−' } else { '+' };
        format!("{} {sign} {}", factor(step), factor(zero.abs()))
    } else {
        factor(step)
    }
}

/// Code in a table's cell.
fn code(text: &str) -> String {
    format!("`{}`", text.replace('|', "\\|"))
}

fn page() -> String {
    let (ip, si) = (UnitChoice::ip(), UnitChoice::si());
    let mut page = HEAD.to_owned();
    for kind in Kind::ALL {
        let label = kind.label();
        let title = label[..1].to_uppercase() + &label[1..];
        writeln!(page, "\n## {title}\n").expect("text takes text");
        writeln!(
            page,
            "`{}`, stored in {}. Presets: IP {}, SI {}.\n",
            kind.id(),
            stored(*kind),
            code(ip.get(*kind).id),
            code(si.get(*kind).id)
        )
        .expect("text takes text");
        page.push_str("| id | symbol | name | UCUM | one is | decimals | also typed |\n");
        page.push_str("| --- | --- | --- | --- | --- | --- | --- |\n");
        for unit in Unit::of(*kind) {
            let own = [unit.id, unit.symbol];
            let also: Vec<String> = unit
                .spellings_for(*kind)
                .filter(|spelling| !own.contains(spelling))
                .map(code)
                .collect();
            writeln!(
                page,
                "| {} | {} | {} | {} | {} | {} | {} |",
                code(unit.id),
                unit.symbol,
                unit.name,
                code(unit.ucum),
                one_is(unit, *kind),
                unit.decimals(*kind),
                also.join(" ")
            )
            .expect("text takes text");
        }
    }
    page
}

fn stored(kind: Kind) -> &'static str {
    match kind.si_suffix() {
        "k" => "K",
        "ratio" => "parts of one",
        "kg_kg" => "kg/kg of dry air",
        "j_kg" => "J/kg",
        "m3_kg" => "m³/kg of dry air",
        "kg_m3" => "kg/m³",
        "j_kg_k" => "J/(kg·K)",
        "m3_s" => "m³/s",
        "kg_s" => "kg/s",
        "w" => "W",
        "j" => "J",
        "w_m2" => "W/m²",
        "w_m" => "W/m",
        "w_m2_k" => "W/(m²·K)",
        "w_m_k" => "W/(m·K)",
        "pa" => "Pa",
        "m" => "m",
        "m2" => "m²",
        "m3" => "m³",
        "kg" => "kg",
        "m_s" => "m/s",
        "s" => "s",
        "v" => "V",
        "a" => "A",
        "per_s" => "1/s",
        "j_m3_k" => "J/(m³·K)",
        "j_m3" => "J/m³",
        other => panic!("{other} is not said on the page"),
    }
}

#[test]
fn the_page_is_current() {
    let path = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../../docs/units.md");
    let page = page();
    if std::env::var_os(WRITE).is_some() {
        std::fs::write(&path, &page).expect("the page can be written");
    }
    let found = std::fs::read_to_string(&path).unwrap_or_default();
    let changed = found.lines().zip(page.lines()).find(|(found, made)| found != made);
    assert!(
        found.lines().eq(page.lines()),
        "docs/units.md is not what the table says; first difference: {changed:?}. Write it anew with {WRITE}=1."
    );
}

/// The units that stand on the trade's instruments, schedules and nameplates (common practice).
#[test]
fn the_units_of_the_trade_are_there() {
    let ids: BTreeSet<&str> = Unit::all().iter().map(|unit| unit.id).collect();
    for id in [
        "degF", "degC", "K", "cfm", "ft3/min", "L/s", "m3/s", "m3/h", "Btu/h", "kBtu/h", "W", "kW",
        "ton", "gr/lb", "lb/lb", "g/kg", "kg/kg", "Btu/lb", "kJ/kg", "psi", "inHg", "inH2O", "Pa",
        "kPa", "hPa", "mbar", "gal/min", "gal/h", "L/h", "lb/h", "kg/h", "kg/s", "ft", "m", "in",
        "mm",
    ] {
        assert!(ids.contains(id), "{id}");
    }
}
