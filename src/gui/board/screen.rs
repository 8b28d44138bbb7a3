//! Where a section point lies on the screen: the transform of the board, how it is fitted, zoomed and panned.
//!
//! Knows no study.

use egui::{Pos2, Rect, Vec2, vec2};

use crate::geom::{self, Point};
use crate::gui::Camera;
use crate::units::UnitSystem;

/// Points a metre between which the board zooms.
const SCALE_RANGE: std::ops::RangeInclusive<f32> = 0.5..=100_000.0;

/// Furthest from the section's origin that the board looks, m.
const REACH_M: f64 = 10_000.0;

/// The drawing area and what it shows.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Screen {
    /// The drawing area, inside the rulers.
    pub rect: Rect,
    /// What it looks at.
    pub camera: Camera,
}

impl Screen {
    /// The area with the camera kept within what can be drawn.
    pub fn new(rect: Rect, camera: Camera) -> Screen {
        let scale = camera.points_per_m;
        let scale = if scale.is_finite() { scale } else { 100.0 };
        let points_per_m = scale.clamp(*SCALE_RANGE.start(), *SCALE_RANGE.end());
        let center_m = camera.center_m.map(|c| if c.is_finite() { c.clamp(-REACH_M, REACH_M) } else { 0.0 });
        Screen { rect, camera: Camera { points_per_m, center_m } }
    }

    /// A view of the box from `low` to `high` in the middle of `free`, a part of `rect`.
    pub fn fitted(rect: Rect, free: Rect, low: Point, high: Point) -> Screen {
        let size = high - low;
        let scale = f64::min(
            f64::from(free.width().max(20.0)) / size.x.max(1e-6),
            f64::from(free.height().max(20.0)) / size.y.max(1e-6),
        );
        let off = (rect.center() - free.center()) / scale as f32;
        let middle = geom::Point::from(0.5 * (low.coords + high.coords));
        let center_m = [middle.x + f64::from(off.x), middle.y - f64::from(off.y)];
        Screen::new(rect, Camera { points_per_m: scale as f32, center_m })
    }

    /// Points a metre.
    pub fn scale(&self) -> f64 {
        f64::from(self.camera.points_per_m)
    }

    /// Where a section point lies on the screen.
    pub fn screen_from_section(&self, p: Point) -> Pos2 {
        let [s, z] = self.camera.center_m;
        self.rect.center() + vec2(((p.x - s) * self.scale()) as f32, ((z - p.y) * self.scale()) as f32)
    }

    /// The section point under a screen point.
    pub fn section_from_screen(&self, p: Pos2) -> Point {
        let [s, z] = self.camera.center_m;
        let off = p - self.rect.center();
        Point::new(s + f64::from(off.x) / self.scale(), z - f64::from(off.y) / self.scale())
    }

    /// A section displacement on the screen.
    pub fn screen_vec(&self, v: geom::Vec2) -> Vec2 {
        vec2((v.x * self.scale()) as f32, (-v.y * self.scale()) as f32)
    }

    /// A line of section points on the screen.
    pub fn line(&self, points: &[Point]) -> Vec<Pos2> {
        points.iter().map(|&p| self.screen_from_section(p)).collect()
    }

    /// The camera zoomed by `factor`, the section point under `about` standing still.
    pub fn zoomed(&self, factor: f32, about: Pos2) -> Camera {
        let held = self.section_from_screen(about);
        let zoomed = Camera { points_per_m: self.camera.points_per_m * factor, ..self.camera };
        let mut screen = Screen::new(self.rect, zoomed);
        let now = screen.section_from_screen(about);
        screen.camera.center_m[0] += held.x - now.x;
        screen.camera.center_m[1] += held.y - now.y;
        screen.camera
    }

    /// The camera moved so that the drawing follows a drag by `delta`.
    pub fn panned(&self, delta: Vec2) -> Camera {
        let [s, z] = self.camera.center_m;
        let center_m = [s - f64::from(delta.x) / self.scale(), z + f64::from(delta.y) / self.scale()];
        Screen::new(self.rect, Camera { center_m, ..self.camera }).camera
    }
}

