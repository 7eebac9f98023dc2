//! `dewledger air`: a table in, the same table with air states appended out, row by row.

use std::io::{self, BufWriter, IsTerminal, Write};
use std::process::ExitCode;
use std::time::{Duration, Instant};

use dewledger_desk::air_rows::AirRows;

/// How often progress is said on a terminal.
const EVERY: Duration = Duration::from_millis(500);

/// Streams standard input to standard output. Memory does not grow with the table.
pub(crate) fn run(columns: &[String]) -> ExitCode {
    match stream(columns) {
        Ok(0) => ExitCode::SUCCESS,
        Ok(bad) => {
            eprintln!(
                "dewledger air: {bad} {} without a result",
                if bad == 1 { "row" } else { "rows" }
            );
            ExitCode::from(1)
        }
        // Whoever reads the table has seen enough (`head`): nothing went wrong.
        Err(Stop::Closed) => ExitCode::SUCCESS,
        Err(Stop::Says(says)) => {
            eprintln!("dewledger air: {says}");
            ExitCode::from(2)
        }
    }
}

/// Why the stream ends early.
enum Stop {
    Closed,
    Says(String),
}

impl From<io::Error> for Stop {
    fn from(error: io::Error) -> Self {
        if error.kind() == io::ErrorKind::BrokenPipe {
            Stop::Closed
        } else {
            Stop::Says(error.to_string())
        }
    }
}

impl From<csv::Error> for Stop {
    fn from(error: csv::Error) -> Self {
        let says = format!("the table cannot be read: {error}");
        if let csv::ErrorKind::Io(error) = error.into_kind() {
            error.into()
        } else {
            Stop::Says(says)
        }
    }
}

fn stream(columns: &[String]) -> Result<u64, Stop> {
    let input = io::stdin();
    if input.is_terminal() {
        eprintln!(
            "dewledger air reads a CSV table on standard input (end with Ctrl-D); see dewledger air --help"
        );
    }
    let mut reader =
        csv::ReaderBuilder::new().flexible(true).has_headers(false).from_reader(input.lock());
    let mut writer =
        csv::WriterBuilder::new().flexible(true).from_writer(BufWriter::new(io::stdout().lock()));
    let mut record = csv::StringRecord::new();
    if !reader.read_record(&mut record)? {
        return Err(Stop::Says(
            "the table is empty: it begins with a line of column names".to_owned(),
        ));
    }
    let width = record.len();
    let rows =
        AirRows::new(record.iter(), columns).map_err(|error| Stop::Says(error.to_string()))?;
    let appended = rows.appended();
    write(&mut writer, &record, width, appended.iter().map(String::as_str))?;
    let progress = io::stderr().is_terminal() && !io::stdout().is_terminal();
    let (mut done, mut bad, mut said) = (0_u64, 0_u64, Instant::now());
    while reader.read_record(&mut record)? {
        done += 1;
        match rows.row(|index| record.get(index)) {
            Ok(values) => write(&mut writer, &record, width, values.iter().map(String::as_str))?,
            Err(error) => {
                bad += 1;
                let line = record.position().map_or(0, csv::Position::line);
                clear(progress);
                eprintln!("line {line}: {error}");
                write(&mut writer, &record, width, appended.iter().map(|_| ""))?;
            }
        }
        if progress && said.elapsed() >= EVERY {
            said = Instant::now();
            eprint!("\r{done} rows");
        }
    }
    writer.flush()?;
    clear(progress);
    Ok(bad)
}

/// Takes the progress line away, so that nothing is printed over it.
fn clear(progress: bool) {
    if progress {
        eprint!("\r\u{1b}[K");
        let _ = io::stderr().flush();
    }
}

/// A row's own cells, filled up to the header's width so that results stand under their names, then the results.
fn write<'a, W: Write>(
    writer: &mut csv::Writer<W>,
    record: &'a csv::StringRecord,
    width: usize,
    appended: impl Iterator<Item = &'a str>,
) -> Result<(), Stop> {
    let blank = std::iter::repeat_n("", width.saturating_sub(record.len()));
    writer.write_record(record.iter().chain(blank).chain(appended))?;
    Ok(())
}
