//! The solver: state layout, derivative, pressure balance, events, integration, ledger.
