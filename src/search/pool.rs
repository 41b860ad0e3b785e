//! Where the work of a search runs.

/// Runs work on so many threads, 0 for one a processor. Without a pool of its own it runs on the one every program has: the
/// answer is the same.
pub fn on_pool<T: Send>(threads: usize, work: impl FnOnce() -> T + Send) -> T {
    match rayon::ThreadPoolBuilder::new().num_threads(threads).build() {
        Ok(pool) => pool.install(work),
        Err(_) => work(),
    }
}
