//! Engineering notation for people.
