//! Every bound of the search lies below the full model, for every stage that passes every limit (but for the one that is
//! tolerated).

use wattsieve::account::{Mode, PointAccount, account};
use wattsieve::limit::LimitName;
use wattsieve::model::{Conditions, Core, Outcome, RectifierBank, Variant, solve};
use wattsieve::search::bound::Price;
use wattsieve::search::exhaustive::every_stage;
use wattsieve::search::field::{AtFrequency, Candidate, Field};
use wattsieve::search::trial::Rectifier;
use wattsieve::search::unit::{Aim, Caps, Refined, Unit};
use wattsieve::search::{Ranked, Request, Tolerance};
use wattsieve::stage::{RectifierKind, Stage};

use crate::draw::Chance;
use crate::problem::Problem;

/// How many problems; the environment variable `WATTSIEVE_PROBLEMS` sets another number for a longer run.
fn problems() -> u64 {
    std::env::var("WATTSIEVE_PROBLEMS").ok().and_then(|text| text.parse().ok()).unwrap_or(250)
}

/// Bounds may exceed by rounding what they bound.
const ROUNDING: f64 = 1e-12;

fn below(bound: f64, value: f64, what: &str, seed: u64) {
    let scale = bound.abs().max(value.abs());
    assert!(bound - value <= ROUNDING * scale, "seed {seed} {what}: bound {bound} above {value}");
}

/// What of the output charge at a point is the high switch's own, as a share.
fn own_share(field: &Field, stage: &Stage, input: usize, mode: Mode) -> f64 {
    let around = field.conditions.surroundings();
    let at = |at_input: [f64; 3], at_swing: [f64; 3]| {
        if mode == Mode::Discontinuous { at_swing[input] } else { at_input[input] }
    };
    let high = field.parts.switches[stage.high_switch.index].bank(stage.high_switch.count, &around);
    let own_c = at(high.charge_at_input_c, high.charge_at_swing_c);
    let (index, count) = (stage.rectifier.index, stage.rectifier.count);
    let other_c = match stage.rectifier_kind {
        RectifierKind::Switch => {
            let bank = field.parts.switches[index].bank(count, &around);
            at(bank.charge_at_input_c, bank.charge_at_swing_c)
        }
        RectifierKind::Diode => {
            let bank = field.parts.diodes[index].bank(count, &around);
            at(bank.charge_at_input_c, bank.charge_at_swing_c)
        }
    };
    own_c / (own_c + 2.0 * other_c)
}

/// Weighted losses by slot: high switch, rectifier with its charges, inductor, input bank, output bank, bias.
fn by_slot(field: &Field, stage: &Stage, points: &[PointAccount]) -> [f64; 6] {
    let mut sums = [0.0; 6];
    for point in points.iter().filter(|point| point.share > 0.0) {
        let reading = point.reading.as_ref().expect("a passing stage runs at every point");
        let input = field.conditions.inputs_v.iter().position(|v| *v == point.input_v).expect("an input");
        let own = own_share(field, stage, input, point.mode);
        let losses = &reading.losses_w;
        let charge_w = losses.high_switch.output_charge;
        let slots = [
            losses.high_switch.conduction + losses.high_switch.overlap + own * charge_w + losses.drive.high_gate,
            losses.rectifier.total_w()
                + (1.0 - own) * charge_w
                + losses.high_switch.recovery
                + losses.drive.rectifier_gate,
            losses.inductor.total_w(),
            losses.input_bank.esr,
            losses.output_bank.esr,
            losses.drive.bias,
        ];
        for (sum, slot) in sums.iter_mut().zip(slots) {
            *sum += point.share * slot;
        }
    }
    sums
}

