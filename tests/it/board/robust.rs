//! Any study in any window.

use proptest::prelude::*;

use super::*;
use crate::arbitrary;

proptest! {
    #![proptest_config(ProptestConfig { cases: 96, ..Default::default() })]

    /// Any study, faulty or not, in any window and at any zoom: drawn, tessellated, and left alone.
    #[test]
    fn nothing_that_can_be_read_breaks_the_board(
        study in arbitrary::study(),
        (width, height) in (0.0..2000.0_f32, 0.0..1200.0_f32),
        camera in prop::option::of((-2.0..6.0_f32, -20.0..20.0_f64, -20.0..20.0_f64)),
        (case_idx, selected, pointer) in (0..5_usize, 0..9_usize, (0.0..1.0_f32, 0.0..1.0_f32)),
    ) {
        let mut desk = Desk { doc: Document::new(study.clone(), None), view: view() };
        desk.view.case_idx = case_idx;
        desk.view.open_verdict = Some((case_idx, selected));
        desk.view.selected = [
            Selected::Edge(case_idx), Selected::Vertex(case_idx), Selected::Obstacle(0),
            Selected::ObstacleVertex(0, 1), Selected::Point(0), Selected::Bob,
        ].get(selected).copied();
        desk.view.camera = camera.map(|(exponent, s, z)| Camera { points_per_m: 10f32.powf(exponent), center_m: [s, z] });
        let ctx = egui::Context::default();
        look::install(&ctx);
        let rect = egui::Rect::from_min_size(Pos2::ZERO, vec2(width, height));
        let pos = egui::pos2(pointer.0 * width, pointer.1 * height);
        for _ in 0..2 {
            let input = egui::RawInput {
                screen_rect: Some(rect),
                events: vec![Event::PointerMoved(pos)],
                ..Default::default()
            };
            let mut output = ctx.run_ui(input, |ui| desk.ui(ui));
            let meshes = ctx.tessellate(std::mem::take(&mut output.shapes), 1.0);
            prop_assert!(!meshes.is_empty() || width < 60.0 || height < 60.0, "nothing drawn in {width} by {height}");
            output.drop_without_applying_deltas();
        }
        prop_assert_eq!(desk.doc.study(), &study, "looking changes nothing");
    }
}
