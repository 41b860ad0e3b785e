//! What is asked of a search, and what comes of it.

use std::ops::ControlFlow;

use super::field::Dropped;
use super::order::Ranked;
use super::progress::Progress;
use crate::footing::Footing;
use crate::limit::{Check, LimitName, total};
use crate::part::Parts;
use crate::rail::{Limits, Rail, Worth};

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
    /// What the burden is made of: the rail's worth, or another where one sum alone is to be made least.
    pub worth: Worth,
    /// A limit that may be broken, and by how much.
    pub tolerated: Option<Tolerance>,
    /// Where to tell how far the search is, and to hear that it shall stop.
    pub progress: Option<&'a Progress>,
}

impl<'a> Request<'a> {
    /// The best stages by the rail's own worth, one a triple, on all processors.
    pub const fn new(rail: &'a Rail, parts: &'a Parts, top: usize) -> Self {
        Self {
            rail,
            parts,
            top,
            distinct: Distinct::Triple,
            threads: 0,
            worth: rail.worth,
            tolerated: None,
            progress: None,
        }
    }
}

/// Leave to break one limit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Tolerance {
    /// The limit.
    pub limit: LimitName,
    /// By how much at the most, relative to its bound; infinite for any amount.
    pub excess: f64,
}

impl Tolerance {
    /// Leave to break a limit by any amount.
    pub const fn any(limit: LimitName) -> Self {
        Self { limit, excess: f64::INFINITY }
    }

    /// Whether a part keeps its own limits, and its footing those of a whole stage, but for what is tolerated.
    pub fn lets_pass(
        &self,
        footing: &Footing,
        limits: &Limits,
        own: impl FnOnce(&mut dyn FnMut(Check) -> ControlFlow<()>) -> ControlFlow<()>,
    ) -> bool {
        let mut keep = |check: Check| {
            if check.holds() || self.admits(&check).is_some() {
                ControlFlow::Continue(())
            } else {
                ControlFlow::Break(())
            }
        };
        own(&mut keep).is_continue() && total::footing(footing, limits, &mut keep).is_continue()
    }

    /// By how much a broken check exceeds its bound, if that is within this tolerance.
    pub fn admits(&self, check: &Check) -> Option<f64> {
        let excess = -check.margin()?;
        (check.limit == self.limit && excess <= self.excess).then_some(excess)
    }
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
    /// Least burden that an untried stage could have, where the search was stopped before the proof was complete.
    pub open_bound: Option<f64>,
    /// Parts dropped before crossing.
    pub dropped: Vec<Dropped>,
}
