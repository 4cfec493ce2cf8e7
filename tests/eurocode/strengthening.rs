//! Stiffeners, web plates, diagonals and backing plates. Expected values are our own arithmetic, by hand from the clauses.
#![allow(non_snake_case)]

use faying::eurocode::diagonals::{self, Diagonal};
use faying::eurocode::stiffeners::{self, Pair};
use faying::eurocode::t_stub::{BackingPlates, ModeOne, TStub, t_stub};
use faying::eurocode::web_plates::{self, Edges, Web, WebPlate};
use faying::eurocode::welds::Fillets;
use faying::units::{Area, Force, kn, mm, mpa};
use faying::working::Working;

use crate::close;

const FILLETS: Fillets = Fillets { a: mm(6.0), f_u: mpa(430.0), beta_w: 0.85 };

const PAIR: Pair = Pair {
    b_s: mm(120.0),
    t_s: mm(12.0),
    cope: mm(20.0),
    f_y_s: mpa(275.0),
    l_s: mm(220.0),
    fillets: Some(FILLETS),
    ends_in_web: None,
};

/// 2 · 100 · 12 · 275 = 660 kN; four fillets of 6 mm over 100 mm, 430/(√2 · 0.85 · 1.25) · 6 = 1717.0 N/mm each: 686.8 kN.
#[test]
fn the_force_of_a_pair() {
    let force = |pair: &Pair| stiffeners::force(pair, 1.0, 1.25).value.kn();
    close(force(&PAIR), 660.0, 0.05);
    // A throat of 5 mm: 572.3 kN.
    let slight = Fillets { a: mm(5.0), ..FILLETS };
    close(force(&Pair { fillets: Some(slight), ..PAIR }), 572.3, 0.05);
    // Nobody states a weld: it is not asked here.
    close(force(&Pair { fillets: None, ..PAIR }), 660.0, 0.05);
    // Along the web: four fillets of 6 mm over 90 mm, 430/(√3 · 0.85 · 1.25) · 6 = 1401.9 N/mm each: 504.7 kN.
    close(force(&Pair { l_s: mm(90.0), ..PAIR }), 504.7, 0.05);
    // Ending in a web of 10 mm, 275: plates 2 · 100 · 12 · 275/√3 = 381.1 kN, web 2 · 100 · 10 · 275/√3 = 317.5 kN.
    let partial = Pair { l_s: mm(100.0), ends_in_web: Some((mm(10.0), mpa(275.0))), ..PAIR };
    close(force(&partial), 317.5, 0.05);
    // Nothing is nothing.
    close(force(&Pair { t_s: mm(0.0), ..PAIR }), 0.0, 1e-9);
    close(force(&Pair { b_s: mm(20.0), ..PAIR }), 0.0, 1e-9);
}

const PLATE: WebPlate = WebPlate { b_s: mm(240.0), t_s: mm(12.0), f_y_s: mpa(275.0), edges: Edges::Fillet(FILLETS) };
const WEB: Web = Web { t_wc: mm(10.0), d_wc: mm(240.0), f_y_wc: mpa(275.0) };

/// q = 0.9 · 275 · 10/√3 = 1428.9, f = 0.5 · 275 · 10 = 1375, √(2 f² + 3 q²) = 3147.5 N/mm; 6 · 430/(0.85 · 1.25) = 2428.2.
#[test]
fn the_share_that_a_web_plates_fillets_bring_in() {
    close(web_plates::share(&PLATE, &WEB, 1.0, 1.25).0, 2428.2 / 3147.5, 1e-4);
    assert_eq!(web_plates::share(&WebPlate { edges: Edges::Butt, ..PLATE }, &WEB, 1.0, 1.25).0, 1.0);
    let thick = Edges::Fillet(Fillets { a: mm(12.0), ..FILLETS });
    assert_eq!(web_plates::share(&WebPlate { edges: thick, ..PLATE }, &WEB, 1.0, 1.25).0, 1.0);
    let none = Edges::Fillet(Fillets { a: mm(0.0), ..FILLETS });
    assert_eq!(web_plates::share(&WebPlate { edges: none, ..PLATE }, &WEB, 1.0, 1.25).0, 0.0);
}

#[test]
fn what_a_web_plate_adds() {
    let mut w = Working::default();
    assert_eq!(web_plates::shear_area(&mut w, Area(3000.0), mm(10.0), mm(240.0), 0.5), Area(4200.0));
    assert_eq!(web_plates::in_compression(&mut w, mm(10.0), 1.0), mm(15.0));
    assert_eq!(web_plates::in_compression(&mut w, mm(10.0), 2.0), mm(20.0));
    assert_eq!(web_plates::in_compression(&mut w, mm(10.0), 0.0), mm(10.0));
    let butt = WebPlate { edges: Edges::Butt, ..PLATE };
    // a ≥ t_s/√2 = 8.49 mm.
    let full = WebPlate { edges: Edges::Fillet(Fillets { a: mm(8.5), ..FILLETS }), ..PLATE };
    for (plates, factor) in [
        (&[][..], 1.0),
        (&[PLATE, PLATE], 1.0),
        (&[butt], 1.5),
        (&[butt, butt], 2.0),
        (&[butt, PLATE], 1.5),
        (&[full], 1.4),
        (&[full, full], 1.4),
    ] {
        assert_eq!(web_plates::in_tension(&mut w, mm(10.0), mpa(355.0), plates), factor * mm(10.0));
    }
    assert_eq!(web_plates::in_tension(&mut w, mm(10.0), mpa(460.0), &[full]), 1.3 * mm(10.0));
}

