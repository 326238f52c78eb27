//! Differences of one kind, from the smallest to the largest.

/// What a tally comes to.
pub struct Figures {
    /// What was compared.
    pub name: &'static str,
    /// How many numbers.
    pub count: usize,
    /// Median, 99 % point and largest difference.
    pub measured: [f64; 3],
    /// The largest allowed.
    pub limit: f64,
}

impl Figures {
    /// A row of the printed table.
    pub fn row(&self) -> String {
        let Self { name, count, measured: [median, most, largest], limit } = self;
        format!("{name:30} {count:7} {median:9.1e} {most:9.1e} {largest:9.1e} {limit:9.0e}")
    }
}

/// All differences of one kind, each with where it was found.
pub struct Tally {
    name: &'static str,
    limit: f64,
    found: Vec<(f64, String)>,
}

impl Tally {
    /// An empty tally; differences beyond `limit` fail.
    pub fn new(name: &'static str, limit: f64) -> Self {
        Self { name, limit, found: Vec::new() }
    }

    /// Takes a difference up. One that is no number counts as infinite.
    pub fn add(&mut self, difference: f64, place: String) {
        let size = if difference.is_nan() { f64::INFINITY } else { difference.abs() };
        self.found.push((size, place));
    }

    /// Brings the differences into order.
    pub fn sort(&mut self) {
        self.found.sort_by(|a, b| a.0.total_cmp(&b.0));
    }

    /// The difference that a share of all does not exceed.
    fn at_share(&self, share: f64) -> f64 {
        let index = (share * self.found.len() as f64).ceil() as usize;
        self.found.get(index.saturating_sub(1)).map_or(0.0, |found| found.0)
    }

    /// The figures of the table.
    pub fn figures(&self) -> Figures {
        let measured = [0.5, 0.99, 1.0].map(|share| self.at_share(share));
        Figures { name: self.name, count: self.found.len(), measured, limit: self.limit }
    }

    /// What lies beyond the limit, worst last, or that nothing was compared.
    pub fn complaint(&self) -> Option<String> {
        if self.found.is_empty() {
            return Some(format!("{}: nothing was compared", self.name));
        }
        let beyond: Vec<_> = self.found.iter().filter(|found| found.0 > self.limit).collect();
        let (worst, place) = beyond.last()?;
        Some(format!(
            "{}: {} beyond {:e}, the worst {worst:e} at {place}",
            self.name,
            beyond.len(),
            self.limit
        ))
    }
}
