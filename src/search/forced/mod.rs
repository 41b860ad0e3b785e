//! The best stage with each part: what a part costs that must be used.
//!
//! The units of [`super::unit`] are walked as in [`super::pruned`], from the least bound upwards, once for all parts. Each part
//! has a threshold of its own, the best stage found with it so far, and a unit is searched for it only while the unit's bound,
//! raised by what the part adds beyond the cheapest of its slot, can still beat that. Every stage found counts for all five of
//! its parts. A unit sees the thresholds as they stood before its batch, so that the work is the same whatever the number of
//! threads.

mod harvest;
mod seat;
mod space;
mod visit;

use rayon::iter::{IntoParallelRefIterator, ParallelIterator};

pub use harvest::Wish;
pub use seat::Seat;

use super::field::{AtFrequency, Field};
use super::order::Ranked;
use super::pool::on_pool;
use super::request::Request;
use super::unit::{Aim, Caps, Unit};
use harvest::Harvest;
use space::extras;
use visit::Visit;

use super::bound::reach::SHY;

/// Units searched at a time, as in [`super::pruned`].
const BATCH: usize = 16;

/// The best stage with each part, exactly as an exhaustive search with that part pinned would rank it; `None` where no stage
/// with it passes. `top` and `distinct` of the request do not matter.
pub fn forced(request: &Request, wishes: &[Wish]) -> Vec<Option<Ranked>> {
    let field = Field::new(request);
    let frequencies: Vec<AtFrequency> =
        request.rail.range.frequencies_hz.iter().map(|f| field.at_frequency(f.get())).collect();
    on_pool(request.threads, || walk(request, &field, &frequencies, wishes))
}

/// A unit with its bound and what each wish adds to it at least; infinite where the part does not stand in the unit.
struct Bounded<'a> {
    unit: &'a Unit<'a>,
    bound: f64,
    extras: Vec<f64>,
}

fn walk<'a>(
    request: &Request<'a>,
    field: &'a Field<'a>,
    frequencies: &'a [AtFrequency],
    wishes: &[Wish],
) -> Vec<Option<Ranked>> {
    let caps = Caps::of(field, request.tolerated);
    let aim = Aim { field, tolerated: request.tolerated, caps, threshold: f64::INFINITY, passes: 1 };
    let units: Vec<Unit> = frequencies.iter().flat_map(|at| Unit::all(field, at)).collect();
    let seats = harvest::places(wishes);
    let mut bounded: Vec<Bounded> = units
        .par_iter()
        .filter_map(|unit| {
            let refined = unit.refine(&aim)?;
            let extras = extras(&refined, &aim, &seats, wishes.len());
            Some(Bounded { unit, bound: refined.bound, extras })
        })
        .collect();
    bounded.sort_by(|a, b| a.bound.total_cmp(&b.bound));
    let mut harvest = Harvest::new(request.parts, wishes, &seats);
    for batch in bounded.chunks(BATCH) {
        let found: Vec<Vec<(usize, Ranked)>> = batch
            .par_iter()
            .map(|bounded| {
                let open: Vec<usize> = (0..wishes.len())
                    .filter(|&wish| (bounded.bound + bounded.extras[wish]) * SHY <= harvest.threshold(wish))
                    .filter(|&wish| bounded.extras[wish] < f64::INFINITY)
                    .collect();
                if open.is_empty() || request.progress.is_some_and(|progress| progress.stopped()) {
                    return Vec::new();
                }
                Visit::new(request, aim, bounded.unit, harvest.clone()).search(&open)
            })
            .collect();
        for (wish, ranked) in found.into_iter().flatten() {
            harvest.take(wish, ranked);
        }
    }
    harvest.into_best()
}
