use approx::assert_relative_eq;

use super::{Reading, read};
use crate::demo;
use crate::part::Slot;
use crate::rail::defaults::{KEYS, Preset};
use crate::rail::{Ban, Entry, LightLoad, Origin, Supply, Value};

pub(super) const LEAST: &str =
    "name = \"bench\"\n[input]\nvoltage = \"12 V\"\n[output]\nvoltage = \"5 V\"\ncurrent = \"3 A\"\n";

pub(super) fn good(text: &str) -> Reading {
    read("rail.toml", text).unwrap_or_else(|faults| panic!("{text}\n{faults:?}"))
}

pub(super) fn with(more: &str) -> Reading {
    good(&format!("{LEAST}{more}"))
}

fn entry<'r>(reading: &'r Reading, key: &str) -> &'r Entry {
    reading.entries.iter().find(|entry| entry.key == key).unwrap_or_else(|| panic!("no {key}"))
}

#[test]
fn four_keys_are_enough() {
    let rail = good(LEAST).rail;
    assert_eq!(rail.name, "bench");
    let volts = [rail.input.minimum_v, rail.input.typical_v, rail.input.maximum_v, rail.input.surge_v];
    assert_eq!(volts.map(|volts| volts.get()), [12.0; 4]);
    assert_relative_eq!(rail.input.ripple_v.map_or(0.0, |ripple| ripple.get()), 0.6, max_relative = 1e-15);
    assert_relative_eq!(rail.output.ripple_v.map_or(0.0, |ripple| ripple.get()), 0.05, max_relative = 1e-15);
    assert_eq!((rail.output.peak_a.get(), rail.output.step), (3.0, None));
    assert_eq!(rail.ambient_c, 25.0);
    let drive = &rail.drive;
    assert_eq!((drive.voltage_v.get(), drive.pull_up_ohm.get(), drive.pull_down_ohm.get()), (5.0, 2.0, 1.0));
    assert_eq!((drive.dead_time_s.get(), drive.bias_a.get(), drive.supply), (20e-9, 0.0, Supply::Input));
    assert_eq!((drive.minimum_on_s.get(), drive.minimum_off_s.get(), drive.supply_limit_a), (0.0, 0.0, None));
    assert!(rail.range.switch_rectifier && rail.range.diode_rectifier);
    assert_eq!(rail.range.light_load, LightLoad::Forced);
    assert_eq!(rail.range.frequencies_hz.iter().map(|one| one.get()).collect::<Vec<_>>(), [500e3]);
    let most = rail.range.parallel;
    assert_eq!((most.high_switch, most.rectifier, most.input, most.output), (1, 1, 1, 1));
    assert_eq!((rail.loads.len(), rail.loads[0].current_a.get(), rail.loads[0].share.get()), (1, 3.0, 1.0));
    let limits = &rail.limits;
    assert_eq!((limits.junction_margin_k.get(), limits.winding_temperature_c), (15.0, 125.0));
    assert_eq!((limits.voltage_derating.get(), limits.current_derating.get()), (0.8, 0.9));
    assert_eq!((limits.ringing.get(), limits.saturation_margin.get()), (1.2, 1.2));
    assert_eq!((limits.area_mm2, limits.height_m, limits.cost, limits.efficiency), (None, None, None, None));
    assert_eq!((rail.worth.loss.get(), rail.worth.area.get(), rail.worth.cost.get()), (1.0, 0.0, 0.0));
    assert!(rail.pins.is_empty() && rail.bans.is_empty());
}

#[test]
fn units_and_bare_numbers_say_the_same() {
    let spelt = with(
        "[ambient]\ntemperature = \"55 °C\"\n[drive]\nvoltage = \"5000 mV\"\ndead_time = \"20 ns\"\nsupply = \"90 %\"\n\
         [limits]\njunction_margin = \"20 °C\"\nefficiency = \"90 %\"\narea = \"4 cm²\"\nheight = \"5 mm\"\n\
         [[load]]\ncurrent = \"500 mA\"\nshare = \"20 %\"\n",
    );
    let bare = with(
        "[ambient]\ntemperature = 55\n[drive]\nvoltage = 5\ndead_time = 20e-9\nsupply = 0.9\n\
         [limits]\njunction_margin = \"20 K\"\nefficiency = 0.9\narea = \"400 mm²\"\nheight = \"0.5 cm\"\n\
         [[load]]\ncurrent = 0.5\nshare = 0.2\n",
    );
    assert_eq!(spelt.rail, bare.rail);
    assert_eq!(bare.rail.limits.area_mm2.map(|area| area.get()), Some(400.0));
    assert_eq!(bare.rail.limits.height_m.map(|height| height.get()), Some(0.005));
    assert_eq!(bare.rail.drive.supply, spelt.rail.drive.supply);
}

