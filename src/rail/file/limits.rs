//! The sections `limits` and `worth`.

use super::reader::Reader;
use crate::rail::defaults::{
    DERATING_CERAMIC, DERATING_ELECTROLYTIC, DERATING_POLYMER, LIMITS_AREA, LIMITS_COST, LIMITS_CURRENT_DERATING,
    LIMITS_EFFICIENCY, LIMITS_HEIGHT, LIMITS_JUNCTION_MARGIN, LIMITS_RINGING, LIMITS_SATURATION_MARGIN,
    LIMITS_VOLTAGE_DERATING, LIMITS_WINDING_TEMPERATURE, WORTH_AREA, WORTH_COST, WORTH_LOSS,
};
use crate::rail::typed::{Limits, Worth};

pub(super) fn limits(reader: &mut Reader<'_>) -> Option<Limits> {
    let junction_margin_k = reader.non_negative(&LIMITS_JUNCTION_MARGIN);
    let voltage_derating = reader.positive(&LIMITS_VOLTAGE_DERATING);
    let current_derating = reader.positive(&LIMITS_CURRENT_DERATING);
    let ringing = reader.positive(&LIMITS_RINGING);
    let saturation_margin = reader.positive(&LIMITS_SATURATION_MARGIN);
    let winding_temperature_c = reader.celsius(&LIMITS_WINDING_TEMPERATURE);
    let ceramic_derating = reader.positive(&DERATING_CERAMIC);
    let polymer_derating = reader.positive(&DERATING_POLYMER);
    let electrolytic_derating = reader.positive(&DERATING_ELECTROLYTIC);
    let area_mm2 = reader.optional(&LIMITS_AREA);
    let height_m = reader.optional(&LIMITS_HEIGHT);
    let cost = reader.optional(&LIMITS_COST);
    let efficiency = reader.optional(&LIMITS_EFFICIENCY);
    Some(Limits {
        junction_margin_k: junction_margin_k?,
        voltage_derating: voltage_derating?,
        current_derating: current_derating?,
        ringing: ringing?,
        saturation_margin: saturation_margin?,
        winding_temperature_c: winding_temperature_c?,
        ceramic_derating: ceramic_derating?,
        polymer_derating: polymer_derating?,
        electrolytic_derating: electrolytic_derating?,
        area_mm2: area_mm2?,
        height_m: height_m?,
        cost: cost?,
        efficiency: efficiency?,
    })
}

pub(super) fn worth(reader: &mut Reader<'_>) -> Option<Worth> {
    let loss = reader.non_negative(&WORTH_LOSS);
    let area = reader.non_negative(&WORTH_AREA);
    let cost = reader.non_negative(&WORTH_COST);
    let worth = Worth { loss: loss?, area: area?, cost: cost? };
    if [worth.loss, worth.area, worth.cost].iter().all(|rate| rate.get() == 0.0) {
        reader.conflict(
            WORTH_LOSS.path,
            "nothing is worth anything: every stage would be as good as any other",
            "at least one of loss, area and cost above zero",
            "`loss = 1` ranks by efficiency alone",
        );
    }
    Some(worth)
}
