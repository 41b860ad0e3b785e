//! A set of stages that are bounded and searched together: one frequency, one kind of rectifier, inductors of like ripple.

use std::ops::ControlFlow;

use super::bound::around::{SHORT_OF_LIMIT, junction_limit_c, lowered_limit, raised_limit, winding_limit_c};
use super::bound::bank::{Stream, input_refused, least_input_a2, least_output_a2, output_refused};
use super::bound::choke::of_choke;
use super::bound::reach::SHY;
use super::bound::spread::UNKNOWN_C;
use super::bound::{Around, Place, Price, Rates, Reach, Span, Spread, choke, high, rectifier};
use super::field::{AtFrequency, Candidate, Field};
use super::request::Tolerance;
use super::trial::Rectifier;
use crate::limit::{LimitName, own};
use crate::part::{self, Bank, Choke, SwitchBank};
use crate::stage::RectifierKind;

/// One frequency, one kind of rectifier, a few inductors of like inductance.
#[derive(Debug, Clone)]
pub struct Unit<'a> {
    /// Inductors and banks at the frequency.
    pub at: &'a AtFrequency,
    /// Kind of rectifier.
    pub kind: RectifierKind,
    /// The inductors.
    pub chokes: Vec<&'a Candidate<Choke>>,
}

/// A candidate still in play, with the least it adds and the hottest it gets.
#[derive(Debug, Clone, Copy)]
pub struct Slot<T> {
    /// The candidate.
    pub candidate: T,
    /// The least it adds to the sums of a stage.
    pub price: Price,
    /// The hottest it gets, °C.
    pub hottest_c: f64,
}

/// A unit with what is left in play below a threshold, every list ascending in what it adds at `rates`.
#[derive(Debug, Clone)]
pub struct Refined<'a> {
    /// Inductors and banks at the frequency.
    pub at: &'a AtFrequency,
    /// Kind of rectifier.
    pub kind: RectifierKind,
    /// High switches.
    pub highs: Vec<Slot<&'a Candidate<SwitchBank>>>,
    /// Rectifiers.
    pub rectifiers: Vec<Slot<Rectifier<'a>>>,
    /// Inductors.
    pub chokes: Vec<Slot<&'a Candidate<Choke>>>,
    /// Exchange rates with the raises that make the bound greatest.
    pub rates: Rates,
    /// Controller bias.
    pub bias: Price,
    /// Controller bias, the least input bank and the least output bank at the rates.
    pub floor: Price,
    /// The same, each sum by itself.
    pub least_floor: Price,
    /// Least burden of any stage.
    pub bound: f64,
    spread: Spread,
    typical: Vec<Reach>,
    low: Vec<Reach>,
    worst: Vec<Reach>,
}

/// Caps on the sums of a stage; infinite where there is none.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Caps {
    /// Greatest weighted loss, W, by the least weighted efficiency.
    pub loss_w: f64,
    /// Greatest area, mm².
    pub area_mm2: f64,
    /// Greatest cost.
    pub cost: f64,
}

impl Caps {
    /// The caps of a rail, with what may be broken of them.
    pub fn of(field: &Field, tolerated: Option<Tolerance>) -> Self {
        let limits = &field.rail.limits;
        let cap = |limit, bound: Option<f64>| {
            bound.map_or(f64::INFINITY, |bound| raised_limit(tolerated, limit, bound) / SHORT_OF_LIMIT)
        };
        let conditions = &field.conditions;
        let output_w: f64 = conditions.loads.iter().map(|load| load.share * conditions.output_v * load.current_a).sum();
        Self {
            loss_w: limits.efficiency.map_or(f64::INFINITY, |least| {
                let least = lowered_limit(tolerated, LimitName::Efficiency, least.get()) * SHORT_OF_LIMIT;
                if least > 0.0 { output_w * (1.0 / least - 1.0) } else { f64::INFINITY }
            }),
            area_mm2: cap(LimitName::Area, limits.area_mm2.map(|bound| bound.get())),
            cost: cap(LimitName::Cost, limits.cost.map(|bound| bound.get())),
        }
    }

    /// Whether sums of least prices already exceed a cap.
    pub fn exceeded(&self, sum: &Price) -> bool {
        sum.area_mm2 > self.area_mm2 || sum.cost > self.cost || sum.loss_w * SHY > self.loss_w
    }
}

