//! Shared means of the tests.

use std::path::PathBuf;

/// A built program of this workspace, beside the test itself in the target folder.
///
/// # Panics
///
/// Where it was not built: the whole workspace is built and tested together.
#[must_use]
pub fn program(name: &str) -> PathBuf {
    let test = std::env::current_exe().expect("a test has a path");
    let folder = test.ancestors().nth(2).expect("tests are built two folders down");
    let program = folder.join(name);
    assert!(program.exists(), "{} is not built: test the whole workspace", program.display());
    program
}
