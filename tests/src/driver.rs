//! The app driven as a person would: its window over WebDriver, or the same screens in Chromium with a phone's shape.

use std::net::TcpListener;
use std::path::{Path, PathBuf};
use std::process::Command;
use std::time::{Duration, Instant};

use fantoccini::{Client, ClientBuilder};
use hyper_util::client::legacy::connect::HttpConnector;
use serde_json::{Map, Value, json};

use crate::process::{Ended, program};

/// How long a session may take to come up: the window's first start writes caches.
const PATIENCE: Duration = Duration::from_secs(60);

/// Whether Chromium and its driver are here. Where they cannot be had, the test says so loudly and is passed over.
#[must_use]
pub fn has_chromium() -> bool {
    if std::env::var_os("DEWLEDGER_WITHOUT_CHROMIUM").is_some() {
        eprintln!("SKIPPED: Chromium cannot be had here (DEWLEDGER_WITHOUT_CHROMIUM is set).");
        return false;
    }
    true
}

/// A session with the app; everything that it started ends with it.
pub struct Driver {
    /// What speaks to it.
    pub client: Client,
    // In this order: the driver ends its browser or window, then the rest.
    _driver: Ended,
    _server: Option<Ended>,
    _screen: Option<Ended>,
    _profile: Option<tempfile::TempDir>,
}

impl Driver {
    /// The real window, on a screen in memory, with its ledger at `ledger`.
    ///
    /// The test is ended where the window does not come up.
    pub async fn window(folder: &Path, ledger: &Path) -> Self {
        let (screen, display) = screen(folder);
        let port = free_port();
        let driver = Ended::start(
            Command::new("WebKitWebDriver")
                .arg(format!("--port={port}"))
                .env("TAURI_WEBVIEW_AUTOMATION", "true")
                .env("DEWLEDGER_LEDGER", ledger)
                .env("DISPLAY", display)
                .env("XDG_DATA_HOME", folder.join("data"))
                .env("XDG_CACHE_HOME", folder.join("cache")),
            &folder.join("webkit-driver.log"),
        );
        let options = json!({ "binary": program("dewledger-window"), "args": [] });
        let client = connect(port, "webkitgtk:browserOptions", options).await;
        Self { client, _driver: driver, _server: None, _screen: Some(screen), _profile: None }
    }

    /// The same screens in Chromium, 390 by 844 with touch, served on loopback from the ledger at `ledger`.
    ///
    /// The test is ended where the page does not come up.
    pub async fn phone(folder: &Path, ledger: &Path) -> Self {
        Self::browser(
            folder,
            ledger,
            json!({ "width": 390, "height": 844, "pixelRatio": 2, "touch": true, "mobile": true }),
        )
        .await
    }

    /// The screens in Chromium with any shape of a screen.
    ///
    /// The test is ended where the page does not come up.
    pub async fn browser(folder: &Path, ledger: &Path, shape: Value) -> Self {
        let log = folder.join("serve.log");
        let mut serve = Command::new(program("dewledger"));
        let server = Ended::start(serve.arg("serve").arg("--ledger").arg(ledger), &log);
        let address = address(&log);
        let port = free_port();
        let driver = Ended::start(
            Command::new("chromedriver").arg(format!("--port={port}")),
            &folder.join("chromedriver.log"),
        );
        let profile = tempfile::tempdir().expect("a folder for the browser");
        let options = json!({
            "binary": chromium(),
            "mobileEmulation": { "deviceMetrics": shape },
            "args": [
                "--headless=new", "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run",
                "--disable-background-networking", "--disable-component-update", "--disable-sync",
                format!("--user-data-dir={}", profile.path().display()),
            ],
        });
        let client = connect(port, "goog:chromeOptions", options).await;
        client.goto(&address).await.expect("the page opens");
        Self {
            client,
            _driver: driver,
            _server: Some(server),
            _screen: None,
            _profile: Some(profile),
        }
    }

    /// Ends the server as a kill would, in the middle of whatever it does.
    pub fn kill(mut self) {
        if let Some(server) = &mut self._server {
            server.kill();
        }
    }

    /// Ends the session in order.
    pub async fn close(self) {
        let _ = self.client.clone().close().await;
    }
}

/// Connects as soon as the driver listens.
async fn connect(port: u16, name: &str, options: Value) -> Client {
    let mut capabilities = Map::new();
    capabilities.insert(name.to_owned(), options);
    let until = Instant::now() + PATIENCE;
    loop {
        let mut builder = ClientBuilder::new(HttpConnector::new());
        let session = builder.capabilities(capabilities.clone());
        let address = format!("http://127.0.0.1:{port}");
        match tokio::time::timeout(PATIENCE, session.connect(&address)).await {
            Ok(Ok(client)) => return client,
            other => assert!(
                Instant::now() < until,
                "no session: {:?}",
                other.map(|result| result.err())
            ),
        }
        tokio::time::sleep(Duration::from_millis(100)).await;
    }
}

/// A screen in memory, and its name. Xvfb chooses a free number and says it.
fn screen(folder: &Path) -> (Ended, String) {
    let log = folder.join("screen.log");
    let number = folder.join("screen.number");
    let mut command = Command::new("sh");
    // The shell gives Xvfb a file to write the number to, and becomes it.
    command
        .arg("-c")
        .arg("exec Xvfb -displayfd 3 -screen 0 1280x1000x24 -nolisten tcp 3>\"$0\"")
        .arg(&number);
    let screen = Ended::start(&mut command, &log);
    let until = Instant::now() + PATIENCE;
    loop {
        let said = std::fs::read_to_string(&number).unwrap_or_default();
        if said.ends_with('\n') {
            return (screen, format!(":{}", said.trim()));
        }
        assert!(
            Instant::now() < until,
            "Xvfb does not come up: {}",
            std::fs::read_to_string(&log).unwrap_or_default()
        );
        std::thread::sleep(Duration::from_millis(20));
    }
}

/// The address that the server prints.
fn address(log: &Path) -> String {
    let until = Instant::now() + PATIENCE;
    loop {
        let said = std::fs::read_to_string(log).unwrap_or_default();
        let line =
            said.lines().find(|line| line.starts_with("http://") && line.contains("#token="));
        if let Some(line) = line.filter(|_| said.ends_with('\n')) {
            return line.to_owned();
        }
        assert!(Instant::now() < until, "the server does not come up: {said}");
        std::thread::sleep(Duration::from_millis(20));
    }
}

fn chromium() -> PathBuf {
    let places = ["/usr/bin/chromium", "/usr/bin/chromium-browser", "/usr/bin/google-chrome"];
    let found = places.iter().map(PathBuf::from).find(|place| place.exists());
    found.expect("Chromium is installed")
}

/// A port that was free a moment ago.
fn free_port() -> u16 {
    let listener = TcpListener::bind(("127.0.0.1", 0)).expect("loopback has a port");
    listener.local_addr().expect("it is bound").port()
}
