//! Intended details.

use super::sound;
use faying::intent::{DiagonalForm, Friction, IntendedHaunch, IntendedStiffener, read};
use faying::rulebook::Category;
use faying::units::mm;

const JOINT: &str = "[[joint]]\nmark = 'J1'\ndetail = 'M3'\n";

#[test]
fn every_field_is_read() {
    let text = format!(
        "{JOINT}[detail.M3]\n\
         bolts = {{ size = 'M24', class = '8.8', rows_mm = [573.1, 483, -60], gauge_mm = 100 }}\n\
         plate = {{ thickness_mm = 25, width_mm = 250, top_mm = 620, bottom_mm = -50.5, grade = 'S275' }}\n\
         welds = {{ flange_throat_mm = 8.4, web_throat_mm = 5 }}\n\
         stiffeners = {{ top = {{ thickness_mm = 15, grade = 'S275' }}, bottom = 'none' }}\n\
         members = {{ supporting_section = 'UC 1', supported_section = 'UB 1', supporting_grade = 'S355', \
         supported_grade = 'S235' }}\n\
         haunch = {{ depth_mm = 300, length_mm = 700, flange_thickness_mm = 15 }}\n\
         exposed = true\n"
    );
    let intent = sound("s.toml", &text);
    let d = &intent.details[0];
    assert_eq!(d.name, "M3");
    assert_eq!(d.at.as_ref().map(ToString::to_string).as_deref(), Some("s.toml:4:9"));
    assert_eq!((d.bolt_diameter, d.bolt_class.as_deref()), (Some(mm(24.0)), Some("8.8")));
    assert_eq!(d.exposed, Some(true));
    let [depth, length, flange_thickness] = [300.0, 700.0, 15.0].map(|size| Some(mm(size)));
    assert_eq!(d.haunch, Some(Some(IntendedHaunch { depth, length, flange_thickness, ..IntendedHaunch::default() })));
    assert_eq!(d.rows, Some(vec![mm(573.1), mm(483.0), mm(-60.0)]));
    assert_eq!((d.gauge, d.plate_thickness, d.plate_width), (Some(mm(100.0)), Some(mm(25.0)), Some(mm(250.0))));
    assert_eq!((d.plate_top, d.plate_bottom), (Some(mm(620.0)), Some(mm(-50.5))));
    assert_eq!(d.plate_grade.as_deref(), Some("S275"));
    assert_eq!((d.flange_weld, d.web_weld), (Some(mm(8.4)), Some(mm(5.0))));
    let stiffener =
        IntendedStiffener { thickness: Some(mm(15.0)), grade: Some("S275".into()), ..IntendedStiffener::default() };
    assert_eq!((&d.stiffener_top, &d.stiffener_bottom), (&Some(Some(stiffener)), &Some(None)));
    assert_eq!((d.supporting_section.as_deref(), d.supported_section.as_deref()), (Some("UC 1"), Some("UB 1")));
    assert_eq!((d.supporting_grade.as_deref(), d.supported_grade.as_deref()), (Some("S355"), Some("S235")));
}

#[test]
fn every_sort_of_strengthening_is_read() {
    let text = format!(
        "{JOINT}[detail.M3.stiffeners]\n\
         top = {{ thickness_mm = 15, throat_mm = 6, length_mm = 160 }}\n\
         web_plates = {{ thickness_mm = 12, grade = 'S355', throat_mm = 8.5, sides = 2 }}\n\
         diagonals = {{ thickness_mm = 20, form = 'K' }}\n\
         backing_plates = 'none'\n"
    );
    let intent = sound("s.toml", &text);
    let d = &intent.details[0];
    let plates = |thickness: f64, throat: Option<f64>| IntendedStiffener {
        thickness: Some(mm(thickness)),
        throat: throat.map(mm),
        ..IntendedStiffener::default()
    };
    let top = IntendedStiffener { length: Some(mm(160.0)), ..plates(15.0, Some(6.0)) };
    assert_eq!(d.stiffener_top, Some(Some(top)));
    let web = IntendedStiffener { grade: Some("S355".into()), ..plates(12.0, Some(8.5)) };
    assert_eq!((&d.web_plates, d.web_plate_sides), (&Some(Some(web)), Some(2)));
    assert_eq!((&d.diagonals, d.diagonal_form), (&Some(Some(plates(20.0, None))), Some(DiagonalForm::K)));
    assert_eq!(d.backing_plates, Some(None));
}

#[test]
fn what_is_not_stated_is_none() {
    let intent = sound("s.toml", &format!("{JOINT}[detail.M3.stiffeners]\ntop = {{}}\n"));
    let d = &intent.details[0];
    assert_eq!(d.stiffener_top, Some(Some(IntendedStiffener::default())));
    assert_eq!((&d.stiffener_bottom, d.exposed), (&None, None));
    assert!(d.bolt_diameter.is_none() && d.rows.is_none() && d.plate_thickness.is_none() && d.flange_weld.is_none());
}

#[test]
fn details_stand_in_the_order_of_the_file() {
    let intent = sound("s.toml", &format!("[detail.Z]\n[detail.A]\n[detail.M3]\n{JOINT}"));
    let names: Vec<&str> = intent.details.iter().map(|d| d.name.as_str()).collect();
    assert_eq!(names, ["Z", "A", "M3"]);
    assert_eq!(intent.problems.len(), 2);
}

#[test]
fn category_and_friction_surfaces_are_read() {
    let bolts = |keys: &str| {
        let intent = sound("s.toml", &format!("{JOINT}[detail.M3]\nbolts = {{ {keys} }}\n"));
        let detail = &intent.details[0];
        (detail.bolt_category, detail.friction.clone())
    };
    assert_eq!(bolts("size = 'M24'"), (None, None));
    assert_eq!(bolts("category = 'c', friction_class = 'b'"), (Some(Category::C), Some(Friction::Class("B".into()))));
    assert_eq!(bolts("category = 'B', slip_factor = 0.45"), (Some(Category::B), Some(Friction::Factor(0.45))));
    for wrong in [
        "category = 'F'",
        "category = 3",
        "friction_class = 'E'",
        "slip_factor = 0",
        "slip_factor = 1.2",
        "slip_factor = 0.4, friction_class = 'B'",
    ] {
        let text = format!("{JOINT}[detail.M3]\nbolts = {{ {wrong} }}\n");
        assert!(read(text.as_bytes(), "s.toml").is_err(), "{wrong}");
    }
    assert!(read(format!("{JOINT}[detail.M3]\nexposed = 'yes'\n").as_bytes(), "s.toml").is_err());
}
