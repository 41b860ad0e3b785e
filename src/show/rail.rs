//! The rail as understood, for people.

use super::grid::{Grid, Side};
use crate::answer::rail::{KeyValue, Understood};
use crate::fault::visible;
use crate::quantity::format::exact;
use crate::rail::Value;

/// The whole screen.
pub fn screen(understood: &Understood) -> String {
    let mut grid = Grid::new(&[("key", Side::Left), ("value", Side::Left), ("from", Side::Left)]);
    for key in &understood.keys {
        grid.row([key.key.clone(), value(key), key.from.clone()]);
    }
    format!("{}\n\n{}", visible(&understood.rail), grid.render(0))
}

fn value(key: &KeyValue) -> String {
    let number = |value: &f64| key.dimension.map_or_else(|| value.to_string(), |dimension| exact(*value, dimension));
    match &key.value {
        Value::Nothing => "none".to_owned(),
        Value::Number(value) => number(value).trim_end().to_owned(),
        Value::Numbers(values) => values.iter().map(number).collect::<Vec<_>>().join(", "),
        Value::Count(count) => count.to_string(),
        Value::Text(text) => text.clone(),
        Value::Texts(texts) => texts.join(", "),
    }
}
