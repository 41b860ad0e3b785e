//! Plain data to text.
