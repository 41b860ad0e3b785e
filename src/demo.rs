//! The built-in rails and catalogs: an invented rover with invented parts.

/// File name of the rail that is taken where none is given.
pub const RAIL_NAME: &str = "rail.toml";
/// Text of the rail that is taken where none is given.
pub const RAIL_TEXT: &str = include_str!("../catalogs/rail.toml");

/// Every rail of the demo, the one that is taken where none is given first: file name and text.
pub const RAILS: [(&str, &str); 2] = [(RAIL_NAME, RAIL_TEXT), ("logic.toml", include_str!("../catalogs/logic.toml"))];

/// The four catalogs: file name and text.
pub const CATALOGS: [(&str, &str); 4] = [
    ("switches.csv", include_str!("../catalogs/switches.csv")),
    ("diodes.csv", include_str!("../catalogs/diodes.csv")),
    ("inductors.csv", include_str!("../catalogs/inductors.csv")),
    ("capacitors.csv", include_str!("../catalogs/capacitors.csv")),
];
