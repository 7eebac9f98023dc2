//! The desktop's program: opens the window.

// Without this a console stands behind the window on Windows.
#![cfg_attr(not(debug_assertions), windows_subsystem = "windows")]

fn main() {
    dewledger_window::run();
}
