//! Ctrl-C: once to stop the run and keep what exists, twice to leave at once.

use std::sync::Arc;
use std::sync::atomic::{AtomicBool, Ordering};

/// Whether the user wants to stop.
#[derive(Debug, Clone, Default)]
pub struct Interrupt(Arc<AtomicBool>);

impl Interrupt {
    /// Listens from now on. Where the system does not allow it, Ctrl-C ends
    /// the program as usual.
    pub fn listen() -> Self {
        let interrupt = Self::default();
        let asked = Arc::clone(&interrupt.0);
        let _ = ctrlc::set_handler(move || {
            if asked.swap(true, Ordering::SeqCst) {
                std::process::exit(130);
            }
        });
        interrupt
    }

    /// True once the user has asked to stop.
    pub fn is_asked(&self) -> bool {
        self.0.load(Ordering::SeqCst)
    }
}
