//! The command as a person or a script meets it: the built program, its streams, its exit status.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

use std::io::{BufRead, BufReader, Read, Write};
use std::net::TcpStream;
use std::process::{Child, Command, Output, Stdio};

fn run(arguments: &[&str], input: &str) -> Output {
    let mut child = Command::new(env!("CARGO_BIN_EXE_dewledger"))
        .args(arguments)
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut stdin = child.stdin.take().unwrap();
    let input = input.to_owned();
    // Written from a thread: a program that stops reading early must not stop the test.
    let writer = std::thread::spawn(move || {
        let _ = stdin.write_all(input.as_bytes());
    });
    let output = child.wait_with_output().unwrap();
    writer.join().unwrap();
    output
}

fn text(bytes: &[u8]) -> String {
    String::from_utf8(bytes.to_vec()).unwrap()
}

#[test]
fn air_appends_what_follows_and_keeps_the_rest() {
    let table = "name,dry bulb [degF],wet bulb [degF],elevation [ft]\nnorth,80,62,5280\n";
    let output = run(&["air"], table);
    assert_eq!(output.status.code(), Some(0));
    let out = text(&output.stdout);
    let mut lines = out.lines();
    assert_eq!(
        lines.next().unwrap(),
        "name,dry bulb [degF],wet bulb [degF],elevation [ft],humidity ratio [kg/kg],enthalpy [kJ/kg],specific volume [m3/kg],relative humidity [%],dew point [degC],frost point [degC]"
    );
    let cells: Vec<&str> = lines.next().unwrap().split(',').collect();
    assert_eq!(&cells[..4], ["north", "80", "62", "5280"]);
    // CoolProp 8.0.0 at 83 427.577 Pa: W 0.010 361 06, h 53.284 9 kJ/kg.
    assert!((cells[4].parse::<f64>().unwrap() - 0.010_361_06).abs() < 5e-8, "{}", cells[4]);
    assert!((cells[5].parse::<f64>().unwrap() - 53.284_9).abs() < 2e-4, "{}", cells[5]);
    assert!(cells[4].len() > 12, "full precision");
}

#[test]
fn air_says_which_rows_have_no_result_and_why() {
    let table = "dry bulb [degC],wet bulb [degC],relative humidity [%],pressure [kPa]\n24,15,,101.325\n24,30,,101.325\n24,15,50,101.325\n24,,,101.325\n,15,,101.325\n24,x,,101.325\n24,15,,101.325\n";
    let output = run(&["air"], table);
    assert_eq!(output.status.code(), Some(1));
    let out = text(&output.stdout);
    let rows: Vec<&str> = out.lines().skip(1).collect();
    assert_eq!(rows.len(), 7);
    assert_eq!(rows[0], rows[6]);
    assert_eq!(rows[1], "24,30,,101.325,,,,,");
    let said = text(&output.stderr);
    let said: Vec<&str> = said.lines().collect();
    assert!(said[0].starts_with("line 3: wet bulb"), "{said:?}");
    assert!(said[1].starts_with("line 4: two humidities"), "{said:?}");
    assert_eq!(said[2], "line 5: no humidity was read");
    assert_eq!(said[3], "line 6: dry bulb was not read");
    assert!(said[4].starts_with("line 7: wet bulb: “x” is not a number"), "{said:?}");
    assert_eq!(said[5], "dewledger air: 5 rows without a result");
}

#[test]
fn air_gives_the_columns_and_units_asked_for() {
    let table = "dry bulb [degC],relative humidity over ice [%],pressure [kPa]\n-8,85,95\n";
    let output = run(
        &["air", "--column", "humidity ratio [gr/lb]", "--column", "frost point [degF]"],
        table,
    );
    assert_eq!(output.status.code(), Some(0));
    let out = text(&output.stdout);
    let cells: Vec<f64> =
        out.lines().nth(1).unwrap().split(',').map(|cell| cell.parse().unwrap()).collect();
    // CoolProp 8.0.0: W 0.001 736 650 42 kg/kg over ice, as grains a pound.
    assert!((cells[3] - 0.001_736_650_42 * 7000.0).abs() < 1e-4, "{cells:?}");
    assert!(cells[4] < 17.6 && cells[4] > 13.0, "{cells:?}");
}