/// What a refinement is asked for.
#[derive(Debug, Clone, Copy)]
pub struct Aim<'a> {
    /// Everything that can stand in each slot.
    pub field: &'a Field<'a>,
    /// Leave to break a limit.
    pub tolerated: Option<Tolerance>,
    /// Caps.
    pub caps: Caps,
    /// Burden above which nothing is wanted.
    pub threshold: f64,
    /// How often what is left is bounded anew by what is left.
    pub passes: usize,
}

impl<'a> Unit<'a> {
    /// The units of a field at one frequency: inductors whose inductance at full load is within `RATIO` of each other.
    pub fn all(field: &Field, at: &'a AtFrequency) -> Vec<Self> {
        const RATIO: f64 = 1.1;
        let full_load = field.conditions.full_load;
        let inductance_h = |candidate: &&Candidate<Choke>| candidate.bank.inductance_h[full_load];
        let mut chokes: Vec<&Candidate<Choke>> = at.chokes.iter().collect();
        chokes.sort_by(|a, b| inductance_h(a).total_cmp(&inductance_h(b)));
        let groups: Vec<Vec<&Candidate<Choke>>> = chokes.chunk_by(|a, b| inductance_h(a) == inductance_h(b)).fold(
            Vec::new(),
            |mut groups: Vec<Vec<&Candidate<Choke>>>, chunk| {
                match groups.last_mut() {
                    Some(group) if inductance_h(&chunk[0]) <= RATIO * inductance_h(&group[0]) => group.extend(chunk),
                    _ => groups.push(chunk.to_vec()),
                }
                groups
            },
        );
        let kinds = [
            (RectifierKind::Switch, !field.switch_rectifiers.is_empty()),
            (RectifierKind::Diode, !field.diode_rectifiers.is_empty()),
        ];
        let present = kinds.into_iter().filter(|(_, present)| *present);
        present
            .flat_map(|(kind, _)| groups.iter().map(move |chokes| Self { at, kind, chokes: chokes.clone() }))
            .collect()
    }

    /// Everything of the unit in play, nothing known of it.
    pub fn whole(&self, field: &'a Field<'a>) -> Refined<'a> {
        let highs = match self.kind {
            RectifierKind::Switch => &field.high_beside_switch,
            RectifierKind::Diode => &field.high_beside_diode,
        };
        let rectifiers: Vec<Slot<Rectifier<'a>>> = match self.kind {
            RectifierKind::Switch => field.switch_rectifiers.iter().map(|c| fresh(Rectifier::Switch(c))).collect(),
            RectifierKind::Diode => field.diode_rectifiers.iter().map(|c| fresh(Rectifier::Diode(c))).collect(),
        };
        Refined {
            at: self.at,
            kind: self.kind,
            highs: highs.iter().map(fresh).collect(),
            rectifiers,
            chokes: self.chokes.iter().map(|&candidate| fresh(candidate)).collect(),
            rates: Rates::worth(&field.worth),
            bias: Price::default(),
            floor: Price::default(),
            least_floor: Price::default(),
            bound: f64::NEG_INFINITY,
            spread: Spread::empty(0),
            typical: Vec::new(),
            low: Vec::new(),
            worst: Vec::new(),
        }
    }

    /// What is left of the unit below the threshold; `None` when nothing is.
    pub fn refine(&self, aim: &Aim<'a>) -> Option<Refined<'a>> {
        let mut refined = self.whole(aim.field);
        refined.tighten(aim)?;
        let rates = refined.rates;
        refined.highs.sort_by(|a, b| a.price.at(&rates).total_cmp(&b.price.at(&rates)));
        refined.rectifiers.sort_by(|a, b| a.price.at(&rates).total_cmp(&b.price.at(&rates)));
        refined.chokes.sort_by(|a, b| a.price.at(&rates).total_cmp(&b.price.at(&rates)));
        Some(refined)
    }
}

fn fresh<T>(candidate: T) -> Slot<T> {
    Slot { candidate, price: Price::default(), hottest_c: UNKNOWN_C }
}

