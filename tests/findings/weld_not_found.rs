use super::bench::{check, missing};

const ID: &str = "weld-not-found";

#[test]
fn all_places_are_one_finding() {
    check(
        ID,
        |b| b.layout().welds.web = Err(missing("throat")),
        &["unproven | no throat is known of the welds at the beam's web: no property states it | - | -"],
    );
    check(
        ID,
        |b| {
            let welds = &mut b.layout().welds;
            (welds.flange_top, welds.flange_bottom) = (Err(missing("throat")), Err(missing("throat")));
            let mut web = missing("throat");
            web.reason = "no weld is modelled".into();
            welds.web = Err(web);
        },
        &["unproven | no throat is known of the welds at the beam's top flange, bottom flange and web: no property \
           states it; no weld is modelled | - | -"],
    );
    check(ID, |_| (), &[]);
}
