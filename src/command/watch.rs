//! A long search, watched: how far it is on the error stream, and Ctrl-C to stop it.

use std::io::IsTerminal;
use std::sync::mpsc::{RecvTimeoutError, channel};
use std::time::Duration;

use super::args::Common;
use crate::search::Progress;

/// A search that takes no longer than this is not talked about.
const PATIENCE: Duration = Duration::from_secs(1);
/// How often the line is written anew.
const INTERVAL: Duration = Duration::from_millis(250);

/// Runs a search; tells from the second second on how far it is, where somebody can read it.
pub(super) fn watched<T>(common: &Common, progress: &Progress, search: impl FnOnce() -> T) -> T {
    if common.quiet || !std::io::stderr().is_terminal() {
        return search();
    }
    std::thread::scope(|scope| {
        let (done, finished) = channel::<()>();
        scope.spawn(move || {
            let mut wait = PATIENCE;
            while finished.recv_timeout(wait) == Err(RecvTimeoutError::Timeout) {
                wait = INTERVAL;
                anstream::eprint!("\r\x1b[K{}", line(progress));
            }
            if wait == INTERVAL {
                anstream::eprint!("\r\x1b[K");
            }
        });
        let result = search();
        drop(done);
        result
    })
}

fn line(progress: &Progress) -> String {
    let snapshot = progress.snapshot();
    let figure = |value: Option<f64>| value.map_or_else(|| "…".to_owned(), |value| format!("{value:.5}"));
    format!(
        "{:.3} % ruled out by proof; last place at {}, still open from {} (Ctrl-C stops)",
        snapshot.ruled_out * 100.0,
        figure(snapshot.best),
        figure(snapshot.open)
    )
}