impl<'a> Refined<'a> {
    /// Drops what is proven not to pass or to lie above the threshold; `None` when nothing is left.
    pub fn tighten(&mut self, aim: &Aim<'a>) -> Option<()> {
        for pass in 0..aim.passes {
            if pass > 0 {
                self.cool(aim);
            }
            self.keep_own_limits(aim);
            self.reach(aim);
            self.price(aim);
            self.weigh(aim)?;
            self.sieve(aim);
            if self.highs.is_empty() || self.rectifiers.is_empty() || self.chokes.is_empty() {
                return None;
            }
        }
        Some(())
    }

    fn around<'b>(&'b self, aim: &'b Aim) -> Around<'b> {
        Around {
            rail: aim.field.rail,
            conditions: &aim.field.conditions,
            tolerated: aim.tolerated,
            spread: &self.spread,
            typical: &self.typical,
            low: &self.low,
            worst: &self.worst,
        }
    }

    /// Spans and points from what is in play.
    fn reach(&mut self, aim: &Aim) {
        let (rail, conditions) = (aim.field.rail, &aim.field.conditions);
        let ambient_c = conditions.ambient_c;
        let loads_a: Vec<f64> = conditions.loads.iter().map(|load| load.current_a).collect();
        let (mut typical, mut worst) = (Spread::empty(loads_a.len()), Spread::empty(loads_a.len()));
        let limit_c = |own_c: f64| junction_limit_c(rail, aim.tolerated, own_c).clamp(ambient_c, UNKNOWN_C);
        for slot in &self.highs {
            let bank = &slot.candidate.bank;
            typical.add_high(bank, bank.r25_ohm, ambient_c, slot.hottest_c);
            worst.add_high(bank, bank.worst_r25_ohm, ambient_c, limit_c(bank.junction_limit_c));
        }
        for slot in &self.rectifiers {
            match slot.candidate {
                Rectifier::Switch(Candidate { bank, .. }) => {
                    typical.add_switch(bank, bank.r25_ohm, &loads_a, ambient_c, slot.hottest_c);
                    worst.add_switch(bank, bank.worst_r25_ohm, &loads_a, ambient_c, limit_c(bank.junction_limit_c));
                }
                Rectifier::Diode(Candidate { bank, .. }) => {
                    typical.add_diode(bank, &loads_a, ambient_c, slot.hottest_c);
                    worst.add_diode(bank, &loads_a, ambient_c, limit_c(bank.junction_limit_c));
                }
            }
        }
        let winding_c = winding_limit_c(rail, aim.tolerated).clamp(ambient_c, UNKNOWN_C);
        for slot in &self.chokes {
            let choke = &slot.candidate.bank;
            typical.add_choke(choke, choke.dcr25_ohm, ambient_c, slot.hottest_c);
            worst.add_choke(choke, choke.worst_dcr25_ohm, ambient_c, winding_c);
        }
        let switch_rectifier = self.kind == RectifierKind::Switch;
        let places = Place::all(conditions);
        let reach = |spread: &Spread, place: &Place, low| {
            Reach::new(spread, conditions, *place, self.at.frequency_hz, switch_rectifier, low)
        };
        let judged = || places.iter().filter(|place| place.judged);
        self.typical = places.iter().map(|place| reach(&typical, place, false)).collect();
        self.low = judged().map(|place| reach(&typical, place, true)).collect();
        self.worst = judged().map(|place| reach(&worst, place, false)).collect();
        self.spread = typical;
    }

    /// Drops candidates that break limits of their own by more than is tolerated. Without a tolerance the field holds none.
    fn keep_own_limits(&mut self, aim: &Aim) {
        let Some(tolerance) = aim.tolerated else { return };
        let field = aim.field;
        let (rail, parts, conditions) = (field.rail, field.parts, &field.conditions);
        let beside_switch = self.kind == RectifierKind::Switch;
        self.highs.retain(|slot| {
            let (choice, bank) = (slot.candidate.choice, &slot.candidate.bank);
            let part = &parts.switches[choice.index];
            tolerance.lets_pass(&slot.candidate.footing, &rail.limits, |keep| {
                own::switch(part, bank, part::Slot::HighSwitch, beside_switch, rail, conditions, keep)
            })
        });
        self.rectifiers.retain(|slot| match slot.candidate {
            Rectifier::Switch(Candidate { choice, bank, footing }) => {
                let part = &parts.switches[choice.index];
                tolerance.lets_pass(footing, &rail.limits, |keep| {
                    own::switch(part, bank, part::Slot::Rectifier, true, rail, conditions, keep)
                })
            }
            Rectifier::Diode(Candidate { choice, footing, .. }) => {
                tolerance.lets_pass(footing, &rail.limits, |keep| own::diode(&parts.diodes[choice.index], rail, keep))
            }
        });
        self.chokes
            .retain(|slot| tolerance.lets_pass(&slot.candidate.footing, &rail.limits, |_| ControlFlow::Continue(())));
    }

