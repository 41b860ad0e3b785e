//! What has been found for each wish.

use std::cmp::Ordering;
use std::collections::HashMap;

use super::seat::Seat;
use crate::part::Parts;
use crate::search::order::{Ranked, compare};
use crate::search::request::Tolerance;

/// A part that must be used.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Wish {
    /// The part and its slot.
    pub seat: Seat,
    /// By how much the limit that the request tolerates may be broken for this part, relative to its bound.
    pub excess: f64,
}

impl Wish {
    /// A part that must be used, with all that the request tolerates.
    pub const fn new(seat: Seat) -> Self {
        Self { seat, excess: f64::INFINITY }
    }

    /// What may be broken for this part.
    pub fn tolerance(&self, of_request: Option<Tolerance>) -> Option<Tolerance> {
        of_request.map(|tolerance| Tolerance { excess: tolerance.excess.min(self.excess), ..tolerance })
    }
}

/// Which wish each seat is.
pub(super) type Places = HashMap<Seat, usize>;

pub(super) fn places(wishes: &[Wish]) -> Places {
    wishes.iter().enumerate().map(|(place, wish)| (wish.seat, place)).collect()
}

/// The best stage found for each wish.
#[derive(Debug, Clone)]
pub(super) struct Harvest<'b> {
    parts: &'b Parts,
    pub wishes: &'b [Wish],
    places: &'b Places,
    best: Vec<Option<Ranked>>,
}

impl<'b> Harvest<'b> {
    pub fn new(parts: &'b Parts, wishes: &'b [Wish], places: &'b Places) -> Self {
        Self { parts, wishes, places, best: vec![None; wishes.len()] }
    }

    /// The burden above which nothing is wanted for a wish.
    pub fn threshold(&self, wish: usize) -> f64 {
        self.best[wish].map_or(f64::INFINITY, |best| best.burden)
    }

    /// The best stage for a wish.
    pub fn best(&self, wish: usize) -> Option<Ranked> {
        self.best[wish]
    }

    /// Takes a stage for one wish; whether it is the best so far.
    pub fn take(&mut self, wish: usize, ranked: Ranked) -> bool {
        let better = ranked.excess <= self.wishes[wish].excess
            && self.best[wish].is_none_or(|best| compare(self.parts, &ranked, &best) == Ordering::Less);
        if better {
            self.best[wish] = Some(ranked);
        }
        better
    }

    /// Takes a stage for all of its parts; those for which it is the best so far.
    pub fn credit(&mut self, ranked: Ranked) -> impl Iterator<Item = usize> + use<> {
        let places = Seat::of_stage(&ranked.stage).map(|seat| self.places.get(&seat).copied());
        let better = places.map(|place| place.filter(|&wish| self.take(wish, ranked)));
        better.into_iter().flatten()
    }

    pub fn into_best(self) -> Vec<Option<Ranked>> {
        self.best
    }
}
