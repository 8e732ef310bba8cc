//! Labels that keep out of each other's way.

/// An upright box: left, top, right, bottom.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Area {
    /// Left edge.
    pub(super) left: f64,
    /// Top edge.
    pub(super) top: f64,
    /// Right edge.
    pub(super) right: f64,
    /// Bottom edge.
    pub(super) bottom: f64,
}

impl Area {
    fn meets(&self, other: &Self) -> bool {
        self.left < other.right
            && other.left < self.right
            && self.top < other.bottom
            && other.top < self.bottom
    }

    fn within(&self, frame: &Self) -> bool {
        self.left >= frame.left
            && self.right <= frame.right
            && self.top >= frame.top
            && self.bottom <= frame.bottom
    }
}

/// What is taken inside a frame.
#[derive(Clone, Debug)]
pub(super) struct Taken {
    frame: Area,
    areas: Vec<Area>,
}

impl Taken {
    /// Nothing yet.
    #[must_use]
    pub(super) const fn new(frame: Area) -> Self {
        Self { frame, areas: Vec::new() }
    }

    /// Takes an area, whatever is there.
    pub(super) fn take(&mut self, area: Area) {
        self.areas.push(area);
    }

    /// Takes the first of these areas that is inside the frame and free, and says which.
    pub(super) fn first_free(&mut self, wanted: impl IntoIterator<Item = Area>) -> Option<(usize, Area)> {
        let free = |a: &Area| a.within(&self.frame) && !self.areas.iter().any(|t| t.meets(a));
        let (i, area) = wanted.into_iter().enumerate().find(|(_, a)| free(a))?;
        self.areas.push(area);
        Some((i, area))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn at(left: f64, top: f64) -> Area {
        Area { left, top, right: left + 10.0, bottom: top + 10.0 }
    }

    #[test]
    fn the_first_free_place_is_taken_once() {
        let mut taken = Taken::new(Area { left: 0.0, top: 0.0, right: 30.0, bottom: 10.0 });
        let wanted = [at(-1.0, 0.0), at(0.0, 0.0), at(5.0, 0.0), at(10.0, 0.0)];
        assert_eq!(taken.first_free(wanted), Some((1, at(0.0, 0.0))));
        // Edges may touch.
        assert_eq!(taken.first_free(wanted), Some((3, at(10.0, 0.0))));
        assert_eq!(taken.first_free(wanted), None);
        taken.take(at(20.0, 0.0));
        assert_eq!(taken.first_free([at(20.0, 0.0)]), None);
        assert_eq!(taken.first_free([]), None);
    }
}
