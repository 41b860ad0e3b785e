//! A unit with one slot narrowed to one part.

use super::harvest::Places;
use super::seat::Seat;
use crate::part::Slot as Place;
use crate::search::bound::Price;
use crate::search::completion::Offer;
use crate::search::trial::Rectifier;
use crate::search::unit::{Aim, Refined, Slot};
use crate::stage::{Choice, RectifierKind};

/// What each wish adds to the bound of a unit beyond the cheapest of its slot, at least; infinite where it is not in the unit.
pub(super) fn extras(refined: &Refined, aim: &Aim, places: &Places, wishes: usize) -> Vec<f64> {
    let mut extras = vec![f64::INFINITY; wishes];
    let mut list = |prices: &mut dyn Iterator<Item = (Seat, Price)>| {
        let figures: Vec<(Seat, f64)> = prices.map(|(seat, price)| (seat, price.at(&refined.rates))).collect();
        let least = figures.iter().map(|(_, figure)| *figure).fold(f64::INFINITY, f64::min);
        for (seat, figure) in figures {
            if let Some(&place) = places.get(&seat) {
                extras[place] = extras[place].min(figure - least);
            }
        }
    };
    list(&mut refined.highs.iter().map(|slot| (Seat::HighSwitch(slot.candidate.choice.index), slot.price)));
    list(&mut refined.rectifiers.iter().map(|slot| (rectifier_seat(&slot.candidate), slot.price)));
    list(&mut refined.chokes.iter().map(|slot| (Seat::Inductor(slot.candidate.choice.index), slot.price)));
    let bank = |seat: fn(usize) -> Seat| move |(choice, price): (Choice, Price)| (seat(choice.index), price);
    let inputs = refined.inputs(aim).into_iter().map(|(candidate, price)| (candidate.choice, price));
    list(&mut inputs.map(bank(Seat::InputBank)));
    let outputs = refined.outputs(aim, None).into_iter().map(|(candidate, price)| (candidate.choice, price));
    list(&mut outputs.map(bank(Seat::OutputBank)));
    extras
}

fn rectifier_seat(rectifier: &Rectifier) -> Seat {
    let index = rectifier.choice().index;
    match rectifier.kind() {
        RectifierKind::Switch => Seat::SwitchRectifier(index),
        RectifierKind::Diode => Seat::DiodeRectifier(index),
    }
}

/// The part that a seat asks for in a slot; `None` where the seat leaves that slot free.
const fn asked(seat: Seat, place: Place) -> Option<usize> {
    match (seat, place) {
        (Seat::HighSwitch(index), Place::HighSwitch)
        | (Seat::SwitchRectifier(index) | Seat::DiodeRectifier(index), Place::Rectifier)
        | (Seat::Inductor(index), Place::Inductor)
        | (Seat::InputBank(index), Place::InputBank)
        | (Seat::OutputBank(index), Place::OutputBank) => Some(index),
        _ => None,
    }
}

/// What of a list a seat lets in.
pub(super) fn narrowed<T: Copy>(list: &[T], seat: Seat, place: Place, index: impl Fn(&T) -> usize) -> Vec<T> {
    match asked(seat, place) {
        Some(wanted) => list.iter().filter(|item| index(item) == wanted).copied().collect(),
        None => list.to_vec(),
    }
}

/// Narrows the lists of a unit to what a seat lets in; the banks, which a unit does not list, stay for [`offers_for`].
pub(super) fn narrow(space: &mut Refined, seat: Seat) {
    space.highs = narrowed(&space.highs, seat, Place::HighSwitch, |slot| slot.candidate.choice.index);
    space.rectifiers = narrowed(&space.rectifiers, seat, Place::Rectifier, |slot| slot.candidate.choice().index);
    space.chokes = narrowed(&space.chokes, seat, Place::Inductor, |slot| slot.candidate.choice.index);
}

/// What of the offers of a bank a seat lets in.
pub(super) fn offers_for<'a>(offers: &[Offer<'a>], seat: Seat, place: Place) -> Vec<Offer<'a>> {
    narrowed(offers, seat, place, |offer| offer.choice().index)
}

/// Ascending in what the candidates add.
pub(super) fn sort(space: &mut Refined) {
    fn by<T>(list: &mut [Slot<T>], figure: impl Fn(&Price) -> f64) {
        list.sort_by(|a, b| figure(&a.price).total_cmp(&figure(&b.price)));
    }
    let rates = space.rates;
    by(&mut space.highs, |price| price.at(&rates));
    by(&mut space.rectifiers, |price| price.at(&rates));
    by(&mut space.chokes, |price| price.at(&rates));
}
