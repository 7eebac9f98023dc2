//! `dewledger serve`: the screens for a browser on this machine.
//!
//! 127.0.0.1 only, with a key that cannot be guessed. The files are those of `ui/`, carried in the program.

use std::borrow::Cow;
use std::io::{self, Read, Write};
use std::path::PathBuf;
use std::process::ExitCode;
use std::sync::Arc;

use dewledger_desk::{Desk, FaultCode, fault_json};
use tiny_http::{Method, Request, Server};

use crate::clock;
use crate::guard::{Key, for_this_host, from_own_page};

mod screens {
    //! The files of the screens, listed by the build.
    include!(concat!(env!("OUT_DIR"), "/screens.rs"));
}

/// No request is larger: a form is a few kilobytes.
const LARGEST: usize = 256 * 1024;
/// Requests answered at a time; a browser asks for a handful of files at once.
const WORKERS: usize = 4;

const SECURITY: &[(&str, &str)] = &[
    (
        "Content-Security-Policy",
        "default-src 'none'; script-src 'self'; style-src 'self'; img-src 'self' data:; font-src 'self'; \
         connect-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'",
    ),
    ("X-Content-Type-Options", "nosniff"),
    ("Referrer-Policy", "no-referrer"),
    ("Cross-Origin-Opener-Policy", "same-origin"),
    ("Cross-Origin-Resource-Policy", "same-origin"),
    ("Cache-Control", "no-store"),
];

/// Serves until it is ended.
pub(crate) fn run(port: u16, ledger: Option<PathBuf>) -> ExitCode {
    match serve(port, ledger) {
        Ok(()) => ExitCode::SUCCESS,
        Err(says) => {
            eprintln!("dewledger serve: {says}");
            ExitCode::from(2)
        }
    }
}

fn serve(port: u16, ledger: Option<PathBuf>) -> Result<(), String> {
    let path = match ledger {
        Some(path) => path,
        None => usual_ledger()
            .ok_or("no folder for the ledger is known here; name one with --ledger FILE")?,
    };
    let desk = Desk::open(&path, clock::system()).map_err(|error| error.to_string())?;
    let server =
        Server::http(("127.0.0.1", port)).map_err(|error| format!("port {port}: {error}"))?;
    let port = server.server_addr().to_ip().map_or(port, |address| address.port());
    let key = Key::new().map_err(|error| error.to_string())?;
    let mut out = std::io::stdout().lock();
    let said = writeln!(
        out,
        "The ledger is {}.\nOpen this address in a browser on this machine; it works until this program ends (Ctrl-C):\nhttp://127.0.0.1:{port}/#token={}",
        path.display(),
        key.text()
    )
    .and_then(|()| out.flush());
    said.map_err(|error| error.to_string())?;
    drop(out);
    let shared = Arc::new(Shared { server, desk, key, port });
    let workers: Vec<_> = (0..WORKERS)
        .map(|_| {
            let shared = Arc::clone(&shared);
            std::thread::spawn(move || {
                while let Ok(request) = shared.server.recv() {
                    shared.respond(request);
                }
            })
        })
        .collect();
    for worker in workers {
        worker.join().map_err(|_| "a worker ended unexpectedly".to_owned())?;
    }
    Ok(())
}

/// The ledger that the window uses.
fn usual_ledger() -> Option<PathBuf> {
    if let Some(path) = std::env::var_os("DEWLEDGER_LEDGER") {
        return Some(PathBuf::from(path));
    }
    let data = std::env::var_os("XDG_DATA_HOME")
        .map(PathBuf::from)
        .filter(|path| path.is_absolute())
        .or_else(|| {
            std::env::var_os("HOME").map(|home| PathBuf::from(home).join(".local/share"))
        })?;
    Some(data.join("app.dewledger.field").join("ledger.dewledger"))
}

/// What the workers share.
struct Shared {
    server: Server,
    desk: Desk,
    key: Key,
    port: u16,
}

