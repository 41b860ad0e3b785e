//! The command line: read, ask, show.
