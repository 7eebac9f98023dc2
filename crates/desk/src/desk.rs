//! The desk: opens the ledger and answers requests.

use std::path::{Path, PathBuf};
use std::sync::atomic::{AtomicBool, Ordering};
use std::sync::{Arc, Mutex, MutexGuard, PoisonError};

use dewledger_ledger::{At, Event, Ledger, OpenError};
use dewledger_quantities::UnitChoice;
use serde::Serialize;

use crate::clock::Clock;
use crate::form_view::check_name;
use crate::reply::{About, Fault, FaultCode, Reply};
use crate::request::{Place, Request, Typed};
use crate::{chart, demo, drafts, entries, instruments, overview, places, runs, units, visits};

/// The version that entries are filed with.
pub const VERSION: &str = env!("CARGO_PKG_VERSION");

/// Why the desk could not open its ledger. Nothing was written.
#[derive(Debug, thiserror::Error)]
#[error(transparent)]
pub struct OpenFault(#[from] OpenError);

/// The application: one ledger, one clock.
#[derive(Debug)]
pub struct Desk {
    state: Mutex<State>,
    clock: Clock,
    path: PathBuf,
    event: Event,
    /// Ends the draws that are running.
    drawing: Mutex<Arc<AtomicBool>>,
}

/// What a request works on.
#[derive(Debug)]
pub(crate) struct State {
    pub(crate) ledger: Ledger,
    pub(crate) units: UnitChoice,
}

/// A request's surroundings: the state, and the moment it was asked at.
pub(crate) struct Asked<'a> {
    pub(crate) state: &'a mut State,
    pub(crate) now: At,
}

