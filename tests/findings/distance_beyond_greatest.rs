use faying::units::mm;

use super::bench::{Bench, check, missing, rows};

const ID: &str = "distance-beyond-greatest";

/// EN 1993-1-8:2005 Table 3.3 with t = 12: 4t + 40 = 88, 14t = 168 (own arithmetic).
fn thin(b: &mut Bench) {
    b.intended().exposed = Some(true);
    b.layout().plate.thickness = mm(12.0);
    b.layout().plate.top = mm(630.0);
    b.layout().bolts.rows = rows(&[560.0, 440.0, 350.0, 200.0, 60.0]);
    b.layout().bolts.rows.iter_mut().for_each(|row| row.edge_column = mm(80.0));
}

#[test]
fn each_distance_has_its_most() {
    check(ID, thin, &[]);
    check(
        ID,
        |b| {
            thin(b);
            b.layout().plate.top = mm(650.0);
            b.layout().bolts.rows[2].edge_column = mm(90.0);
            b.layout().bolts.rows.remove(3);
        },
        &[
            "comment | the end distance e1 of the bolts in the end plate is 90 mm, the most allowed where the steel is \
             exposed is 88 mm (t = 12 mm) | at most 88 mm | 90 mm",
            "comment | the edge distance e2 of the bolts in the column flange is 90 mm, the most allowed where the steel \
             is exposed is 88 mm (t = 12 mm) | at most 88 mm | 90 mm",
            "comment | the spacing p1 of the bolt rows is 290 mm, the most allowed where the steel is exposed is 168 mm \
             (t = 12 mm) | at most 168 mm | 290 mm",
        ],
    );
}

#[test]
fn it_asks_only_where_somebody_calls_the_steel_exposed() {
    let mut bench = Bench::good();
    thin(&mut bench);
    bench.layout().bolts.rows.remove(3);
    assert_eq!(bench.find(ID).len(), 1);
    for stated in [None, Some(false)] {
        bench.intended().exposed = stated;
        assert_eq!(bench.find(ID).len(), 0);
    }
    // The rule file speaks for those that do not say.
    bench.rulebook.distances.exposed = true;
    assert_eq!(bench.find(ID).len(), 0, "this one says that it is not");
    bench.intended().exposed = None;
    assert_eq!(bench.find(ID).len(), 1);
    bench.intended = None;
    assert_eq!(bench.find(ID).len(), 1);
    bench.layout().column.section = Err(missing("section"));
    assert_eq!(bench.find(ID).len(), 0);
}

/// min(14t, 200): with t = 19 of the flange of HEB 300 it is 200.
#[test]
fn a_thick_ply_has_the_fixed_length() {
    let mut bench = Bench::good();
    bench.intended().exposed = Some(true);
    assert!(
        bench.lines(ID).iter().any(|line| line.contains("p1 of the bolt rows is 290 mm") && line.contains("200 mm"))
    );
}