    fn bank_keeps_own_limits(aim: &Aim, candidate: &Candidate<Bank>, slot: part::Slot) -> bool {
        let rail = aim.field.rail;
        let capacitor = &aim.field.parts.capacitors[candidate.choice.index];
        aim.tolerated.is_none_or(|tolerance| {
            tolerance.lets_pass(&candidate.footing, &rail.limits, |keep| own::capacitor(capacitor, slot, rail, keep))
        })
    }

    /// The least that each candidate adds; those that cannot pass are gone.
    fn price(&mut self, aim: &Aim) {
        let around = Around {
            rail: aim.field.rail,
            conditions: &aim.field.conditions,
            tolerated: aim.tolerated,
            spread: &self.spread,
            typical: &self.typical,
            low: &self.low,
            worst: &self.worst,
        };
        self.highs.retain_mut(|slot| {
            let least = high::least_loss_w(&slot.candidate.bank, slot.hottest_c, &around);
            least.map(|loss_w| slot.price = Price::new(loss_w, &slot.candidate.footing)).is_some()
        });
        self.rectifiers.retain_mut(|slot| {
            let least = match slot.candidate {
                Rectifier::Switch(candidate) => rectifier::least_switch_w(&candidate.bank, slot.hottest_c, &around),
                Rectifier::Diode(candidate) => rectifier::least_diode_w(&candidate.bank, slot.hottest_c, &around),
            };
            least.map(|loss_w| slot.price = Price::new(loss_w, &slot.candidate.footing())).is_some()
        });
        self.chokes.retain_mut(|slot| {
            let least = choke::least_loss_w(&slot.candidate.bank, slot.hottest_c, &around);
            least.map(|loss_w| slot.price = Price::new(loss_w, &slot.candidate.footing)).is_some()
        });
    }

    /// Floors of the banks, the raises, and the bound; `None` when nothing passes.
    fn weigh(&mut self, aim: &Aim) -> Option<()> {
        if self.highs.is_empty() || self.rectifiers.is_empty() || self.chokes.is_empty() {
            return None;
        }
        let conditions = &aim.field.conditions;
        let inputs = self.inputs(aim);
        let outputs = self.outputs(aim, None);
        let bias_w: f64 = conditions
            .loads
            .iter()
            .map(|load| load.share * conditions.bias_a * conditions.supply_v(conditions.inputs_v[conditions.typical]))
            .sum();
        let bias = Price { loss_w: bias_w, ..Price::default() };
        let lists: [&mut dyn Iterator<Item = Price>; 5] = [
            &mut self.highs.iter().map(|slot| slot.price),
            &mut self.rectifiers.iter().map(|slot| slot.price),
            &mut self.chokes.iter().map(|slot| slot.price),
            &mut inputs.iter().map(|(_, price)| *price),
            &mut outputs.iter().map(|(_, price)| *price),
        ];
        let lists: Vec<Vec<Price>> = lists.into_iter().map(Iterator::collect).collect();
        if lists.iter().any(Vec::is_empty) {
            return None;
        }
        self.rates = raised(aim, &bias, &lists)?;
        let least = |list: &[Price]| {
            list.iter().min_by(|a, b| a.at(&self.rates).total_cmp(&b.at(&self.rates))).copied().unwrap_or_default()
        };
        let (input, output) = (least(&lists[3]), least(&lists[4]));
        self.bias = bias;
        let least_sum = |of: fn(&Price) -> f64| {
            of(&bias) + lists[3..].iter().map(|list| list.iter().map(of).fold(f64::INFINITY, f64::min)).sum::<f64>()
        };
        let [loss_w, area_mm2, cost] = SUMS.map(least_sum);
        self.least_floor = Price { loss_w, area_mm2, cost };
        self.floor = bias.plus(&input).plus(&output);
        self.bound = self.floor.at(&self.rates)
            + lists[..3].iter().map(|list| least(list).at(&self.rates)).sum::<f64>()
            - self.rates.allowance;
        (self.bound * SHY <= aim.threshold).then_some(())
    }

