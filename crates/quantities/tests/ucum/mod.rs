//! A small reader of UCUM codes: enough to weigh every code of our table by UCUM's own definitions.
//!
//! Source: The Unified Code for Units of Measure, version 2.2, tables 1 to 13 and the grammar of its clause 2. Each atom
//! is written here as UCUM defines it, in terms of other atoms, down to its base units; nothing is taken from the
//! crate under test.

/// Size in UCUM's base units and the powers of length, mass, time, temperature and charge.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Measure {
    pub(crate) size: f64,
    pub(crate) powers: [i32; 5],
}

const ONE: Measure = Measure { size: 1.0, powers: [0; 5] };

impl Measure {
    fn times(self, other: Self, power: i32) -> Self {
        let mut powers = self.powers;
        for (mine, theirs) in powers.iter_mut().zip(other.powers) {
            *mine += theirs * power;
        }
        Self { size: self.size * other.size.powi(power), powers }
    }
}

fn base(index: usize) -> Measure {
    let mut powers = [0; 5];
    powers[index] = 1;
    Measure { size: 1.0, powers }
}

/// UCUM's atoms that our codes use, with UCUM's definitions: a number and a code in other atoms.
const ATOMS: &[(&str, f64, &str)] = &[
    ("10*", 10.0, "1"),
    ("%", 1.0, "10*-2"),
    ("[ppm]", 1.0, "10*-6"),
    ("J", 1.0, "kg.m2/s2"),
    ("W", 1.0, "J/s"),
    ("N", 1.0, "kg.m/s2"),
    ("Pa", 1.0, "N/m2"),
    ("V", 1.0, "J/C"),
    ("A", 1.0, "C/s"),
    ("bar", 1e5, "Pa"),
    ("L", 1.0, "dm3"),
    ("min", 60.0, "s"),
    ("h", 60.0, "min"),
    ("Cel", 1.0, "K"),
    ("[degF]", 5.0, "K/9"),
    ("[degR]", 5.0, "K/9"),
    ("[in_i]", 2.54, "cm"),
    ("[ft_i]", 12.0, "[in_i]"),
    ("[sft_i]", 1.0, "[ft_i]2"),
    ("[cft_i]", 1.0, "[ft_i]3"),
    ("[gal_us]", 231.0, "[in_i]3"),
    ("[gr]", 64.798_91, "mg"),
    ("[lb_av]", 7000.0, "[gr]"),
    ("[g]", 9.806_65, "m/s2"),
    ("[lbf_av]", 1.0, "[lb_av].[g]"),
    ("[psi]", 1.0, "[lbf_av]/[in_i]2"),
    ("m[H2O]", 9.806_65, "kPa"),
    ("[in_i'H2O]", 1.0, "m[H2O].[in_i]/m"),
    // UCUM rounds the metre of mercury to six digits (133.322 0 kPa); the conventional value is 133.322 387 415 kPa.
    ("m[Hg]", 133.322_0, "kPa"),
    ("[in_i'Hg]", 1.0, "m[Hg].[in_i]/m"),
    ("[Btu_IT]", 1.055_055_852_62, "kJ"),
];

/// Prefixes that our codes and the definitions above use.
const PREFIXES: &[(char, f64)] =
    &[('k', 1e3), ('M', 1e6), ('h', 1e2), ('d', 1e-1), ('c', 1e-2), ('m', 1e-3)];

/// Atoms that UCUM calls metric: only these take a prefix.
const METRIC: &[&str] = &["m", "g", "s", "K", "C", "J", "W", "N", "Pa", "V", "A", "bar", "L"];

/// Weighs a code. Panics on what UCUM does not define, which is what a test wants.
pub(crate) fn weigh(code: &str) -> Measure {
    let mut rest = code;
    let measure = term(&mut rest);
    assert!(rest.is_empty(), "{code}: {rest} is left over");
    measure
}

fn term(rest: &mut &str) -> Measure {
    let mut measure = component(rest);
    loop {
        let power = match rest.chars().next() {
            Some('.') => 1,
            Some('/') => -1,
            _ => return measure,
        };
        *rest = &rest[1..];
        measure = measure.times(component(rest), power);
    }
}

fn component(rest: &mut &str) -> Measure {
    if let Some(inner) = rest.strip_prefix('(') {
        *rest = inner;
        let measure = term(rest);
        *rest = rest.strip_prefix(')').expect("a bracket is closed");
        return measure;
    }
    let digits = rest.chars().take_while(char::is_ascii_digit).count();
    if digits > 0 && !rest.starts_with("10*") {
        let size = rest[..digits].parse().expect("digits are a number");
        *rest = &rest[digits..];
        return Measure { size, ..ONE };
    }
    let end = symbol_end(rest);
    let symbol = &rest[..end];
    *rest = &rest[end..];
    let power = rest
        .char_indices()
        .take_while(|(at, c)| c.is_ascii_digit() || (*at == 0 && matches!(c, '-' | '+')))
        .count();
    let exponent = if power == 0 { 1 } else { rest[..power].parse().expect("digits are a number") };
    *rest = &rest[power..];
    ONE.times(unit(symbol), exponent)
}

/// Where a unit's symbol ends: at an operator, a bracket or an exponent outside its square brackets.
fn symbol_end(rest: &str) -> usize {
    if rest.starts_with("10*") {
        return 3;
    }
    let mut square = false;
    for (at, character) in rest.char_indices() {
        match character {
            '[' => square = true,
            ']' => square = false,
            '.' | '/' | '(' | ')' | '0'..='9' | '-' | '+' if !square => return at,
            _ => {}
        }
    }
    rest.len()
}

fn unit(symbol: &str) -> Measure {
    if let Some(found) = atom(symbol) {
        return found;
    }
    let mut characters = symbol.chars();
    let first = characters.next().expect("a symbol has a character");
    let (_, factor) =
        PREFIXES.iter().find(|(prefix, _)| *prefix == first).unwrap_or_else(|| panic!("{symbol}"));
    let name = characters.as_str();
    assert!(METRIC.contains(&name), "{name} takes no prefix, in {symbol}");
    let unit = atom(name).unwrap_or_else(|| panic!("{symbol}"));
    Measure { size: unit.size * factor, ..unit }
}

fn atom(symbol: &str) -> Option<Measure> {
    if let Some(index) = ["m", "g", "s", "K", "C"].iter().position(|name| *name == symbol) {
        return Some(base(index));
    }
    let (_, number, code) = ATOMS.iter().find(|(name, _, _)| *name == symbol)?;
    let unit = weigh(code);
    Some(Measure { size: unit.size * number, ..unit })
}
