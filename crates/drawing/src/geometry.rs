//! Points, directions and boxes on a sheet, in millimetres with y up.

/// A point, or a step from one point to another, mm.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Point {
    /// To the right.
    pub x: f64,
    /// Up.
    pub y: f64,
}

/// A point from its coordinates, mm.
#[must_use]
pub const fn pt(x: f64, y: f64) -> Point {
    Point { x, y }
}

impl Point {
    /// The point of the unit circle at an angle counted anticlockwise from x, degrees.
    #[must_use]
    pub fn direction(angle_deg: f64) -> Self {
        let angle = angle_deg.to_radians();
        pt(angle.cos(), angle.sin())
    }

    /// Sum of coordinates.
    #[must_use]
    pub fn plus(self, other: Self) -> Self {
        pt(self.x + other.x, self.y + other.y)
    }

    /// Difference of coordinates.
    #[must_use]
    pub fn minus(self, other: Self) -> Self {
        pt(self.x - other.x, self.y - other.y)
    }

    /// Both coordinates times a factor.
    #[must_use]
    pub fn times(self, factor: f64) -> Self {
        pt(self.x * factor, self.y * factor)
    }

    /// Moved by a length along a direction.
    #[must_use]
    pub fn toward(self, direction: Self, length_mm: f64) -> Self {
        self.plus(direction.times(length_mm))
    }

    /// Scalar product.
    #[must_use]
    pub fn dot(self, other: Self) -> f64 {
        self.x * other.x + self.y * other.y
    }

    /// Turned a quarter anticlockwise.
    #[must_use]
    pub fn left(self) -> Self {
        pt(-self.y, self.x)
    }

    /// Distance from the origin, mm.
    #[must_use]
    pub fn length(self) -> f64 {
        self.x.hypot(self.y)
    }

    /// Distance of two points, mm.
    #[must_use]
    pub fn distance(self, other: Self) -> f64 {
        self.minus(other).length()
    }

    /// The direction of this step with length 1; along x for a step of no length.
    #[must_use]
    pub fn unit(self) -> Self {
        let length = self.length();
        if length > 0.0 { self.times(1.0 / length) } else { pt(1.0, 0.0) }
    }

    /// Angle anticlockwise from x, degrees, −180 to 180.
    #[must_use]
    pub fn angle_deg(self) -> f64 {
        self.y.atan2(self.x).to_degrees()
    }

    /// The middle between two points.
    #[must_use]
    pub fn middle(self, other: Self) -> Self {
        self.plus(other).times(0.5)
    }

    /// Whether both coordinates are finite.
    #[must_use]
    pub fn is_finite(self) -> bool {
        self.x.is_finite() && self.y.is_finite()
    }
}

/// A box with its sides along x and y, mm.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Rect {
    /// Lower left corner.
    pub min: Point,
    /// Upper right corner.
    pub max: Point,
}

impl Rect {
    /// A box from its lower left corner and its size, mm.
    #[must_use]
    pub fn new(left: f64, bottom: f64, width_mm: f64, height_mm: f64) -> Self {
        Self { min: pt(left, bottom), max: pt(left + width_mm, bottom + height_mm) }
    }

    /// The smallest box around points; `None` if there are none.
    #[must_use]
    pub fn around(points: impl IntoIterator<Item = Point>) -> Option<Self> {
        points.into_iter().fold(None, |found: Option<Self>, p| {
            Some(found.map_or(Self { min: p, max: p }, |r| r.joined(Self { min: p, max: p })))
        })
    }

    /// Width, mm.
    #[must_use]
    pub fn width(&self) -> f64 {
        self.max.x - self.min.x
    }

    /// Height, mm.
    #[must_use]
    pub fn height(&self) -> f64 {
        self.max.y - self.min.y
    }

    /// The middle.
    #[must_use]
    pub fn centre(&self) -> Point {
        self.min.middle(self.max)
    }

    /// The corners, anticlockwise from the lower left.
    #[must_use]
    pub fn corners(&self) -> [Point; 4] {
        [self.min, pt(self.max.x, self.min.y), self.max, pt(self.min.x, self.max.y)]
    }

    /// The smallest box around both.
    #[must_use]
    pub fn joined(self, other: Self) -> Self {
        Self {
            min: pt(self.min.x.min(other.min.x), self.min.y.min(other.min.y)),
            max: pt(self.max.x.max(other.max.x), self.max.y.max(other.max.y)),
        }
    }

    /// Every side moved outward, mm; a negative margin moves it inward.
    #[must_use]
    pub fn grown(self, margin_mm: f64) -> Self {
        let step = pt(margin_mm, margin_mm);
        Self { min: self.min.minus(step), max: self.max.plus(step) }
    }

    /// Moved.
    #[must_use]
    pub fn moved(self, step: Point) -> Self {
        Self { min: self.min.plus(step), max: self.max.plus(step) }
    }

    /// Whether a point lies inside or on the edge.
    #[must_use]
    pub fn contains(&self, p: Point) -> bool {
        p.x >= self.min.x && p.x <= self.max.x && p.y >= self.min.y && p.y <= self.max.y
    }
}