#[test]
fn air_refuses_a_table_that_it_does_not_understand() {
    for (table, says) in [
        ("", "the table is empty"),
        ("dry bulb,wet bulb [degC],pressure [kPa]\n", "needs its unit"),
        ("dry bulb [degC],pressure [kPa]\n", "no column holds a humidity"),
        ("dry bulb [degX],wet bulb [degC],pressure [kPa]\n", "is not a unit of dry bulb"),
    ] {
        let output = run(&["air"], table);
        assert_eq!(output.status.code(), Some(2), "{table}");
        assert!(text(&output.stderr).contains(says), "{table}: {}", text(&output.stderr));
    }
}

#[test]
fn a_check_is_answered_for_a_person() {
    let output = run(
        &[
            "check",
            "air_heat",
            "--units",
            "ip",
            "--working",
            "pressure.elevation=1609 m",
            "entering.dry_bulb=80 F ± 0.5",
            "entering.wet_bulb=62 F ± 0.5",
            "leaving.dry_bulb=55 F ± 0.5",
            "leaving.wet_bulb=53 F ± 0.5",
            "flow.rate=10000 cfm ± 4 %",
            "flow.basis=actual_entering",
        ],
        "",
    );
    let out = text(&output.stdout);
    assert_eq!(output.status.code(), Some(0), "{out}{}", text(&output.stderr));
    for wanted in [
        "Heat removed, total",
        "refrigeration tons",
        "Book constants would say",
        "Cautions",
        "q = m (h2 - h1)",
        "What decides the ±",
    ] {
        assert!(out.contains(wanted), "no “{wanted}” in:\n{out}");
    }
}

#[test]
fn a_check_that_cannot_be_says_so_and_fails() {
    let output = run(
        &[
            "check",
            "air_state",
            "pressure.elevation=1609 m",
            "air.dry_bulb=62 F",
            "air.wet_bulb=80 F",
        ],
        "",
    );
    assert_eq!(output.status.code(), Some(1));
    let out = text(&output.stdout);
    assert!(out.contains("Air cannot do that. Swap the two"), "{out}");
    let output = run(&["check", "air_state", "air.dry=62 F"], "");
    assert_eq!(output.status.code(), Some(2));
    assert!(text(&output.stderr).contains("asks for no “air.dry”"));
    assert_eq!(run(&["check", "no_such"], "").status.code(), Some(2));
}

#[test]
fn checks_are_listed_and_show_their_fields() {
    let out = text(&run(&["check", "--list"], "").stdout);
    for id in ["air_state", "air_heat", "book_constants", "mixing", "condensate"] {
        assert!(out.contains(id), "{out}");
    }
    let out = text(&run(&["check", "mixing"], "").stdout);
    assert!(out.contains("stream1.dry_bulb") && out.contains("degF"), "{out}");
}

#[test]
fn requests_are_answered_line_by_line() {
    let input = "{\"ask\":\"checks\"}\n\n{\"ask\":\"nothing\"}\n{\"ask\":\"units\"}\n";
    let output = run(&["check"], input);
    let out = text(&output.stdout);
    let lines: Vec<&str> = out.lines().collect();
    assert_eq!(lines.len(), 3);
    assert!(lines[0].starts_with("{\"ok\":{\"reply\":\"checks\""));
    assert!(lines[1].starts_with("{\"fault\":{\"code\":\"bad_request\""));
    assert!(lines[2].starts_with("{\"ok\":{\"reply\":\"units\""));
    assert_eq!(output.status.code(), Some(1));
}

/// A server that is ended with its test.
struct Served {
    child: Child,
    port: u16,
    key: String,
    _folder: tempfile::TempDir,
}

impl Drop for Served {
    fn drop(&mut self) {
        let _ = self.child.kill();
        let _ = self.child.wait();
    }
}

fn serve() -> Served {
    let folder = tempfile::tempdir().unwrap();
    let mut child = Command::new(env!("CARGO_BIN_EXE_dewledger"))
        .args(["serve", "--ledger"])
        .arg(folder.path().join("ledger.dewledger"))
        .stdout(Stdio::piped())
        .spawn()
        .unwrap();
    let mut address = String::new();
    for line in BufReader::new(child.stdout.take().unwrap()).lines() {
        let line = line.unwrap();
        if line.starts_with("http://") {
            address = line;
            break;
        }
    }
    let rest = address.strip_prefix("http://127.0.0.1:").unwrap();
    let (port, key) = rest.split_once("/#token=").unwrap();
    Served { port: port.parse().unwrap(), key: key.to_owned(), child, _folder: folder }
}

