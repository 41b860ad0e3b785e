//! The best stages of all, with proof.
