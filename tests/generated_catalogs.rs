//! Generated catalogs hold together as real ones do, whatever their size.

use std::collections::BTreeSet;

use wattsieve::catalog::{ReadOptions, read_texts};

#[path = "../benches/generate/mod.rs"]
mod generate;

const COUNTS: generate::Counts = generate::Counts { switches: 500, diodes: 200, inductors: 800, capacitors: 400 };

/// A catalog as text, cell by cell.
struct Table {
    headers: Vec<String>,
    rows: Vec<Vec<String>>,
}

impl Table {
    fn read(text: &str) -> Self {
        let mut reader = csv::Reader::from_reader(text.as_bytes());
        let cells = |record: &csv::StringRecord| record.iter().map(str::to_owned).collect();
        let headers = cells(reader.headers().expect("a header"));
        let rows = reader.records().map(|row| cells(&row.expect("as many cells as headers"))).collect();
        Self { headers, rows }
    }

    fn of(file: &str) -> Self {
        let (_, text) = generate::catalogs(7, COUNTS).into_iter().find(|(name, _)| *name == file).expect(file);
        Self::read(&text)
    }

    fn column(&self, header: &str) -> usize {
        self.headers.iter().position(|cell| cell == header).expect(header)
    }

    /// The numbers of a column, `None` where the cell is empty.
    fn numbers(&self, header: &str) -> Vec<Option<f64>> {
        let column = self.column(header);
        let number = |cell: &String| (!cell.is_empty()).then(|| cell.parse().expect("a plain number"));
        self.rows.iter().map(|row| number(&row[column])).collect()
    }

    /// In every row the given cells of these columns stand in rising order.
    fn assert_rising(&self, headers: &[&str]) {
        self.assert_ordered(headers, |a, b| a < b);
    }

    /// In every row the given cells of these columns do not fall; three digits may hide a small rise.
    fn assert_not_falling(&self, headers: &[&str]) {
        self.assert_ordered(headers, |a, b| a <= b);
    }

    fn assert_ordered(&self, headers: &[&str], in_order: fn(&f64, &f64) -> bool) {
        let columns: Vec<Vec<Option<f64>>> = headers.iter().map(|header| self.numbers(header)).collect();
        for (index, row) in self.rows.iter().enumerate() {
            let given: Vec<f64> = columns.iter().filter_map(|column| column[index]).collect();
            assert!(given.is_sorted_by(in_order), "{}: {headers:?} {given:?}", row[0]);
        }
    }
}

#[test]
fn every_part_stands_once_with_its_required_figures() {
    let every = ["cost", "area [mm²]", "height [mm]"];
    let required: [(&str, &[&str]); 4] = [
        (
            "switches.csv",
            &[
                "voltage_rating [V]",
                "on_resistance [mΩ] @ 4.5 V",
                "gate_charge [nC] @ 4.5 V",
                "gate_drain_charge [nC]",
                "recovery_charge [nC]",
                "thermal_resistance [K/W]",
            ],
        ),
        ("diodes.csv", &["voltage_rating [V]", "current_rating [A]", "thermal_resistance [K/W]"]),
        ("inductors.csv", &["inductance [µH]", "dcr [mΩ]", "saturation_current [A] @ 25 °C"]),
        ("capacitors.csv", &["voltage_rating [V]", "capacitance [µF]", "esr [mΩ] @ 100 kHz"]),
    ];
    for (file, headers) in required {
        let table = Table::of(file);
        let parts: BTreeSet<&str> = table.rows.iter().map(|row| row[table.column("part")].as_str()).collect();
        assert_eq!(parts.len(), table.rows.len(), "{file}");
        for header in every.iter().chain(headers) {
            assert!(table.numbers(header).iter().all(|value| value.is_some_and(|v| v > 0.0)), "{file}: {header}");
        }
    }
}

#[test]
fn the_program_reads_them_without_a_fault() {
    let catalogs = generate::catalogs(7, COUNTS);
    let read = read_texts(catalogs.iter().map(|(file, text)| (*file, text.as_bytes())), ReadOptions::default());
    assert!(read.faults.is_empty(), "{}", read.faults.render(false));
    assert_eq!(read.parts.switches.len(), COUNTS.switches);
    assert_eq!(read.parts.diodes.len(), COUNTS.diodes);
    assert_eq!(read.parts.inductors.len(), COUNTS.inductors);
    assert_eq!(read.parts.capacitors.len(), COUNTS.capacitors);
}

#[test]
fn a_longer_catalog_begins_with_the_shorter_one() {
    let half = generate::Counts { switches: 250, diodes: 100, inductors: 400, capacitors: 200 };
    for ((file, short), (_, long)) in generate::catalogs(7, half).into_iter().zip(generate::catalogs(7, COUNTS)) {
        assert!(long.starts_with(&short), "{file}");
        assert_eq!(long.lines().count() - 1, 2 * (short.lines().count() - 1), "{file}");
    }
}

#[test]
fn another_seed_gives_other_catalogs() {
    for ((file, a), (_, b)) in generate::catalogs(7, COUNTS).into_iter().zip(generate::catalogs(8, COUNTS)) {
        assert_ne!(a, b, "{file}");
    }
}

#[test]
fn about_one_optional_cell_in_ten_is_empty() {
    let table = Table::of("switches.csv");
    for header in ["gate_resistance [Ω]", "output_charge [nC] @ 12 V", "junction_limit [°C]"] {
        let empty = table.numbers(header).iter().filter(|value| value.is_none()).count();
        // Five hundred draws at one in ten: 50 with a standard deviation of 6.7.
        assert!((25..=75).contains(&empty), "{header}: {empty}");
    }
}

