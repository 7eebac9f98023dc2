//! An open data set through `dewledger air`: hourly weather of three airports, compared with the dew points that the
//! command was not given. Data and source: `tests/reference/README.md`.

use std::io::Write;
use std::process::{Command, Stdio};

use dewledger_tests::program;

#[test]
fn dew_points_of_a_weather_service_come_out() {
    let table = include_str!("../reference/weather.csv");
    let mut child = Command::new(program("dewledger"))
        .args(["air", "--column", "dew point [degF]", "--column", "humidity ratio [g/kg]"])
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .spawn()
        .unwrap();
    let mut stdin = child.stdin.take().unwrap();
    let writer = std::thread::spawn(move || stdin.write_all(table.as_bytes()));
    let output = child.wait_with_output().unwrap();
    writer.join().unwrap().unwrap();
    assert!(output.status.success());
    let mut reader = csv::Reader::from_reader(output.stdout.as_slice());
    let header = reader.headers().unwrap().clone();
    let column = |name: &str| header.iter().position(|cell| cell == name).unwrap();
    let (published, ours) = (column("published dew point [F]"), column("dew point [degF]"));
    let (mut rows, mut worst, mut frosty) = (0, 0.0_f64, 0);
    for record in reader.records() {
        let record = record.unwrap();
        let number = |index: usize| record[index].parse::<f64>().unwrap();
        // The service's relative humidity is Bolton's over liquid water, from temperatures rounded to 0.1 °C: half a
        // degree Fahrenheit holds both, dew points below freezing included.
        let off = (number(ours) - number(published)).abs();
        worst = worst.max(off);
        frosty += usize::from(number(published) < 32.0);
        assert!(off < 0.5, "{record:?}");
        rows += 1;
    }
    assert!(rows >= 390 && frosty > 50, "{rows} rows, {frosty} below freezing");
    assert!(worst > 0.0, "two independent figures are never the same to the last digit");
}