#[test]
fn a_web_plate_that_does_not_count_says_why() {
    let why = |plate: WebPlate, half: f64| web_plates::conditions(&plate, &WEB, mm(half), mm(2.0)).unwrap_err();
    assert_eq!(web_plates::conditions(&PLATE, &WEB, mm(118.0), mm(2.0)), Ok(()));
    assert_eq!(why(WebPlate { t_s: mm(9.9), ..PLATE }, 120.0), "it is 9.900 mm thick, the web 10.00 mm (6.2.6.1(11))");
    assert_eq!(why(PLATE, 117.0), "it ends 117.0 mm from the web's middle, the root radius 120.0 mm (6.2.6.1(9))");
    // 40 ε t_s = 40 · √(235/275) · 12 = 443.7 mm.
    assert_eq!(
        why(WebPlate { b_s: mm(444.0), ..PLATE }, 222.0),
        "it is 444.0 mm wide, 40ε t_s is 443.7 mm (6.2.6.1(13))"
    );
    assert!(web_plates::conditions(&PLATE, &WEB, mm(f64::NAN), mm(2.0)).is_err());
}

const DIAGONAL: Diagonal = Diagonal {
    b: mm(120.0),
    t: mm(12.0),
    cope: mm(20.0),
    f_y: mpa(275.0),
    rise: mm(400.0),
    run: mm(300.0),
    fillets: Fillets { a: mm(10.0), ..FILLETS },
    t_wc: mm(10.0),
    far_end: None,
};

/// At 3 : 4 : 5 the horizontal part is 0.6. Net section 2 · 100 · 12 · 275 = 660 kN; four fillets of 10 mm over 100 mm,
/// 430/(√3 · 0.85 · 1.25) · 10 = 2336.6 N/mm: 934.6 kN; buckling: i = 250/√12, λ below 0.2, 2 · 120 · 12 · 275 = 792 kN.
#[test]
fn what_diagonals_add_to_the_panel() {
    let shear = |diagonal: &Diagonal| diagonals::shear(diagonal, 1.0, 1.0, 1.25).value.kn();
    close(shear(&DIAGONAL), 0.6 * 660.0, 0.05);
    close(shear(&Diagonal { fillets: Fillets { a: mm(5.0), ..FILLETS }, ..DIAGONAL }), 0.6 * 467.3, 0.05);
    close(shear(&Diagonal { far_end: Some(kn(150.0)), ..DIAGONAL }), 150.0, 1e-9);
    close(shear(&Diagonal { cope: mm(0.0), b: mm(20.0), far_end: Some(Force::ZERO), ..DIAGONAL }), 0.0, 1e-9);
    assert!(DIAGONAL.stocky() && !Diagonal { b: mm(160.0), ..DIAGONAL }.stocky());
}

/// Method 1 with backing plates: (4 M_pl,1 + 2 M_bp)/m. M_pl,1 = 0.25 · 200 · 12² · 275 = 1.98 kNm, M_bp = 0.25 · 180 · 10² · 235
/// = 1.0575 kNm: (7.92 + 2.115)/0.04 = 250.9 kN. Method 2 without a washer is the same.
#[test]
fn backing_plates_help_in_mode_1_only() {
    let plates = BackingPlates { t_bp: mm(10.0), f_y_bp: mpa(235.0), h_bp: mm(180.0) };
    let bare = TStub {
        l_eff_1: mm(200.0),
        l_eff_2: mm(200.0),
        t_f: mm(12.0),
        f_y: mpa(275.0),
        m: mm(40.0),
        n: mm(50.0),
        sum_F_t_Rd: kn(1000.0),
        mode_one: ModeOne::Method1,
        backing: None,
    };
    let backed = TStub { backing: Some(plates), ..bare };
    close(t_stub(&bare, 1.0).resistance.value.kn(), 198.0, 1e-6);
    close(t_stub(&backed, 1.0).resistance.value.kn(), 250.875, 1e-6);
    let no_washer = ModeOne::Method2 { d_w: mm(0.0) };
    close(t_stub(&TStub { mode_one: no_washer, ..backed }, 1.0).resistance.value.kn(), 250.875, 1e-6);
    // Bolts that govern gain nothing.
    let few = |stub: TStub| t_stub(&TStub { sum_F_t_Rd: kn(100.0), ..stub }, 1.0);
    assert_eq!(few(backed).resistance.value, few(bare).resistance.value);
    assert_ne!(few(backed).mode, 1);
    let none = TStub { backing: Some(BackingPlates { t_bp: mm(0.0), ..plates }), ..bare };
    close(t_stub(&none, 1.0).resistance.value.kn(), 198.0, 1e-6);
}
