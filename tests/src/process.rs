//! Processes that end with their test, and whatever they started with them.

use std::fs::File;
use std::os::unix::process::CommandExt;
use std::path::{Path, PathBuf};
use std::process::{Child, Command, Stdio};
use std::time::{Duration, Instant};

/// A built program of this workspace, beside the test itself in the target folder.
///
/// The whole workspace is built and tested together; where a program is missing it was not.
#[must_use]
pub fn program(name: &str) -> PathBuf {
    let test = std::env::current_exe().expect("a test has a path");
    let folder = test.ancestors().nth(2).expect("tests are built two folders down");
    let program = folder.join(name);
    assert!(program.exists(), "{} is not built: test the whole workspace", program.display());
    program
}

/// A process that is asked to end, and then ended, when its test is over. It leads a group of its own, so that what it
/// started ends too: a driver that is ended leaves its browser behind.
#[derive(Debug)]
pub struct Ended(Child);

impl Ended {
    /// Starts a program; what it says goes to `log`, since an orphan that holds a pipe open would hang the test.
    #[must_use]
    pub fn start(command: &mut Command, log: &Path) -> Self {
        let out = File::create(log).expect("the test's folder can be written");
        let errors = out.try_clone().expect("a file can be shared");
        command.stdin(Stdio::null()).stdout(out).stderr(errors).process_group(0);
        Self(command.spawn().unwrap_or_else(|error| panic!("{command:?} does not start: {error}")))
    }

    /// Ends it and all it started as a kill would: at once, without asking.
    pub fn kill(&mut self) {
        self.signal("KILL");
        let _ = self.0.wait();
    }

    fn signal(&self, name: &str) {
        let group = format!("-{}", self.0.id());
        let _ =
            Command::new("kill").args(["-s", name, "--", &group]).stderr(Stdio::null()).status();
    }

    /// Asks it to end, waits a little, then ends it with all it started.
    fn end(&mut self) {
        self.signal("TERM");
        let until = Instant::now() + Duration::from_secs(5);
        while Instant::now() < until && matches!(self.0.try_wait(), Ok(None)) {
            std::thread::sleep(Duration::from_millis(20));
        }
        self.kill();
    }
}

impl Drop for Ended {
    fn drop(&mut self) {
        self.end();
    }
}
