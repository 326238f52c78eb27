//! Rates with what they are held against.

use std::collections::BTreeMap;

use super::instruments::Tried;

/// How often something holds.
pub struct Rate {
    what: &'static str,
    allowed: [f64; 2],
    held: usize,
    of: usize,
}

impl Rate {
    pub fn between(what: &'static str, allowed: [f64; 2]) -> Self {
        Self { what, allowed, held: 0, of: 0 }
    }

    pub fn at_least(what: &'static str, least: f64) -> Self {
        Self::between(what, [least, 1.0])
    }

    pub fn at_most(what: &'static str, most: f64) -> Self {
        Self::between(what, [0.0, most])
    }

    pub fn count(&mut self, holds: bool) {
        self.of += 1;
        self.held += usize::from(holds);
    }

    fn share(&self) -> f64 {
        self.held as f64 / self.of.max(1) as f64
    }

    /// What is wrong with it, if it is not as it should be or nothing was counted.
    pub fn complaint(&self) -> Option<String> {
        let [low, high] = self.allowed;
        let is_well = self.of > 0 && (low..=high).contains(&self.share());
        (!is_well).then(|| self.line())
    }

    fn line(&self) -> String {
        let [low, high] = self.allowed;
        format!(
            "{:34} {:5.1} %  {:4} of {:4}  wanted {:3.0} to {:3.0} %",
            self.what,
            100.0 * self.share(),
            self.held,
            self.of,
            100.0 * low,
            100.0 * high
        )
    }
}

pub fn table(rates: &[Rate]) -> String {
    rates.iter().map(Rate::line).collect::<Vec<_>>().join("\n")
}

/// Strings within two standard deviations, and the root mean square of the deviations, kind by kind.
pub fn by_kind(tried: &[Tried]) -> String {
    let mut kinds: BTreeMap<&str, Vec<f64>> = BTreeMap::new();
    for one in tried {
        let off =
            one.strings.iter().filter(|string| !string.is_dead).map(|string| string.saddle_only_in_sd());
        kinds.entry(&one.kind).or_default().extend(off);
    }
    let line = |(kind, off): (&&str, &Vec<f64>)| {
        let within = off.iter().filter(|off| off.abs() <= 2.0).count() as f64 / off.len() as f64;
        let rms = (off.iter().map(|off| off * off).sum::<f64>() / off.len() as f64).sqrt();
        format!("saddle alone, {kind:12} {:5.1} % within two sd, rms {rms:.2} sd", 100.0 * within)
    };
    kinds.iter().map(line).collect::<Vec<_>>().join("\n")
}
