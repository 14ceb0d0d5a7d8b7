//! Findings as a person reads them in a terminal, and as machines read them in JSON.