/// The slots of a stage in a refined unit: high switch, rectifier and inductor with price and hottest temperature.
fn slots(refined: &Refined, stage: &Stage) -> Option<[(Price, f64); 3]> {
    let high = refined.highs.iter().find(|slot| slot.candidate.choice == stage.high_switch)?;
    let rectifier = refined.rectifiers.iter().find(|slot| slot.candidate.choice() == stage.rectifier)?;
    let choke = refined.chokes.iter().find(|slot| slot.candidate.choice.index == stage.inductor)?;
    Some([(high.price, high.hottest_c), (rectifier.price, rectifier.hottest_c), (choke.price, choke.hottest_c)])
}

/// The temperatures of a stage at every point that a hottest temperature speaks of.
fn temperatures(field: &Field, refined: &Refined, stage: &Stage) -> Vec<[f64; 3]> {
    let conditions = &field.conditions;
    let high = refined.highs.iter().find(|slot| slot.candidate.choice == stage.high_switch).expect("in play");
    let rectifier = refined.rectifiers.iter().find(|slot| slot.candidate.choice() == stage.rectifier).expect("in play");
    let choke = refined.chokes.iter().find(|slot| slot.candidate.choice.index == stage.inductor).expect("in play");
    let bank = match rectifier.candidate {
        Rectifier::Switch(candidate) => RectifierBank::Switch(&candidate.bank),
        Rectifier::Diode(candidate) => RectifierBank::Diode(&candidate.bank),
    };
    let core = Core {
        conditions,
        frequency_hz: stage.frequency_hz,
        high: &high.candidate.bank,
        rectifier: bank,
        choke: &choke.candidate.bank,
    };
    let mut found = Vec::new();
    for input in 0..conditions.inputs_v.len() {
        for load in 0..conditions.loads.len() {
            let mut variants = Vec::new();
            if load == conditions.full_load || conditions.share(input, load) > 0.0 {
                variants.push(Variant::TYPICAL);
            }
            if load == conditions.full_load {
                variants.push(Variant::low_inductance(&choke.candidate.bank));
            }
            for variant in variants {
                if let Outcome::Running(operation) = solve(&core, input, load, variant) {
                    found.push([operation.heat.high_c, operation.heat.rectifier_c, operation.heat.winding_c]);
                }
            }
        }
    }
    found
}

/// The stages to look at: some of those that pass.
fn passing(request: &Request, chance: &mut Chance) -> Vec<Ranked> {
    let mut all = Vec::new();
    every_stage(request, &mut |ranked| {
        if all.len() < 20_000 {
            all.push(ranked);
        }
    });
    chance.shuffle(&mut all);
    all.truncate(60);
    all
}

struct Trial<'a> {
    field: &'a Field<'a>,
    tolerated: Option<Tolerance>,
    seed: u64,
}

