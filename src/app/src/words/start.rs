//! Words of the first screen and of what is said on every screen.

/// The program's name.
pub const NAME: &str = "Slackwater";
/// The job in one sentence.
pub const JOB: &str = "Where PaCO₂ and pH are going, how sure that is, and when it has settled.";
/// The cautions, three lines.
pub const CAUTIONS: [&str; 3] = [
    "For trained clinicians. It estimates, you decide. In an emergency don't wait for it.",
    "Not under 5 kg or newborn, in chest compressions, or on a lung circuit that removes CO₂.",
    "Tested on published averages and simulated patients only. Not a registered medical device.",
];
/// The main button, which accepts the cautions.
pub const TYPE_A_GAS: &str = "TYPE A GAS";
/// Under the main button.
pub const ACCEPTS: &str = "I have read the three lines.";
/// Opens the demo.
pub const INVENTED: &str = "Invented case";
/// Under it.
pub const INVENTED_MORE: &str = "Night ferry: no real patient, times set to now.";
/// Goes back to the open case.
pub fn back_to(label: &str) -> String {
    format!("Back to {label}")
}
/// The long list's title.
pub const NOT_FOR: &str = "What it is not for";
/// The long list.
pub const NOT_FOR_LIST: [&str; 10] = [
    "Anybody under 5 kg, and newborns",
    "Chest compressions",
    "Blood or lung assist circuits that remove CO₂",
    "Oscillation or jet ventilation",
    "One-lung ventilation",
    "Volatile anaesthetics",
    "Forecasts on high-flow oxygen",
    "Brain-death testing",
    "Treatment with bicarbonate",
    "Treatment of alkalosis",
];
/// The demo's label.
pub const DEMO_LABEL: &str = "Night ferry, invented";
/// The demo's first entry.
pub const DEMO_NOTE: &str = "Invented case for trying the tool. No real patient.";
/// Said while the demo is open.
pub const DEMO_OPEN: &str = "Invented case: no real patient.";

/// Everything is kept.
pub const READY: &str = "Ready for no signal.";
/// Not yet everything.
pub const GETTING_READY: &str = "Getting ready for no signal…";
/// Some of it is missing.
pub const NOT_READY: &str = "Not ready for no signal yet. It tries again by itself while there is signal.";
/// This browser can't.
pub const NEVER_READY: &str = "This browser can't keep it for no signal.";
/// A new version waits.
pub const NEW_VERSION: &str = "New version ready.";
/// Takes it.
pub const TAKE_IT: &str = "Load it";

/// The book can't be opened.
pub fn nothing_kept(why: &str) -> String {
    format!("{why} What you type stays until this page is closed. Export it before.")
}
/// Entries only in memory.
pub fn unsaved(count: usize) -> String {
    let entries = if count == 1 { "1 entry is".to_owned() } else { format!("{count} entries are") };
    format!("{entries} not stored on this device: only on this screen. Export the case now.")
}
/// What is typed can't be kept.
pub const DRAFT_LOST: &str =
    "This browser's storage is full or blocked: what you type now is only on this screen.";
/// A draft could not be read whole.
pub const DRAFT_DAMAGED: &str =
    "What was typed here last could not be read whole. It is kept as found, under Record. Type it again.";
/// Texts that could not be read.
pub fn set_aside(count: usize) -> String {
    let texts = if count == 1 { "1 text".to_owned() } else { format!("{count} texts") };
    format!("{texts} on this device could not be read, and the forecast may lack it. Kept as found under")
}
/// The new version has to wait.
pub const UPDATE_WAITS: &str = "Not loaded: something is only on this screen and would be lost. Export the case first, then close the page and open it.";
/// No names for entries.
pub const NO_IDS: &str = "Nothing was written: this browser gives no random numbers, which entries are named by. Use another browser.";
