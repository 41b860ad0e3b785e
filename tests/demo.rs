//! The demo is what its README says.

use wattsieve::demo::CATALOGS;

#[path = "../benches/generate/mod.rs"]
mod generate;

const SEED: u64 = 1;
const COUNTS: generate::Counts = generate::Counts { switches: 24, diodes: 12, inductors: 24, capacitors: 24 };

#[test]
fn the_catalogs_come_from_the_generator() {
    for ((file, committed), (generated_file, generated)) in CATALOGS.into_iter().zip(generate::catalogs(SEED, COUNTS)) {
        assert_eq!(file, generated_file);
        assert_eq!(committed, generated, "{file}");
    }
}

#[test]
fn a_longer_catalog_begins_with_the_shorter_one() {
    let twice = generate::Counts { switches: 48, diodes: 24, inductors: 48, capacitors: 48 };
    for ((file, committed), (_, longer)) in CATALOGS.into_iter().zip(generate::catalogs(SEED, twice)) {
        assert!(longer.starts_with(committed), "{file}");
        assert_eq!(longer.lines().count() - 1, 2 * (committed.lines().count() - 1), "{file}");
    }
}

#[test]
fn every_part_stands_once_and_has_its_price_and_size() {
    for (file, text) in CATALOGS {
        let mut table = csv::Reader::from_reader(text.as_bytes());
        let header = table.headers().expect("a header").clone();
        let column = |name: &str| header.iter().position(|cell| cell == name).expect(name);
        let (part, cost, area) = (column("part"), column("cost"), column("area [mm²]"));
        let mut seen = std::collections::BTreeSet::new();
        for row in table.records() {
            let row = row.expect("as many cells as headers");
            assert!(seen.insert(row[part].to_owned()), "{file}: {} stands twice", &row[part]);
            assert!(row[cost].parse::<f64>().is_ok_and(|cost| cost > 0.0), "{file}: {}", &row[part]);
            assert!(row[area].parse::<f64>().is_ok_and(|area| area > 0.0), "{file}: {}", &row[part]);
        }
    }
}
