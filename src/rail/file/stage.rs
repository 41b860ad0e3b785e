//! The section `stage`.

use super::frequency::frequencies_hz;
use super::reader::Reader;
use crate::rail::defaults::{
    PARALLEL_HIGH_SWITCH, PARALLEL_INPUT, PARALLEL_OUTPUT, PARALLEL_RECTIFIER, RIPPLE_RATIO_MAX, RIPPLE_RATIO_MIN,
    STAGE_LIGHT_LOAD, STAGE_RECTIFIER,
};
use crate::rail::typed::{LightLoad, Parallel, Range};

pub(super) fn range(reader: &mut Reader<'_>) -> Option<Range> {
    let rectifiers = reader.words(&STAGE_RECTIFIER);
    let light_load = reader.word(&STAGE_LIGHT_LOAD);
    let frequencies_hz = frequencies_hz(reader);
    let parallel = parallel(reader);
    let least = reader.optional(&RIPPLE_RATIO_MIN);
    let greatest = reader.optional(&RIPPLE_RATIO_MAX);
    if let (Some(Some(min)), Some(Some(max))) = (least, greatest)
        && min >= max
    {
        let bound = reader.said(RIPPLE_RATIO_MIN.path);
        let found =
            format!("the window ends at {}, not above its start of {bound}", reader.said(RIPPLE_RATIO_MAX.path));
        reader.conflict(RIPPLE_RATIO_MAX.path, found, format!("more than {bound}"), "");
    }
    let rectifiers = rectifiers?;
    Some(Range {
        switch_rectifier: rectifiers.contains(&"switch"),
        diode_rectifier: rectifiers.contains(&"diode"),
        light_load: if light_load? == "emulated" { LightLoad::Emulated } else { LightLoad::Forced },
        frequencies_hz: frequencies_hz?,
        parallel: parallel?,
        ripple_ratio_min: least?,
        ripple_ratio_max: greatest?,
    })
}

fn parallel(reader: &mut Reader<'_>) -> Option<Parallel> {
    let high_switch = reader.count(&PARALLEL_HIGH_SWITCH);
    let rectifier = reader.count(&PARALLEL_RECTIFIER);
    let input = reader.count(&PARALLEL_INPUT);
    let output = reader.count(&PARALLEL_OUTPUT);
    Some(Parallel { high_switch: high_switch?, rectifier: rectifier?, input: input?, output: output? })
}