#[test]
fn every_key_is_told_once_with_its_origin() {
    let reading = good(LEAST);
    let told: Vec<_> = reading.entries.iter().map(|entry| entry.key.replace("[1]", "")).collect();
    let listed = KEYS.iter().map(|key| key.path).filter(|path| !path.starts_with("stage.frequency."));
    assert_eq!(told, listed.collect::<Vec<_>>());
    for (entry, key) in reading.entries.iter().zip(&told) {
        let preset = KEYS.iter().find(|known| known.path == key).map(|known| known.preset);
        let written = matches!(entry.origin, Origin::Written { .. });
        assert_eq!(written, preset == Some(Preset::Required), "{key}");
    }
    assert_eq!(entry(&reading, "output.voltage").origin, Origin::Written { line: 5 });
    assert_eq!(
        (&entry(&reading, "drive.pull_up").value, entry(&reading, "drive.pull_up").unit),
        (&Value::Number(2.0), Some("Ω"))
    );
    let Origin::Default { reason } = entry(&reading, "input.ripple").origin else { panic!("no default") };
    assert!(reason.contains("5 % of the least input"), "{reason}");
    assert_eq!(entry(&reading, "limits.area").value, Value::Nothing);
}

#[test]
fn the_order_of_the_file_does_not_matter() {
    let turned =
        "parts.ban = [\"Q-9\"]\n[[load]]\ncurrent = 3\n[output]\ncurrent = 3\nvoltage = 5\n[input]\nvoltage = 12\n";
    let turned = good(&format!("name = \"bench\"\n{turned}"));
    let straight = with("[[load]]\ncurrent = 3\n[parts]\nban = \"Q-9\"\n");
    assert_eq!(turned.rail, straight.rail);
    let keys = |reading: &Reading| reading.entries.iter().map(|entry| entry.key.clone()).collect::<Vec<_>>();
    assert_eq!(keys(&turned), keys(&straight));
}

#[test]
fn none_lifts_a_ripple_limit() {
    let text = LEAST.replace("voltage = \"12 V\"", "voltage = \"12 V\"\nripple = \"none\"");
    let reading = good(&format!("{text}ripple = \"none\"\n"));
    assert_eq!((reading.rail.input.ripple_v, reading.rail.output.ripple_v), (None, None));
    assert_eq!(entry(&reading, "output.ripple").value, Value::Nothing);
    assert_eq!(entry(&reading, "output.ripple").origin, Origin::Written { line: 8 });
}

#[test]
fn shares_sum_to_one_and_equal_currents_are_one_load() {
    let rail = with(
        "[[load]]\ncurrent = 3\nshare = 1\n[[load]]\ncurrent = \"1 A\"\nshare = 2\n\
         [[load]]\ncurrent = \"1000 mA\"\nshare = 5\n",
    )
    .rail;
    let loads: Vec<_> = rail.loads.iter().map(|load| (load.current_a.get(), load.share.get())).collect();
    assert_eq!(loads, [(1.0, 0.875), (3.0, 0.125)]);
    let equal = with("[[load]]\ncurrent = 3\n[[load]]\ncurrent = 1\n").rail;
    let shares: Vec<_> = equal.loads.iter().map(|load| (load.current_a.get(), load.share.get())).collect();
    assert_eq!(shares, [(1.0, 0.5), (3.0, 0.5)]);
}

#[test]
fn frequencies_come_in_three_forms() {
    let hertz = |text: &str| -> Vec<f64> {
        with(&format!("[stage]\nfrequency = {text}\n")).rail.range.frequencies_hz.iter().map(|one| one.get()).collect()
    };
    assert_eq!(hertz("\"400 kHz\""), [400e3]);
    assert_eq!(hertz("400_000"), [400e3]);
    assert_eq!(hertz("[\"1 MHz\", 3e5, \"500 kHz\"]"), [300e3, 500e3, 1e6]);
    assert_eq!(hertz("{ from = \"200 kHz\", to = \"1 MHz\", steps = 1 }"), [200e3]);
    let three = hertz("{ from = \"250 kHz\", to = \"1 MHz\", steps = 3 }");
    assert_eq!((three[0], three[2]), (250e3, 1e6));
    assert_relative_eq!(three[1], 500e3, max_relative = 1e-14);
}

#[test]
fn pins_and_bans_take_one_name_or_several() {
    let text = "[parts]\nban = [\"Q-1\", \"maker: Orrin Works\"]\n\
                [parts.pin]\ninductor = \"L-1\"\noutput_bank = [\"C-1\", \"C-2\"]\n";
    let rail = with(text).rail;
    assert_eq!(rail.bans, [Ban::Part("Q-1".into()), Ban::Maker("Orrin Works".into())]);
    let pins: Vec<_> = rail.pins.iter().map(|pin| (pin.slot, pin.parts.join("+"))).collect();
    assert_eq!(pins, [(Slot::Inductor, "L-1".into()), (Slot::OutputBank, "C-1+C-2".into())]);
    assert!(with("[parts]\nban = []\n").rail.bans.is_empty());
}

#[test]
fn a_byte_order_mark_and_windows_lines_change_nothing() {
    let windows = format!("\u{feff}{}", LEAST.replace('\n', "\r\n"));
    assert_eq!(good(&windows), good(LEAST));
    let faults = read("rail.toml", &windows.replace("12 V", "12 A")).expect_err("an input in amperes");
    let places: Vec<_> = faults.errors().map(|fault| (fault.line, fault.column)).collect();
    assert_eq!(places, [(3, 15)]);
}

#[test]
fn the_demo_rails_are_good() {
    for (name, text) in demo::RAILS {
        assert!(read(name, text).is_ok(), "{name}");
    }
}