impl Served {
    fn send(&self, request: &str) -> String {
        let mut stream = TcpStream::connect(("127.0.0.1", self.port)).unwrap();
        stream.write_all(request.as_bytes()).unwrap();
        let mut reply = String::new();
        let _ = stream.read_to_string(&mut reply);
        reply
    }

    fn ask(&self, host: &str, extra: &str, body: &str) -> String {
        self.send(&format!(
            "POST /ask HTTP/1.1\r\nHost: {host}\r\nContent-Type: application/json\r\n{extra}Content-Length: {}\r\nConnection: close\r\n\r\n{body}",
            body.len()
        ))
    }
}

#[test]
fn the_server_answers_its_own_page_with_the_key_and_nobody_else() {
    let served = serve();
    let host = format!("127.0.0.1:{}", served.port);
    let key = format!("X-Dewledger-Token: {}\r\n", served.key);
    let body = "{\"ask\":\"checks\"}";
    assert!(served.ask(&host, &key, body).contains("\"reply\":\"checks\""));
    assert!(served.ask(&host, "", body).starts_with("HTTP/1.1 403"));
    assert!(served.ask(&host, "X-Dewledger-Token: 00\r\n", body).starts_with("HTTP/1.1 403"));
    assert!(served.ask("evil.example", &key, body).starts_with("HTTP/1.1 403"));
    let other_page = format!("{key}Origin: http://evil.example\r\n");
    assert!(served.ask(&host, &other_page, body).starts_with("HTTP/1.1 403"));
    let own_page = format!("{key}Origin: http://{host}\r\n");
    assert!(served.ask(&host, &own_page, body).contains("\"reply\":\"checks\""));
    let get = |path: &str| {
        served.send(&format!("GET {path} HTTP/1.1\r\nHost: {host}\r\nConnection: close\r\n\r\n"))
    };
    let page = get("/");
    assert!(
        page.starts_with("HTTP/1.1 200")
            && page.contains("Content-Security-Policy: default-src 'none'"),
        "{page}"
    );
    for path in ["/../Cargo.toml", "/..%2f..%2fCargo.toml", "/no-such", "//etc/hostname"] {
        assert!(get(path).starts_with("HTTP/1.1 404"), "{path}");
    }
}

#[test]
fn the_server_listens_on_this_machine_only() {
    let served = serve();
    // The address of every interface would answer here too; the loopback of another number does not.
    assert!(TcpStream::connect(("127.0.0.2", served.port)).is_err());
}

#[test]
fn a_requirement_is_held_against_a_result() {
    let output = Command::new(env!("CARGO_BIN_EXE_dewledger"))
        .args(["check", "air_state", "pressure.by=read", "pressure.read=101.325 kPa ± 0.3 kPa"])
        .args(["air.dry_bulb=24 C ± 0.3", "air.wet_bulb=17 C ± 0.3"])
        .args(["--require", "dry_bulb at least 20 C", "--require", "humidity_ratio at most 8 g/kg"])
        .output()
        .unwrap();
    let said = String::from_utf8(output.stdout).unwrap();
    assert!(said.contains("at most 8.00\u{a0}g/kg: Goes over"), "{said}");
    assert!(said.contains("It waits for the result that it is about."), "{said}");
    let output = Command::new(env!("CARGO_BIN_EXE_dewledger"))
        .args([
            "check",
            "air_state",
            "--require",
            "humidity_ratio around 8 g/kg",
            "air.dry_bulb=24 C",
        ])
        .output()
        .unwrap();
    let said = String::from_utf8(output.stderr).unwrap();
    assert!(said.contains("is no requirement"), "{said}");
}

/// The sign of a pressure is told in words, so that nobody has to know which side it was counted from.
#[test]
fn check_says_the_line_below_a_label() {
    let output =
        run(&["check", "room_air", "between.pressure=-2.5 Pa", "between.neighbour=anteroom"], "");
    assert_eq!(output.status.code(), Some(0));
    let out = text(&output.stdout);
    let at = out.lines().position(|line| line.starts_with("  Room above its neighbour")).unwrap();
    assert_eq!(out.lines().nth(at + 1), Some("    Air flows into the room from the anteroom"));
}
