//! What is asked of a search, and what comes of it.

use super::field::Dropped;
use super::order::Ranked;
use crate::limit::LimitName;
use crate::part::Parts;
use crate::rail::Rail;

/// Which stages count as different.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub enum Distinct {
    /// One stage for each high switch, rectifier and inductor: its best frequency, counts and banks.
    #[default]
    Triple,
    /// Every stage.
    Stage,
    /// One stage for each high switch and rectifier.
    Switches,
}

/// A question to a search.
#[derive(Debug, Clone, Copy)]
pub struct Request<'a> {
    /// The rail.
    pub rail: &'a Rail,
    /// The parts.
    pub parts: &'a Parts,
    /// How many stages are wanted.
    pub top: usize,
    /// Which of them count as different.
    pub distinct: Distinct,
    /// Worker threads; 0 for one a processor.
    pub threads: usize,
    /// A limit that may be broken: stages are then ranked by how little they break it.
    pub tolerated: Option<LimitName>,
}

/// The answer of a search.
#[derive(Debug, Clone, PartialEq)]
pub struct Found {
    /// The best stages, best first.
    pub ranked: Vec<Ranked>,
    /// Stages of the catalogs after pins and bans, before any limit.
    pub crossed: u128,
    /// Full model evaluations made: cores solved at their points, each with its best banks.
    pub evaluated: u64,
    /// Whether the list is proven to be the true one.
    pub proven: bool,
    /// Parts dropped before crossing.
    pub dropped: Vec<Dropped>,
}