#[test]
fn switches_are_coherent() {
    let table = Table::of("switches.csv");
    table.assert_rising(&["on_resistance [mΩ] @ 10 V", "on_resistance [mΩ] @ 4.5 V", "on_resistance_max [mΩ] @ 4.5 V"]);
    table.assert_rising(&["gate_drain_charge [nC]", "gate_charge [nC] @ 4.5 V", "gate_charge [nC] @ 10 V"]);
    table.assert_rising(&["threshold_voltage [V]", "plateau_voltage [V]"]);
    let whole = table.numbers("gate_charge [nC] @ 4.5 V");
    let drain = table.numbers("gate_drain_charge [nC]");
    let source = table.numbers("gate_source_charge [nC]");
    for (index, row) in table.rows.iter().enumerate() {
        if let (Some(whole), Some(drain), Some(source)) = (whole[index], drain[index], source[index]) {
            assert!(drain + source < whole, "{}", row[0]);
        }
    }
}

#[test]
fn less_resistance_costs_charge_and_more_voltage_costs_both() {
    let table = Table::of("switches.csv");
    let (ratings, resistances) = (table.numbers("voltage_rating [V]"), table.numbers("on_resistance [mΩ] @ 4.5 V"));
    let charges = table.numbers("gate_charge [nC] @ 4.5 V");
    let rows = || (0..table.rows.len()).filter_map(|i| Some((ratings[i]?, resistances[i]?, charges[i]?)));
    let at = |rating_v: f64| rows().filter(move |row| row.0 == rating_v);
    let mean = |values: Vec<f64>| values.iter().sum::<f64>() / values.len() as f64;
    for rating_v in [20.0, 30.0, 40.0, 60.0, 80.0, 100.0] {
        let logs: Vec<(f64, f64)> = at(rating_v).map(|(_, r, q)| (r.ln(), q.ln())).collect();
        let (r0, q0) = (mean(logs.iter().map(|l| l.0).collect()), mean(logs.iter().map(|l| l.1).collect()));
        let covariance: f64 = logs.iter().map(|(r, q)| (r - r0) * (q - q0)).sum();
        let spread = |values: Vec<f64>, about: f64| values.iter().map(|v| (v - about).powi(2)).sum::<f64>().sqrt();
        let r_spread = spread(logs.iter().map(|l| l.0).collect(), r0);
        let q_spread = spread(logs.iter().map(|l| l.1).collect(), q0);
        assert!(covariance / (r_spread * q_spread) < -0.8, "{rating_v} V");
    }
    let merit = |rating_v: f64| mean(at(rating_v).map(|(_, r, q)| (r * q).ln()).collect());
    assert!([20.0, 30.0, 40.0, 60.0, 80.0, 100.0].map(merit).is_sorted());
}

#[test]
fn diodes_are_coherent() {
    let table = Table::of("diodes.csv");
    let drops =
        ["forward_drop [V] @ 1 A", "forward_drop [V] @ 3 A", "forward_drop [V] @ 6 A", "forward_drop [V] @ 12 A"];
    table.assert_rising(&drops);
    table.assert_rising(&["leakage [µA] @ 25 °C", "leakage [µA] @ 125 °C"]);
    let tested: Vec<Vec<Option<f64>>> = drops.iter().map(|header| table.numbers(header)).collect();
    let kind = table.column("kind");
    let recovery = table.numbers("recovery_charge [nC]");
    for (index, row) in table.rows.iter().enumerate() {
        assert!(tested.iter().filter(|column| column[index].is_some()).count() >= 2, "{}", row[0]);
        assert_eq!(row[kind] == "silicon", recovery[index].is_some(), "{}", row[0]);
    }
    assert!(table.rows.iter().any(|row| row[kind] == "silicon"));
}

#[test]
fn inductors_are_coherent() {
    let table = Table::of("inductors.csv");
    table.assert_not_falling(&["inductance [µH] @ 8 A", "inductance [µH] @ 4 A", "inductance [µH]"]);
    table.assert_rising(&["saturation_current [A] @ 100 °C", "saturation_current [A] @ 25 °C"]);
    table.assert_rising(&["dcr [mΩ]", "dcr_max [mΩ]"]);
    table.assert_rising(&[
        "dcr [mΩ]",
        "ac_resistance [mΩ] @ 100 kHz",
        "ac_resistance [mΩ] @ 500 kHz",
        "ac_resistance [mΩ] @ 1 MHz",
    ]);
    let measured = ["core_loss [mW]", "core_frequency [kHz]", "core_ripple [A]"].map(|header| table.numbers(header));
    for (index, row) in table.rows.iter().enumerate() {
        let given = measured.iter().filter(|column| column[index].is_some()).count();
        assert!(given == 0 || given == 3, "{}", row[0]);
    }
}

#[test]
fn capacitors_are_coherent() {
    let table = Table::of("capacitors.csv");
    table.assert_not_falling(&[
        "capacitance [µF] @ 36 V",
        "capacitance [µF] @ 24 V",
        "capacitance [µF] @ 12 V",
        "capacitance [µF] @ 5 V",
        "capacitance [µF] @ 3.3 V",
        "capacitance [µF]",
    ]);
    table.assert_rising(&["esr [mΩ] @ 1 MHz", "esr [mΩ] @ 100 kHz"]);
    let (bare, biased) = (table.numbers("capacitance [µF]"), table.numbers("capacitance [µF] @ 12 V"));
    let half_lost = |(bare, biased): (&Option<f64>, &Option<f64>)| bare.zip(*biased).is_some_and(|(a, b)| b < 0.5 * a);
    assert!(bare.iter().zip(&biased).any(half_lost));
    let kind = table.column("kind");
    for wanted in ["ceramic", "polymer", "electrolytic"] {
        assert!(table.rows.iter().any(|row| row[kind] == wanted), "{wanted}");
    }
}
