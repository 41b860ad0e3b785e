//! From tables of text to typed parts.
