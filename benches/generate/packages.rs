//! Invented packages of transistors and diodes, by what they do to the die inside.

/// A package on its board.
pub struct Package {
    /// Invented name.
    pub name: &'static str,
    /// Board area, mm².
    pub area_mm2: f64,
    /// Height, mm.
    pub height_mm: f64,
    /// Largest die that it holds, mm².
    pub die_mm2: f64,
    /// Resistance of leads and bonds, mΩ.
    pub lead_mohm: f64,
    /// Junction to ambient on the board, K/W.
    pub k_per_w: f64,
    /// Price without a die.
    pub cost: f64,
}

/// The smallest of `packages` (ascending) that holds the die, `steps` sizes up where there are as many.
pub fn around(packages: &'static [Package], die_mm2: f64, steps: usize) -> &'static Package {
    let last = packages.len() - 1;
    let smallest = packages.iter().position(|package| die_mm2 <= package.die_mm2).unwrap_or(last);
    &packages[(smallest + steps).min(last)]
}