    /// Drops what lies above the threshold, or beyond a cap, with the least of everything else.
    fn sieve(&mut self, aim: &Aim) {
        let rates = self.rates;
        keep_within(self, aim.threshold - self.bound * SHY, |price| price.at(&rates));
        let caps = aim.caps;
        for (cap, of) in [caps.loss_w, caps.area_mm2, caps.cost].into_iter().zip(SUMS) {
            let least = of(&self.least_floor)
                + least_of(&self.highs, of)
                + least_of(&self.rectifiers, of)
                + least_of(&self.chokes, of);
            keep_within(self, cap - least * SHY, of);
        }
    }

    /// How hot what is left can get.
    fn cool(&mut self, aim: &Aim) {
        let around = self.around(aim);
        let highs: Vec<f64> =
            self.highs.iter().map(|slot| high::hottest_c(&slot.candidate.bank, slot.hottest_c, &around)).collect();
        let rectifiers: Vec<f64> = self
            .rectifiers
            .iter()
            .map(|slot| match slot.candidate {
                Rectifier::Switch(c) => rectifier::hottest_switch_c(&c.bank, slot.hottest_c, &around),
                Rectifier::Diode(c) => rectifier::hottest_diode_c(&c.bank, slot.hottest_c, &around),
            })
            .collect();
        let chokes: Vec<f64> =
            self.chokes.iter().map(|slot| choke::hottest_c(&slot.candidate.bank, slot.hottest_c, &around)).collect();
        // Rounding: a fixed point is known to 1e-9 K.
        let cooler = |now_c: f64, found_c: f64| now_c.min(found_c + 1e-6);
        self.highs.iter_mut().zip(highs).for_each(|(slot, c)| slot.hottest_c = cooler(slot.hottest_c, c));
        self.rectifiers.iter_mut().zip(rectifiers).for_each(|(slot, c)| slot.hottest_c = cooler(slot.hottest_c, c));
        self.chokes.iter_mut().zip(chokes).for_each(|(slot, c)| slot.hottest_c = cooler(slot.hottest_c, c));
    }

    /// Input banks that can pass somewhere in the unit, with the least they add.
    pub fn inputs(&self, aim: &Aim) -> Vec<(&'a Candidate<Bank>, Price)> {
        let around = self.around(aim);
        let full: Vec<Stream> = around.full().map(|reach| Stream::new(*reach)).collect();
        let weighted_a2: f64 =
            around.weighed().map(|reach| reach.place.share * least_input_a2(&Stream::new(*reach))).sum();
        self.at
            .input_banks
            .iter()
            .filter(|candidate| Self::bank_keeps_own_limits(aim, candidate, part::Slot::InputBank))
            .filter(|candidate| !input_refused(&candidate.bank, &full, &around))
            .map(|candidate| (candidate, Price::new(candidate.bank.esr_ohm * weighted_a2, &candidate.footing)))
            .collect()
    }

    /// Output banks that can pass with `choke`, or with any inductor of the unit, with the least they add.
    pub fn outputs(&self, aim: &Aim, choke: Option<&Slot<&'a Candidate<Choke>>>) -> Vec<(&'a Candidate<Bank>, Price)> {
        let around = self.around(aim);
        let narrow = |reach: &Reach| {
            Stream::new(choke.map_or(*reach, |slot| {
                let bank = &slot.candidate.bank;
                of_choke(bank, bank.dcr25_ohm, slot.hottest_c, reach, around.conditions.ambient_c)
            }))
        };
        let full: Vec<Stream> = around.full().map(narrow).collect();
        let low: Vec<Stream> = self.low.iter().map(narrow).collect();
        let weighted_a2: f64 = around.weighed().map(|reach| reach.place.share * least_output_a2(&narrow(reach))).sum();
        let greatest_h = |choke: &Choke| choke.inductance_h[aim.field.conditions.full_load] * (1.0 + choke.tolerance);
        let inductance_h = match choke {
            Some(slot) => Span::at(greatest_h(&slot.candidate.bank)),
            None => {
                self.chokes.iter().fold(Span::EMPTY, |span, slot| span.hull(Span::at(greatest_h(&slot.candidate.bank))))
            }
        };
        self.at
            .output_banks
            .iter()
            .filter(|candidate| Self::bank_keeps_own_limits(aim, candidate, part::Slot::OutputBank))
            .filter(|candidate| !output_refused(&candidate.bank, &full, &low, inductance_h, &around))
            .map(|candidate| (candidate, Price::new(candidate.bank.esr_ohm * weighted_a2, &candidate.footing)))
            .collect()
    }
}

