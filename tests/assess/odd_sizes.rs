//! Sizes out of all proportion.

use faying::assess::State;
use faying::assess::end_plate::Opposite;
use faying::joints::BoltRow;
use faying::units::mm;
use proptest::prelude::*;

use super::joint::{RULES, asked, case, known, stiffener};
use super::safe::plain;

proptest! {
    /// Plates from foil to blocks, rows anywhere, gauges and edges out of all proportion: whatever is said to be met has
    /// finite numbers with the resistance on its side, and no component carries more than it can.
    #[test]
    fn no_geometry_is_met_by_accident(
        sizes in proptest::collection::vec(-50.0..900.0f64, 1..6),
        (t_p, gauge, edge, flange_edge) in (0.1..120.0f64, 1.0..900.0f64, -10.0..900.0f64, -10.0..900.0f64),
        (above, a_f, a_w, pair) in (-100.0..500.0f64, 0.0..60.0f64, 0.0..60.0f64, -20.0..450.0f64),
        (m, v, top) in (-300.0..300.0f64, -500.0..500.0f64, 300.0..900.0f64),
    ) {
        let mut layout = plain(|layout| {
            let mut heights = sizes.clone();
            heights.sort_by(|a, b| b.total_cmp(a));
            layout.bolts.rows = heights
                .into_iter()
                .map(|height| BoltRow {
                    height: mm(height),
                    gauge: mm(gauge),
                    edge_plate: mm(edge),
                    edge_column: mm(flange_edge),
                })
                .collect();
            layout.plate.thickness = mm(t_p);
            layout.plate.top = mm(top);
            layout.column_above = Some(mm(above));
            layout.welds.flange_top = known(mm(a_f));
            layout.welds.web = known(mm(a_w));
        });
        layout.stiffeners = vec![stiffener(&RULES, "S355", pair, 12.0, 120.0, mm(262.0))];
        let assessment = asked(&layout, &case(Some(m), Some(v), Some(0.0)), Opposite::None, &RULES);
        for verdict in assessment.cases.iter().flat_map(|case| &case.verdicts).filter(|v| v.state == State::Met) {
            let (required, resistance) = (verdict.required.unwrap(), verdict.resistance.unwrap());
            prop_assert!(required.is_finite() && resistance.is_finite() && required <= resistance, "{verdict:?}");
        }
        if let Some(moment) = &assessment.cases[0].moment {
            for c in moment.components.iter().filter(|c| !c.id.ends_with("weld")) {
                prop_assert!(c.at_full.get() <= c.resistance.get().max(0.0) * (1.0 + 1e-9), "{} {} {}", c.title, c.at_full, c.resistance);
            }
        }
    }
}