impl Trial<'_> {
    fn compare(&self, refined: &Refined, aim: &Aim, ranked: &Ranked) {
        let (stage, seed) = (&ranked.stage, self.seed);
        let account = account(self.field.rail, self.field.parts, stage);
        let losses_w = by_slot(self.field, stage, &account.points);
        let slots = slots(refined, stage).unwrap_or_else(|| panic!("seed {seed}: a part of {stage:?} was refused"));
        let names = ["high switch", "rectifier", "inductor"];
        for (k, name) in names.into_iter().enumerate() {
            below(slots[k].0.loss_w, losses_w[k], name, seed);
            for temperatures in temperatures(self.field, refined, stage) {
                below(temperatures[k] - 1e-6, slots[k].1, &format!("hottest {name}"), seed);
            }
        }
        let choke = refined.chokes.iter().find(|slot| slot.candidate.choice.index == stage.inductor).expect("in play");
        let bank = |list: &[(&Candidate<wattsieve::part::Bank>, Price)], choice, name: &str| {
            list.iter()
                .find(|(candidate, _)| candidate.choice == choice)
                .unwrap_or_else(|| panic!("seed {seed}: the {name} of {stage:?} was refused"))
                .1
        };
        let input = bank(&refined.inputs(aim), stage.input_bank, "input bank");
        let output = bank(&refined.outputs(aim, Some(choke)), stage.output_bank, "output bank of the inductor");
        let any_output = bank(&refined.outputs(aim, None), stage.output_bank, "output bank");
        below(input.loss_w, losses_w[3], "input bank", seed);
        below(output.loss_w, losses_w[4], "output bank", seed);
        below(any_output.loss_w, losses_w[4], "output bank of any inductor", seed);
        below(refined.bias.loss_w, losses_w[5], "bias", seed);
        below(refined.bound, ranked.burden, "unit", seed);
        let sum = slots.iter().fold(refined.bias.plus(&input).plus(&output), |sum, slot| sum.plus(&slot.0));
        below(sum.at(&refined.rates) - refined.rates.allowance, ranked.burden, "sum of all slots", seed);
        assert!(!aim.caps.exceeded(&sum), "seed {seed}: within the caps, and refused by them");
    }

    /// All units of the field, refined in 1 to 3 passes with every stage wanted, and with none wanted that is worse.
    fn run(&self, stages: &[Ranked]) -> usize {
        let caps = Caps::of(self.field, self.tolerated);
        let mut compared = 0;
        for frequency in &self.field.rail.range.frequencies_hz {
            let at: AtFrequency = self.field.at_frequency(frequency.get());
            for unit in Unit::all(self.field, &at) {
                let own = |ranked: &&Ranked| {
                    ranked.stage.frequency_hz == frequency.get()
                        && ranked.stage.rectifier_kind == unit.kind
                        && unit.chokes.iter().any(|choke| choke.choice.index == ranked.stage.inductor)
                };
                for ranked in stages.iter().filter(own) {
                    for (threshold, passes) in [(f64::INFINITY, 1 + compared % 3), (ranked.burden, 3)] {
                        let aim = Aim { field: self.field, tolerated: self.tolerated, caps, threshold, passes };
                        let refined = unit.refine(&aim).unwrap_or_else(|| {
                            panic!("seed {}: the unit of {:?} was refused", self.seed, ranked.stage)
                        });
                        self.compare(&refined, &aim, ranked);
                    }
                    compared += 1;
                }
            }
        }
        compared
    }
}

#[test]
fn every_bound_is_below_the_full_model() {
    let mut compared = 0;
    for seed in 20_000..20_000 + problems() {
        let problem = Problem::new(seed);
        let mut chance = Chance::new(seed);
        let request = Request::new(&problem.rail, &problem.parts, 1);
        let field = Field::new(&request);
        let stages = passing(&request, &mut chance);
        compared += Trial { field: &field, tolerated: None, seed }.run(&stages);
    }
    assert!(compared as u64 > 5 * problems(), "only {compared} stages");
}

#[test]
fn with_a_limit_tolerated_too() {
    let limits: Vec<LimitName> = LimitName::ALL.into_iter().filter(|limit| limit.can_give()).collect();
    let mut compared = 0;
    // The last one has a low output and diodes whose drop, at the hottest, would be below none.
    for seed in (30_000..30_000 + problems()).chain([31_848]) {
        let problem = Problem::new(seed);
        let mut chance = Chance::new(seed);
        let limit = limits[chance.below(limits.len())];
        let excess = if chance.unit() < 0.3 { f64::INFINITY } else { chance.scale(1e-3, 2.0) };
        let tolerated = Some(Tolerance { limit, excess });
        let request = Request { tolerated, ..Request::new(&problem.rail, &problem.parts, 1) };
        let field = Field::new(&request);
        let stages = passing(&request, &mut chance);
        compared += Trial { field: &field, tolerated, seed }.run(&stages);
    }
    assert!(compared as u64 > 5 * problems(), "only {compared} stages");
}

#[test]
fn the_points_of_a_problem_are_those_of_its_account() {
    // What the comparisons above rest on: weighted points are at typical input.
    for seed in 0..20 {
        let problem = Problem::new(seed);
        let conditions = Conditions::of(&problem.rail);
        let sum: f64 = conditions.loads.iter().map(|load| load.share).sum();
        assert!((sum - 1.0).abs() < 1e-12, "seed {seed}");
    }
}
