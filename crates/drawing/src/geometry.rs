//! Points and boxes on the drawing, in CSS pixels, y down.

/// A point.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Px {
    /// Across, px.
    pub x: f64,
    /// Down, px.
    pub y: f64,
}

impl Px {
    pub(crate) const fn new(x: f64, y: f64) -> Self {
        Self { x, y }
    }

    pub(crate) fn moved(self, dx: f64, dy: f64) -> Self {
        Self::new(self.x + dx, self.y + dy)
    }

    /// At a distance in a direction (radians, 0 to the right, growing downwards).
    pub(crate) fn towards(self, angle: f64, distance: f64) -> Self {
        self.moved(angle.cos() * distance, angle.sin() * distance)
    }

    pub(crate) fn distance(self, other: Px) -> f64 {
        (self.x - other.x).hypot(self.y - other.y)
    }

    pub(crate) fn between(self, other: Px, share: f64) -> Self {
        Self::new(self.x + (other.x - self.x) * share, self.y + (other.y - self.y) * share)
    }
}

/// A box.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Rect {
    /// Left edge, px.
    pub left: f64,
    /// Upper edge, px.
    pub top: f64,
    /// Width, px.
    pub width: f64,
    /// Height, px.
    pub height: f64,
}

impl Rect {
    pub(crate) const fn new(left: f64, top: f64, width: f64, height: f64) -> Self {
        Self { left, top, width, height }
    }

    /// A box around a point.
    pub(crate) fn around(middle: Px, half_width: f64, half_height: f64) -> Self {
        Self::new(
            middle.x - half_width,
            middle.y - half_height,
            2.0 * half_width,
            2.0 * half_height,
        )
    }

    pub(crate) fn right(&self) -> f64 {
        self.left + self.width
    }

    pub(crate) fn bottom(&self) -> f64 {
        self.top + self.height
    }

    pub(crate) fn contains(&self, point: Px) -> bool {
        (self.left..=self.right()).contains(&point.x)
            && (self.top..=self.bottom()).contains(&point.y)
    }

    pub(crate) fn grown(&self, by: f64) -> Self {
        Self::new(self.left - by, self.top - by, self.width + 2.0 * by, self.height + 2.0 * by)
    }

    /// The area that two boxes share, px².
    pub(crate) fn overlap(&self, other: &Rect) -> f64 {
        let across = self.right().min(other.right()) - self.left.max(other.left);
        let down = self.bottom().min(other.bottom()) - self.top.max(other.top);
        if across > 0.0 && down > 0.0 { across * down } else { 0.0 }
    }

    /// The area that lies outside `bounds`, px².
    pub(crate) fn outside(&self, bounds: &Rect) -> f64 {
        let outside = self.width * self.height - self.overlap(bounds);
        // Less is what rounding leaves.
        if outside > 1e-6 { outside } else { 0.0 }
    }

    /// The part of a line that lies in the box (Liang-Barsky); none when it passes by.
    pub(crate) fn clip(&self, from: Px, to: Px) -> Option<(Px, Px)> {
        let (dx, dy) = (to.x - from.x, to.y - from.y);
        let (mut enters, mut leaves) = (0.0_f64, 1.0_f64);
        for (step, room) in [
            (-dx, from.x - self.left),
            (dx, self.right() - from.x),
            (-dy, from.y - self.top),
            (dy, self.bottom() - from.y),
        ] {
            if step == 0.0 {
                if room < 0.0 {
                    return None;
                }
                continue;
            }
            let at = room / step;
            if step < 0.0 {
                enters = enters.max(at);
            } else {
                leaves = leaves.min(at);
            }
        }
        (enters <= leaves).then(|| (from.between(to, enters), from.between(to, leaves)))
    }

    /// How much of a line lies in the box, px.
    pub(crate) fn covers(&self, from: Px, to: Px) -> f64 {
        self.clip(from, to).map_or(0.0, |(enters, leaves)| enters.distance(leaves))
    }
}

/// The parts of a line of many points that lie in `bounds`, joined end to end where it stays inside.
pub(crate) fn visible(points: &[Px], bounds: &Rect) -> Vec<Px> {
    let mut seen: Vec<Px> = Vec::with_capacity(points.len());
    for pair in points.windows(2) {
        let Some((from, to)) = bounds.clip(pair[0], pair[1]) else { continue };
        if seen.last().is_none_or(|last| last.distance(from) > 1e-6) {
            seen.push(from);
        }
        seen.push(to);
    }
    seen
}

/// Length of a line of many points, px.
pub(crate) fn length(points: &[Px]) -> f64 {
    points.windows(2).map(|pair| pair[0].distance(pair[1])).sum()
}

/// The point at a share of the length of a line.
pub(crate) fn along(points: &[Px], share: f64) -> Option<Px> {
    let mut rest = length(points) * share;
    for pair in points.windows(2) {
        let step = pair[0].distance(pair[1]);
        if rest <= step {
            return Some(pair[0].between(pair[1], if step > 0.0 { rest / step } else { 0.0 }));
        }
        rest -= step;
    }
    points.last().copied()
}

#[cfg(test)]
mod tests {
    use super::*;

    const BOX: Rect = Rect::new(10.0, 20.0, 100.0, 50.0);

    #[test]
    fn a_line_is_cut_at_the_edges() {
        let (from, to) = BOX.clip(Px::new(0.0, 45.0), Px::new(200.0, 45.0)).unwrap();
        assert!(from.distance(Px::new(10.0, 45.0)) < 1e-9);
        assert!(to.distance(Px::new(110.0, 45.0)) < 1e-9);
        assert_eq!(BOX.clip(Px::new(0.0, 0.0), Px::new(200.0, 10.0)), None);
        assert_eq!(BOX.clip(Px::new(0.0, 80.0), Px::new(0.0, 0.0)), None);
        let (from, to) = BOX.clip(Px::new(50.0, 0.0), Px::new(50.0, 45.0)).unwrap();
        assert_eq!((from, to), (Px::new(50.0, 20.0), Px::new(50.0, 45.0)));
    }

    #[test]
    fn boxes_share_what_both_cover() {
        assert!((BOX.overlap(&Rect::new(100.0, 60.0, 50.0, 50.0)) - 100.0).abs() < 1e-9);
        assert!(BOX.overlap(&Rect::new(110.0, 20.0, 5.0, 5.0)) <= 0.0);
        assert!((BOX.grown(1.0).outside(&BOX) - (102.0 * 52.0 - 5000.0)).abs() < 1e-9);
    }

    #[test]
    fn a_place_along_a_line() {
        let line = [Px::new(0.0, 0.0), Px::new(10.0, 0.0), Px::new(10.0, 30.0)];
        assert_eq!(along(&line, 0.5), Some(Px::new(10.0, 10.0)));
        assert_eq!(along(&line, 1.0), Some(Px::new(10.0, 30.0)));
        assert_eq!(along(&[], 0.5), None);
    }
}
