//! A fill map as a field over the unit square: tints, contours and hatches between its points.
//!
//! Knows no screen. What is not worked out yet is read from the coarser grid that is.

use crate::analysis::{FillMap, MapPoint, State};

/// What a place of the field is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Kind {
    /// Utilisation up to one.
    Used(f64),
    /// Beyond.
    Fails,
    /// Not judged.
    NotJudged,
}

/// Values on the lines of a grid; x along the accelerations, y along the fills, each from 0 to 1.
#[derive(Clone, Debug)]
pub(super) struct Field {
    xs: Vec<f64>,
    ys: Vec<f64>,
    /// Utilisation, one row a fill; none where not judged.
    values: Vec<Option<f64>>,
}

/// Larger utilisations are as good as this one: infinite ones have no place between two points.
const MOST: f64 = 4.0;

impl Field {
    /// The finest grid of the map that is complete; none before the first one is.
    pub fn new(map: &FillMap) -> Option<Field> {
        let (n_x, n_y) = (map.accels_m_per_s2.len(), map.shares.len());
        let lines = |n: usize, stride: usize| -> Vec<usize> {
            (0..n).filter(|i| i.is_multiple_of(stride) || i + 1 == n).collect()
        };
        let (xs, ys) = [1, 2, 4, 8]
            .into_iter()
            .map(|stride| (lines(n_x, stride), lines(n_y, stride)))
            .find(|(xs, ys)| ys.iter().all(|&i| xs.iter().all(|&j| map.point(i, j).is_some())))?;
        let value = |point: &MapPoint| match point.state {
            State::NotJudged => None,
            State::Fails => Some(point.utilisation.unwrap_or(MOST).clamp(1.0 + 1e-9, MOST)),
            State::Close | State::Holds => Some(point.utilisation.unwrap_or(0.0).clamp(0.0, 1.0)),
        };
        let values = ys.iter().flat_map(|&i| xs.iter().map(move |&j| map.point(i, j).and_then(value))).collect();
        // Both are even, so their places are too.
        let share = |idxs: Vec<usize>, n: usize| idxs.into_iter().map(|i| i as f64 / (n - 1) as f64).collect();
        Some(Field { xs: share(xs, n_x), ys: share(ys, n_y), values })
    }

    /// What is at a place: between judged points by straight lines, else what the nearest point is.
    pub fn at(&self, x: f64, y: f64) -> Kind {
        let ((i, u), (j, v)) = (cell(&self.xs, x), cell(&self.ys, y));
        let corners = [(0, 0), (1, 0), (0, 1), (1, 1)].map(|(di, dj)| self.value(i + di, j + dj));
        let value = match corners {
            [Some(a), Some(b), Some(c), Some(d)] => Some((a + (b - a) * u) * (1.0 - v) + (c + (d - c) * u) * v),
            _ => self.value(i + usize::from(u > 0.5), j + usize::from(v > 0.5)),
        };
        match value {
            None => Kind::NotJudged,
            Some(used) if used > 1.0 => Kind::Fails,
            Some(used) => Kind::Used(used),
        }
    }

    /// The line of a utilisation, in pieces.
    pub fn contour(&self, level: f64) -> Vec<[[f64; 2]; 2]> {
        let mut pieces = Vec::new();
        for j in 0..self.ys.len() - 1 {
            for i in 0..self.xs.len() - 1 {
                self.contour_in(i, j, level, &mut pieces);
            }
        }
        pieces
    }

    fn contour_in(&self, i: usize, j: usize, level: f64, pieces: &mut Vec<[[f64; 2]; 2]>) {
        // Round the cell.
        let corners = [(i, j), (i + 1, j), (i + 1, j + 1), (i, j + 1)];
        let mut ends = Vec::new();
        for k in 0..4 {
            let (a, b) = (corners[k], corners[(k + 1) % 4]);
            let (Some(va), Some(vb)) = (self.value(a.0, a.1), self.value(b.0, b.1)) else { return };
            if (va > level) != (vb > level) {
                let t = (level - va) / (vb - va);
                let along = |from: f64, to: f64| from + (to - from) * t;
                ends.push([along(self.xs[a.0], self.xs[b.0]), along(self.ys[a.1], self.ys[b.1])]);
            }
        }
        pieces.extend(ends.chunks_exact(2).map(|pair| [pair[0], pair[1]]));
    }

    fn value(&self, i: usize, j: usize) -> Option<f64> {
        self.values[j * self.xs.len() + i]
    }
}

/// The cell of a grid that holds `x`, and where in it.
fn cell(lines: &[f64], x: f64) -> (usize, f64) {
    let i = lines.partition_point(|line| *line <= x).clamp(1, lines.len() - 1) - 1;
    (i, ((x - lines[i]) / (lines[i + 1] - lines[i])).clamp(0.0, 1.0))
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::geom::Vec2;

    /// Utilisation x + y over 3 by 3 points, `None` where it is left out.
    fn map(used: impl Fn(usize, usize) -> Option<MapPoint>) -> FillMap {
        FillMap {
            case_idx: 0,
            direction: Vec2::x(),
            case_m_per_s2: 1.0,
            shares: vec![0.0, 0.5, 1.0],
            accels_m_per_s2: vec![0.0, 0.5, 1.0],
            points: (0..9).map(|k| used(k % 3, k / 3)).collect(),
        }
    }

    fn point(used: f64) -> Option<MapPoint> {
        let state = if used > 1.0 { State::Fails } else { State::Holds };
        Some(MapPoint { state, utilisation: Some(used), criterion: "Contained", bound: None })
    }

    #[test]
    fn between_points_the_field_is_straight_and_its_contour_too() {
        let field = Field::new(&map(|i, j| point(0.5 * (i + j) as f64))).unwrap();
        let Kind::Used(used) = field.at(0.2, 0.3) else { panic!("{:?}", field.at(0.2, 0.3)) };
        assert!((used - 0.5).abs() < 1e-12, "{used}");
        assert_eq!(field.at(0.8, 0.7), Kind::Fails);
        for [a, b] in field.contour(0.75) {
            for [x, y] in [a, b] {
                assert!((x + y - 0.75).abs() < 1e-12, "({x}, {y})");
            }
        }
        assert!(!field.contour(0.75).is_empty());
    }

    #[test]
    fn what_is_not_judged_stays_so_around_its_point_and_has_no_contour() {
        let unjudged = Some(MapPoint { state: State::NotJudged, utilisation: None, criterion: "", bound: None });
        let field = Field::new(&map(|i, j| if (i, j) == (1, 1) { unjudged } else { point(0.5) })).unwrap();
        assert_eq!(field.at(0.5, 0.5), Kind::NotJudged);
        assert_eq!(field.at(0.1, 0.1), Kind::Used(0.5));
        assert!(field.contour(0.2).is_empty());
    }

    #[test]
    fn a_part_of_a_map_is_read_from_the_grid_that_is_complete() {
        let coarse = map(|i, j| if i % 2 == 0 && j % 2 == 0 { point(0.25 * (i + j) as f64) } else { None });
        let Kind::Used(used) = Field::new(&coarse).unwrap().at(0.5, 0.5) else { panic!() };
        assert!((used - 0.5).abs() < 1e-12, "{used}");
        assert!(Field::new(&map(|_, _| None)).is_none());
    }
}
