//! The command `dewledger`: air states for a table, checks for a terminal or a script, the screens for a browser.

mod air;
mod check;
mod clock;
mod guard;
mod readable;
mod serve;

use std::path::PathBuf;
use std::process::ExitCode;

use clap::{Parser, Subcommand};

/// Heat and moisture of air at a building's real pressure, offline.
///
/// Results inform a person's judgement; they replace neither local codes, nor the maker's instructions, nor a
/// licensed practitioner.
#[derive(Debug, Parser)]
#[command(name = "dewledger", version, about, long_about, after_help = STATUS)]
struct Words {
    #[command(subcommand)]
    command: Command,
}

const STATUS: &str =
    "Exit status: 0 done, 1 some input had no result (said on standard error), 2 wrong use.";

#[derive(Debug, Subcommand)]
enum Command {
    /// Reads a CSV table of air readings on standard input and appends what follows from them.
    #[command(long_about = AIR, after_help = STATUS)]
    Air {
        #[arg(
            long = "column",
            value_name = "QUANTITY [UNIT]",
            help = "Column to append instead of the usual ones, as \"wet bulb [degF]\"; may be given more than once"
        )]
        columns: Vec<String>,
    },
    /// Works out one check from FIELD=VALUE words, or answers JSON requests, one a line, on standard input.
    #[command(long_about = CHECK, after_help = STATUS)]
    Check {
        /// Lists the checks.
        #[arg(long)]
        list: bool,
        #[arg(help = "The check, as air_heat; without it requests are read from standard input")]
        check: Option<String>,
        #[arg(
            value_name = "FIELD=VALUE",
            help = "Readings and choices, as entering.dry_bulb=\"80 F ± 0.5\" or flow.basis=standard"
        )]
        fields: Vec<String>,
        #[arg(
            long = "require",
            value_name = "REQUIREMENT",
            help = "Holds a result against a requirement, as \"total at least 48 kW\"; may be given more than once"
        )]
        requirements: Vec<String>,
        /// Units of the answer.
        #[arg(long, value_enum, default_value_t = check::Units::Si)]
        units: check::Units,
        /// Shows the formulas with the numbers put in.
        #[arg(long)]
        working: bool,
        /// The ledger to file in and read from; without it nothing is kept.
        #[arg(long, value_name = "FILE")]
        ledger: Option<PathBuf>,
    },
    /// Serves the screens to a browser on this machine, and to nothing else.
    #[command(long_about = SERVE)]
    Serve {
        /// The port; 0 lets the system choose one.
        #[arg(long, default_value_t = 0)]
        port: u16,
        /// The ledger; without it the one that the window uses.
        #[arg(long, value_name = "FILE")]
        ledger: Option<PathBuf>,
    },
}

const AIR: &str = "Reads a CSV table of air readings on standard input and appends what follows from them.

Header cells are QUANTITY [UNIT]:
    dry bulb [degC],relative humidity [%],pressure [kPa]
Quantities: dry bulb; one of wet bulb, relative humidity, relative humidity over ice, dew point, frost point,
humidity ratio, enthalpy; and pressure or elevation. Other columns are kept as they are. Relative humidity and dew
point are over liquid water, also below freezing; relative humidity over ice is over ice below 0.01 °C.

Appended unless --column says otherwise, where not given: humidity ratio [kg/kg], enthalpy [kJ/kg],
specific volume [m3/kg], relative humidity [%], wet bulb [degC], dew point [degC], frost point [degC].

A row that cannot be worked out keeps its cells and gets empty results; its line and the reason go to standard error.";

const CHECK: &str = "Works out one check from FIELD=VALUE words, or answers JSON requests, one a line, on standard input.

    dewledger check --list
    dewledger check air_heat                      shows the fields it asks for
    dewledger check air_heat pressure.elevation=\"5280 ft\" entering.dry_bulb=\"80 F\" entering.wet_bulb=\"62 F\" \\
        leaving.dry_bulb=\"55 F\" leaving.wet_bulb=\"53 F\" flow.rate=\"10000 cfm\" flow.basis=actual_entering
    echo '{\"ask\":\"checks\"}' | dewledger check      one JSON reply a line for each JSON request a line";

const SERVE: &str = "Serves the screens to a browser on this machine, and to nothing else.

Listens on 127.0.0.1 only. The address that is printed carries a key that cannot be guessed; requests without it,
for another host, or from another page are refused. Ends with Ctrl-C.";

fn main() -> ExitCode {
    let words = Words::parse();
    match words.command {
        Command::Air { columns } => air::run(&columns),
        Command::Check { list: true, .. } => check::list(),
        Command::Check { check: None, ledger, .. } => check::answer_lines(ledger.as_deref()),
        Command::Check {
            check: Some(check), fields, requirements, units, working, ledger, ..
        } => check::one(&check::One { check, fields, requirements, units, working, ledger }),
        Command::Serve { port, ledger } => serve::run(port, ledger),
    }
}
