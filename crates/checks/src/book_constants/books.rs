//! The book's constants, what they are built from, and how an error is split among its causes.

use dewledger_quantities::{LatentConstant, Quantity, SensibleConstant, TotalConstant};

use crate::given::Given;

const BTU_IT_J: f64 = 1_055.055_852_62;
const POUND_KG: f64 = 0.453_592_37;
const CFM_M3_S: f64 = 0.028_316_846_592 / 60.0;
/// J/(m³ K) of one Btu/(h cfm °F).
const IP_SENSIBLE: f64 = BTU_IT_J / 3600.0 * 1.8 / CFM_M3_S;
/// kg/m³ of one lb/h per cfm.
const IP_TOTAL: f64 = POUND_KG / 3600.0 / CFM_M3_S;
/// J/m³ of one Btu/h per cfm per lb/lb.
const IP_LATENT: f64 = BTU_IT_J / 3600.0 / CFM_M3_S;
/// J/(kg K) of one Btu/(lb °F).
const IP_HEAT_CAPACITY: f64 = BTU_IT_J / POUND_KG * 1.8;
pub(super) const SENSIBLE: &str = "book.sensible";
pub(super) const TOTAL: &str = "book.total";
pub(super) const LATENT: &str = "book.latent";

/// A set of book constants and what they are built from, SI.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Books {
    pub(super) sensible: f64,
    pub(super) total: f64,
    pub(super) latent: f64,
    pub(super) density: f64,
    pub(super) heat_capacity: f64,
    pub(super) latent_heat: f64,
}

impl Books {
    /// 1.08, 4.5, 4840: 0.075 lb/ft³, 0.24 Btu/lb °F, 1076 Btu/lb.
    pub(super) const IP: Books = Books {
        sensible: 1.08 * IP_SENSIBLE,
        total: 4.5 * IP_TOTAL,
        latent: 4840.0 * IP_LATENT,
        density: 4.5 * IP_TOTAL,
        heat_capacity: 0.24 * IP_HEAT_CAPACITY,
        latent_heat: 1076.0 * BTU_IT_J / POUND_KG,
    };
    /// 1.23, 1.2, 3010: 1.2 kg/m³, 1.006 + 1.84 × 0.01 kJ/kg K, 2500 kJ/kg.
    pub(super) const SI: Books = Books {
        sensible: 1230.0,
        total: 1.2,
        latent: 3.01e6,
        density: 1.2,
        heat_capacity: 1006.0 + 1840.0 * 0.01,
        latent_heat: 2.5e6,
    };

    /// The set of the units that the flow was typed in, with the numbers that a person typed instead.
    pub(super) fn of(given: &Given, inch_pound: bool) -> Books {
        let mut books = if inch_pound { Books::IP } else { Books::SI };
        if let Some(sensible) = given.quantity::<SensibleConstant>(SENSIBLE) {
            books.sensible = sensible.si();
        }
        if let Some(total) = given.quantity::<TotalConstant>(TOTAL) {
            books.total = total.si();
        }
        if let Some(latent) = given.quantity::<LatentConstant>(LATENT) {
            books.latent = latent.si();
        }
        // 1.10 is built with the heat capacity of air that holds 1 % of water; 1.2 and 1.21 with dry air's.
        if inch_pound && (books.sensible / IP_SENSIBLE - 1.10).abs() < 0.005 {
            books.heat_capacity = (0.24 + 0.45 * 0.01) * IP_HEAT_CAPACITY;
        } else if !inch_pound && (1195.0..=1215.0).contains(&books.sensible) {
            books.heat_capacity = 1006.0;
        }
        books
    }
}

/// One constant here and in the book.
#[derive(Debug, Clone, PartialEq)]
pub struct Constant {
    /// Here, SI.
    pub here: f64,
    /// In the book, SI.
    pub book: f64,
    /// `book / here - 1`.
    pub error: f64,
    /// Signed causes that add up to the error.
    pub parts: Vec<(&'static str, f64)>,
}

/// `L(a, b) = (a - b) / ln(a / b)`, which is `a` where both are the same.
fn logarithmic_mean(a: f64, b: f64) -> f64 {
    let d = (a / b).ln();
    if d.abs() < 1e-8 { b * (1.0 + 0.5 * d) } else { b * d.exp_m1() / d }
}

/// A constant with the causes of its error; `logs` are the logarithms of the factors.
pub(super) fn constant(here: f64, book: f64, logs: Vec<(&'static str, f64)>) -> Constant {
    let mean = logarithmic_mean(book, here);
    let parts = logs.into_iter().map(|(cause, log)| (cause, mean * log / here)).collect();
    Constant { here, book, error: book / here - 1.0, parts }
}