/// The sums that can be capped.
const SUMS: [fn(&Price) -> f64; 3] = [|price| price.loss_w, |price| price.area_mm2, |price| price.cost];

fn least_of<T>(slots: &[Slot<T>], of: impl Fn(&Price) -> f64) -> f64 {
    slots.iter().map(|slot| of(&slot.price)).fold(f64::INFINITY, f64::min)
}

/// Keeps in each list what exceeds the least of its list by no more than `spare`.
fn keep_within(refined: &mut Refined, spare: f64, of: impl Fn(&Price) -> f64) {
    fn keep<T>(slots: &mut Vec<Slot<T>>, spare: f64, of: impl Fn(&Price) -> f64) {
        let least = least_of(slots, &of);
        slots.retain(|slot| (of(&slot.price) - least) * SHY <= spare);
    }
    if spare < f64::INFINITY {
        keep(&mut refined.highs, spare, &of);
        keep(&mut refined.rectifiers, spare, &of);
        keep(&mut refined.chokes, spare, &of);
    }
}

/// The exchange rates that make the least sum of all slots greatest: for any stage within the caps, its burden is at least
/// Σ (price at raised rates) − Σ raise·cap (weak Lagrange duality). `None` when no raise is enough to reach the caps.
fn raised(aim: &Aim, bias: &Price, lists: &[Vec<Price>]) -> Option<Rates> {
    let caps = [aim.caps.loss_w, aim.caps.area_mm2, aim.caps.cost];
    for (cap, of) in caps.iter().zip(SUMS) {
        let least: f64 =
            of(bias) + lists.iter().map(|list| list.iter().map(of).fold(f64::INFINITY, f64::min)).sum::<f64>();
        if least * SHY > *cap {
            return None;
        }
    }
    let worth = Rates::worth(&aim.field.worth);
    if caps.iter().all(|cap| cap.is_infinite()) {
        return Some(worth);
    }
    let rates_at = |raise: [f64; 3]| Rates {
        loss: worth.loss + raise[0],
        area: worth.area + raise[1],
        cost: worth.cost + raise[2],
        allowance: raise.iter().zip(caps).filter(|(raise, _)| **raise > 0.0).map(|(raise, cap)| raise * cap).sum(),
    };
    let bound_at = |raise: [f64; 3]| {
        let rates = rates_at(raise);
        let least = |list: &Vec<Price>| list.iter().map(|p| p.at(&rates)).fold(f64::INFINITY, f64::min);
        bias.at(&rates) + lists.iter().map(least).sum::<f64>() - rates.allowance
    };
    let mut raise = [0.0; 3];
    for _ in 0..2 {
        for axis in 0..3 {
            if caps[axis].is_finite() {
                raise[axis] = best_raise(|x| {
                    let mut tried = raise;
                    tried[axis] = x;
                    bound_at(tried)
                });
            }
        }
    }
    Some(rates_at(raise))
}

/// The raise, 0 or a power of two around 1, with the greatest bound; the bound is concave in the raise, so the climb stops at the first fall.
fn best_raise(bound_at: impl Fn(f64) -> f64) -> f64 {
    let (mut best, mut best_bound) = (0.0, bound_at(0.0));
    let mut x = 1.0 / 4096.0;
    while x <= 4096.0 {
        let bound = bound_at(x);
        if bound < best_bound && best > 0.0 {
            break;
        }
        if bound > best_bound {
            (best, best_bound) = (x, bound);
        }
        x *= 2.0;
    }
    best
}
