//! The window, on desktop and Android. It shows the screens in `ui/` and has one command, which hands a request of
//! theirs to the desk and the desk's reply back. It computes nothing, stores nothing and reads no request.
//!
//! What it brings: the place of the ledger, the clock, and the moments at which the desk should bring its file to rest.

mod door;
mod opened;

use std::path::PathBuf;

use dewledger_desk::Clock;
use tauri::webview::NewWindowResponse;
use tauri::{App, AppHandle, Manager, RunEvent, State, WebviewWindowBuilder, WindowEvent};

pub use opened::Opened;

/// The environment variable that names another ledger file than the usual one, for tests and for trying things out on
/// a desktop. A phone gives apps no environment of their own.
pub const LEDGER_VARIABLE: &str = "DEWLEDGER_LEDGER";

/// The ledger's file name in the app's own data folder. Android's backup rules name the same file.
pub const LEDGER_FILE: &str = "ledger.dewledger";

/// Hands a request to the desk: JSON text in, JSON text out, a fault included.
///
/// A request may wait for the disk or work out a long check, so it runs off the thread that draws.
#[tauri::command(async)]
fn ask(opened: State<'_, Opened>, request: &str) -> String {
    opened.answer(request)
}

/// Opens the window and stays until it is closed.
///
/// Where the window cannot be opened, says so on the error stream and ends with status 1.
#[cfg_attr(mobile, tauri::mobile_entry_point)]
pub fn run() {
    let built = tauri::Builder::default()
        .invoke_handler(tauri::generate_handler![ask])
        .setup(|app| Ok(set_up(app)?))
        .build(tauri::generate_context!());
    match built {
        Ok(app) => app.run(|app, event| rest(app, &event)),
        Err(fault) => {
            eprintln!("Dewledger cannot open its window: {fault}");
            std::process::exit(1);
        }
    }
}

fn set_up(app: &App) -> tauri::Result<()> {
    app.manage(Opened::at(&ledger_place(app)?, clock()));
    for window in &app.config().app.windows {
        WebviewWindowBuilder::from_config(app, window)?
            .on_navigation(door::is_own)
            .on_new_window(|_, _| NewWindowResponse::Deny)
            .build()?;
    }
    Ok(())
}

/// Where the ledger is: in the app's data folder, which no other app on a phone can read.
fn ledger_place(app: &App) -> tauri::Result<PathBuf> {
    if let Some(named) = std::env::var_os(LEDGER_VARIABLE) {
        return Ok(PathBuf::from(named));
    }
    Ok(app.path().app_data_dir()?.join(LEDGER_FILE))
}

/// The app may be ended at any time after this: closed by the person, or by Android once it is out of sight.
fn rest(app: &AppHandle, event: &RunEvent) {
    let may_end = matches!(event, RunEvent::Exit)
        || matches!(event, RunEvent::WindowEvent { event, .. } if goes_out_of_sight(event));
    if may_end && let Some(opened) = app.try_state::<Opened>() {
        opened.pause();
    }
}

#[cfg(mobile)]
fn goes_out_of_sight(event: &WindowEvent) -> bool {
    matches!(event, WindowEvent::Suspended | WindowEvent::Destroyed)
}

#[cfg(desktop)]
fn goes_out_of_sight(event: &WindowEvent) -> bool {
    matches!(event, WindowEvent::CloseRequested { .. } | WindowEvent::Destroyed)
}

#[expect(clippy::disallowed_methods, reason = "the one place where the window reads the clock")]
fn clock() -> Clock {
    Clock::new(jiff::ZonedDateTime::now)
}