/// A round length of at least `least_m`, and how many of them make the next round length, which gets a label.
/// Round is 1, 2 or 5 of a decade of metres; or what a rule in feet and inches bears, and decades of feet.
pub fn round_step(least_m: f64, units: UnitSystem) -> (f64, usize) {
    const INCH: f64 = 0.0254;
    const RULE_INCHES: [(f64, usize); 9] =
        [(0.125, 4), (0.25, 4), (0.5, 6), (1.0, 6), (3.0, 4), (6.0, 4), (12.0, 5), (24.0, 5), (60.0, 4)];
    let least_m = least_m.max(1e-9) * (1.0 - 1e-9);
    if units == UnitSystem::Si {
        return decimal_step(least_m, 1.0);
    }
    let rung = RULE_INCHES.into_iter().find(|&(inches, _)| inches * INCH >= least_m);
    match rung {
        Some((inches, n)) if least_m > 0.0625 * INCH => (inches * INCH, n),
        Some(_) => decimal_step(least_m, INCH),
        None => decimal_step(least_m, 12.0 * INCH),
    }
}

fn decimal_step(least_m: f64, unit_m: f64) -> (f64, usize) {
    let least = least_m / unit_m;
    let decade = 10f64.powf(least.log10().floor());
    let rungs = [(1.0, 5), (2.0, 5), (5.0, 4), (10.0, 5)];
    let (rung, n) = rungs.into_iter().find(|r| r.0 * decade >= least).unwrap_or(rungs[3]);
    (rung * decade * unit_m, n)
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn rect() -> Rect {
        Rect::from_min_size(egui::pos2(264.0, 90.0), vec2(704.0, 398.0))
    }

    proptest! {
        #[test]
        fn the_transforms_invert_each_other(
            scale in 0.5..50_000.0_f32, s in -50.0..50.0_f64, z in -50.0..50.0_f64, x in 0.0..900.0_f32, y in 0.0..700.0_f32,
        ) {
            let screen = Screen::new(rect(), Camera { points_per_m: scale, center_m: [s, z] });
            let there = egui::pos2(x, y);
            let back = screen.screen_from_section(screen.section_from_screen(there));
            prop_assert!((back - there).length() < 0.01, "{there:?} came back as {back:?}");
        }

        #[test]
        fn a_zoom_holds_the_point_under_the_pointer(factor in 0.2..5.0_f32, x in 264.0..968.0_f32, y in 90.0..488.0_f32) {
            let screen = Screen::new(rect(), Camera { points_per_m: 172.0, center_m: [0.2, 0.9] });
            let about = egui::pos2(x, y);
            let held = screen.section_from_screen(about);
            let zoomed = Screen::new(rect(), screen.zoomed(factor, about));
            prop_assert!((zoomed.screen_from_section(held) - about).length() < 0.02);
        }
    }

    #[test]
    fn a_fit_shows_the_whole_box_in_the_free_part() {
        let free = Rect::from_min_size(egui::pos2(300.0, 120.0), vec2(400.0, 300.0));
        let (low, high) = (Point::new(-3.0, 0.0), Point::new(5.0, 2.0));
        let screen = Screen::fitted(rect(), free, low, high);
        let shown = Rect::from_two_pos(screen.screen_from_section(low), screen.screen_from_section(high));
        assert!(free.expand(0.1).contains_rect(shown), "{shown:?} in {free:?}");
        assert!((shown.width() - free.width()).abs() < 0.1, "as large as it goes: {shown:?}");
        assert!((shown.center() - free.center()).length() < 0.1);
    }

    #[test]
    fn nothing_breaks_the_camera() {
        let broken = Camera { points_per_m: f32::NAN, center_m: [f64::INFINITY, 1e300] };
        let screen = Screen::new(rect(), broken);
        assert!(screen.camera.points_per_m.is_finite() && screen.camera.center_m.iter().all(|c| c.is_finite()));
    }

    #[test]
    fn steps_are_round_and_large_enough() {
        for (least, units, want) in [
            (0.07, UnitSystem::Si, (0.1, 5)),
            (0.1, UnitSystem::Si, (0.1, 5)),
            (0.12, UnitSystem::Si, (0.2, 5)),
            (3.0, UnitSystem::Si, (5.0, 4)),
            (0.2, UnitSystem::UsCustomary, (0.3048, 5)),
            (0.07, UnitSystem::UsCustomary, (0.0762, 4)),
            (0.002, UnitSystem::UsCustomary, (0.0254 / 8.0, 4)),
            (3.0, UnitSystem::UsCustomary, (10.0 * 0.3048, 5)),
        ] {
            let got = round_step(least, units);
            assert!(
                (got.0 - want.0).abs() < 1e-12 && got.1 == want.1,
                "least {least}: got {got:?}, expected {want:?}"
            );
        }
    }
}
