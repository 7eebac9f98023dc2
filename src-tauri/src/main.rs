//! The desktop's program: opens the window.

// Without this a console stands behind the window on Windows.
#![cfg_attr(not(debug_assertions), windows_subsystem = "windows")]

use std::process::ExitCode;

fn main() -> ExitCode {
    if cfg!(target_os = "linux") && !display_is_named() {
        // The toolkit would panic with a line that means nothing to the person.
        eprintln!(
            "There is no display here for a window. `dewledger serve` shows the same screens in a browser."
        );
        return ExitCode::FAILURE;
    }
    dewledger_window::run();
    ExitCode::SUCCESS
}

fn display_is_named() -> bool {
    ["DISPLAY", "WAYLAND_DISPLAY"]
        .iter()
        .any(|name| std::env::var_os(name).is_some_and(|value| !value.is_empty()))
}
