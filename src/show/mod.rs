//! Results as text, tables and plots: bytes first, files last.