/// What comes back as JSON.
#[derive(Serialize)]
#[serde(rename_all = "snake_case")]
enum Envelope<'a> {
    Ok(&'a Reply),
    Fault(&'a Fault),
}

impl Desk {
    /// Opens the ledger at `path`, or makes one.
    ///
    /// # Errors
    ///
    /// [`OpenFault`] where the file is another program's, newer, or cannot be opened.
    pub fn open(path: &Path, clock: Clock) -> Result<Desk, OpenFault> {
        let opened = Ledger::open(path, clock.at())?;
        let units = units::load(&opened.ledger);
        Ok(Desk {
            state: Mutex::new(State { ledger: opened.ledger, units }),
            clock,
            path: path.to_owned(),
            event: opened.event,
            drawing: Mutex::default(),
        })
    }

    /// Answers a request.
    ///
    /// # Errors
    ///
    /// [`Fault`], in words for a person.
    pub fn handle(&self, request: Request) -> Result<Reply, Fault> {
        let now = self.clock.at();
        if matches!(request, Request::Solve { .. } | Request::Draw { .. }) {
            self.stop_drawing();
        }
        if let Request::Draw { check, typed, place } = request {
            return self.draw(&check, &typed, &place);
        }
        let mut state = self.state();
        let mut at = Asked { state: &mut state, now };
        match request {
            // Answered above, without holding the ledger.
            Request::Draw { .. } => Ok(Reply::Overtaken {}),
            Request::Overview {} => overview::overview(&mut at, &self.event),
            Request::Checks {} => Ok(Reply::Checks {
                checks: dewledger_checks::ALL.iter().map(|check| check_name(*check)).collect(),
            }),
            Request::Solve { check, typed, place } => entries::solve(&at, &check, &typed, &place),
            Request::Chart { of, look } => chart::chart(&at, &of, &look),
            Request::Start { check, place } => drafts::start(&at, &check, place),
            Request::KeepDraft { draft, check, typed, place, corrects } => {
                drafts::keep(&mut at, draft, drafts::Kept { check, typed, place, corrects })
            }
            Request::OpenDraft { draft } => drafts::open(&at, &draft),
            Request::DiscardDraft { draft } => drafts::discard(&mut at, &draft),
            Request::RestoreDraft { draft } => drafts::restore(&mut at, &draft),
            Request::File { draft, check, typed, place, corrects } => {
                entries::file(&mut at, draft, drafts::Kept { check, typed, place, corrects })
            }
            Request::Correct { entry } => entries::correct(&at, &entry),
            Request::WithdrawEntry { entry } => entries::withdraw(&mut at, &entry, true),
            Request::RestoreEntry { entry } => entries::withdraw(&mut at, &entry, false),
            Request::Sites {} => places::sites(&at),
            Request::Site { site } => places::site(&at, &site),
            Request::SaveSite { site, name, elevation, note } => {
                places::save_site(&mut at, site.as_deref(), &name, &elevation, &note)
            }
            Request::Equipment { equipment } => places::equipment(&at, &equipment),
            Request::SaveEquipment { equipment, site, tag, class, note } => places::save_equipment(
                &mut at,
                equipment.as_deref(),
                &site,
                &places::EquipmentTyped { tag, class, note },
            ),
            Request::Visit { visit } => visits::visit(&at, &visit),
            Request::VisitForm { visit, site, typed } => {
                visits::form(&at, visit.as_deref(), &site, typed)
            }
            Request::SaveVisit { visit, site, people, running, typed } => visits::save(
                &mut at,
                visit.as_deref(),
                &site,
                visits::VisitTyped { people, running, typed },
            ),
            Request::Instruments {} => instruments::list(&at),
            Request::InstrumentForm { instrument, class, typed } => {
                instruments::form(&at, instrument.as_deref(), class.as_deref(), typed)
            }
            Request::SaveInstrument { instrument, typed } => {
                instruments::save(&mut at, instrument.as_deref(), typed)
            }
            Request::WithdrawInstrument { instrument, withdrawn } => {
                instruments::withdraw(&mut at, &instrument, withdrawn)
            }
            Request::RunForm { visit, index, typed } => runs::form(&at, &visit, index, typed),
            Request::SaveRun { visit, index, typed } => runs::save(&mut at, &visit, index, typed),
            Request::Entry { entry } => entries::entry(&at, &entry),
            Request::AddDemo {} => {
                demo::add(&mut at)?;
                overview::overview(&mut at, &self.event)
            }
            Request::Units {} => Ok(Reply::Units(units::view(&at.state.units))),
            Request::ChooseUnit { quantity, unit } => units::choose(&mut at, &quantity, &unit),
            Request::ChoosePreset { preset } => units::preset(&mut at, preset),
            Request::Appearance {} => units::appearance(&at),
            Request::ChooseAppearance { theme } => units::choose_appearance(&mut at, theme),
            Request::About {} => Ok(Reply::About(self.about())),
        }
    }

    /// Draws run off the ledger's lock, so that typing goes on beside them; the next keystroke ends them.
    fn draw(&self, check: &str, typed: &Typed, place: &Place) -> Result<Reply, Fault> {
        let stop = Arc::new(AtomicBool::new(false));
        *self.drawing.lock().unwrap_or_else(PoisonError::into_inner) = Arc::clone(&stop);
        let drawing = {
            let now = self.clock.at();
            let mut state = self.state();
            entries::drawing(&Asked { state: &mut state, now }, check, place)?
        };
        Ok(drawing.work(typed, &stop))
    }

    fn stop_drawing(&self) {
        let running = self.drawing.lock().unwrap_or_else(PoisonError::into_inner);
        running.store(true, Ordering::Relaxed);
    }

    /// Answers a request in JSON with a reply in JSON: `{"ok": …}` or `{"fault": …}`. Never fails.
    #[must_use]
    pub fn answer(&self, request: &str) -> String {
        let result = serde_json::from_str::<Request>(request)
            .map_err(|error| {
                Fault::new(FaultCode::BadRequest, format!("The request cannot be read: {error}."))
            })
            .and_then(|request| self.handle(request));
        envelope(&result)
    }

    /// Brings everything from the log into the ledger's file: when the app is put away.
    pub fn pause(&self) {
        // A checkpoint that cannot be done now is done at the next opening; nothing depends on it.
        let _ = self.state().ledger.checkpoint();
    }

    fn state(&self) -> MutexGuard<'_, State> {
        // A request that panicked left no half-written state: every write is one transaction.
        self.state.lock().unwrap_or_else(PoisonError::into_inner)
    }

    fn about(&self) -> About {
        About {
            version: VERSION.to_owned(),
            ledger: self.path.display().to_string(),
            says: LIMITS.iter().map(|says| (*says).to_owned()).collect(),
        }
    }
}

/// A fault as the reply to a request in JSON, for a shell that has no desk.
#[must_use]
pub fn fault_json(code: FaultCode, message: &str) -> String {
    envelope(&Err(Fault::new(code, message)))
}

fn envelope(result: &Result<Reply, Fault>) -> String {
    let envelope = match result {
        Ok(reply) => Envelope::Ok(reply),
        Err(fault) => Envelope::Fault(fault),
    };
    serde_json::to_string(&envelope).unwrap_or_else(|error| {
        // Only a number that is not a number could do this, and none is ever made.
        format!("{{\"fault\":{{\"code\":\"bad_request\",\"field\":null,\"message\":\"{error}\"}}}}")
    })
}

/// What the app is and is not.
const LIMITS: &[&str] = &[
    "Dewledger turns readings taken at a building’s real pressure into moist-air states and heat loads, says how far they can be trusted, and keeps them. Its results inform a person’s judgement; they replace neither local codes, nor the maker’s instructions, nor a licensed practitioner.",
    "Moist air is worked out as a real gas (ASHRAE RP-1485) from −60 to 90 °C and 50 to 120 kPa. Steam coils, flue gas and hot water above 100 °C are outside it.",
    "Whether the air handler may be opened, a clamp fitted or a fan stopped is for a qualified person on the spot. Isolate, lock and tag before reaching in; local rules, the maker’s instructions and licensed people come first.",
    "Everything stays on this device. The app opens no connection, has no account and sends nothing.",
];
