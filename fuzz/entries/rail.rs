//! Any text as a rail file: a rail whose points are finite, or faults that can be shown.

use wattsieve::answer::rail::understood;
use wattsieve::model::Conditions;
use wattsieve::rail;

/// The bytes are the file.
pub fn run(data: &[u8]) {
    let Ok(text) = std::str::from_utf8(data) else { return };
    match rail::read("rail.toml", text) {
        Ok(reading) => {
            let conditions = Conditions::of(&reading.rail);
            assert!(conditions.inputs_v.iter().all(|v| v.is_finite() && *v > 0.0), "{conditions:?}");
            assert!(conditions.loads.iter().all(|load| load.current_a.is_finite()), "{conditions:?}");
            assert!(conditions.inputs_v.is_sorted() && conditions.inputs_v.contains(&conditions.inputs_v[0]));
            let _ = understood("rail.toml", &reading);
        }
        Err(faults) => {
            assert!(faults.has_errors());
            let shown = faults.render(false);
            assert!(shown.chars().all(|letter| letter == '\n' || !letter.is_control()), "{shown:?}");
        }
    }
}