/// An answer, written by hand so that every connection is closed behind it: kept open, a browser's six connections
/// hold as many of the server's threads, and a seventh request can wait for ever.
struct Reply {
    status: &'static str,
    kind: &'static str,
    body: Cow<'static, [u8]>,
}

impl Reply {
    fn send(&self, request: Request) -> io::Result<()> {
        let head_only = *request.method() == Method::Head;
        let mut head = format!(
            "HTTP/1.1 {}\r\nContent-Type: {}\r\nContent-Length: {}\r\nConnection: close\r\n",
            self.status,
            self.kind,
            self.body.len()
        );
        for (name, value) in SECURITY {
            head.push_str(name);
            head.push_str(": ");
            head.push_str(value);
            head.push_str("\r\n");
        }
        head.push_str("\r\n");
        let mut writer = request.into_writer();
        writer.write_all(head.as_bytes())?;
        if !head_only {
            writer.write_all(&self.body)?;
        }
        writer.flush()
    }
}

impl Shared {
    fn respond(&self, mut request: Request) {
        let reply = self.reply(&mut request);
        // The browser may be gone; nothing is lost by that.
        let _ = reply.send(request);
    }

    fn reply(&self, request: &mut Request) -> Reply {
        let header = |name: &'static str| {
            request
                .headers()
                .iter()
                .find(|header| header.field.equiv(name))
                .map(|header| header.value.as_str().to_owned())
        };
        if !for_this_host(header("Host").as_deref(), self.port)
            || !from_own_page(header("Origin").as_deref(), self.port)
        {
            return plain(
                "403 Forbidden",
                "This server answers its own page on this machine only.",
            );
        }
        let (key, kind) = (header("X-Dewledger-Token"), header("Content-Type"));
        let path = request.url().split(['?', '#']).next().unwrap_or("/").to_owned();
        match (request.method(), path.as_str()) {
            (Method::Post, "/ask") => {
                if !self.key.opens(key.as_deref()) {
                    return plain(
                        "403 Forbidden",
                        "The key is missing or wrong: open the address that the program printed.",
                    );
                }
                if !kind.is_some_and(|kind| kind.starts_with("application/json")) {
                    return plain("415 Unsupported Media Type", "A request is JSON.");
                }
                json(self.ask(request))
            }
            (Method::Get | Method::Head, path) => file(path),
            _ => plain("405 Method Not Allowed", "There is nothing here for that."),
        }
    }

    fn ask(&self, request: &mut Request) -> String {
        let mut text = String::new();
        let limit = u64::try_from(LARGEST).unwrap_or(u64::MAX) + 1;
        match request.as_reader().take(limit).read_to_string(&mut text) {
            Ok(read) if read > LARGEST => {
                fault_json(FaultCode::BadRequest, "The request is too large.")
            }
            Ok(_) => self.desk.answer(&text),
            Err(_) => fault_json(FaultCode::BadRequest, "The request cannot be read."),
        }
    }
}

fn plain(status: &'static str, says: &'static str) -> Reply {
    Reply { status, kind: "text/plain; charset=utf-8", body: Cow::Borrowed(says.as_bytes()) }
}

fn json(text: String) -> Reply {
    Reply { status: "200 OK", kind: "application/json", body: Cow::Owned(text.into_bytes()) }
}

/// A file of the screens. Only names of the list are served: there is no path to leave the folder by.
fn file(path: &str) -> Reply {
    let name = if path == "/" { "index.html" } else { path.trim_start_matches('/') };
    let Some((_, content)) = screens::FILES.iter().find(|(file, _)| *file == name) else {
        return plain("404 Not Found", "There is no such file.");
    };
    let kind = match name.rsplit('.').next() {
        Some("html") => "text/html; charset=utf-8",
        Some("css") => "text/css; charset=utf-8",
        Some("js") => "text/javascript; charset=utf-8",
        Some("svg") => "image/svg+xml",
        Some("png") => "image/png",
        Some("woff2") => "font/woff2",
        _ => "text/plain; charset=utf-8",
    };
    Reply { status: "200 OK", kind, body: Cow::Borrowed(content) }
}
