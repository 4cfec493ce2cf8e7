//! However a file is cut to be read at the same time, and whether it is plain XML or not, the same is read.

use std::sync::LazyLock;

use faying::exchange::{Limits, Unreadable, read_within};
use proptest::prelude::*;
use rayon::{ThreadPool, ThreadPoolBuilder};

use super::*;
use crate::writer::Form::*;
use crate::writer::frames::frames;
use crate::writer::ifcxml::Style;
use crate::writer::version::Version;

static SEVEN: LazyLock<ThreadPool> = LazyLock::new(|| ThreadPoolBuilder::new().num_threads(7).build().unwrap());

/// Everything that a reading gives, places too.
fn told(exchange: Result<Exchange, Unreadable>) -> Vec<String> {
    let exchange = match exchange {
        Ok(exchange) => exchange,
        Err(error) => return vec![error.to_string()],
    };
    let entity = |e: Entity| {
        let values: Vec<String> = e.values().map(|(name, value)| format!("{name}={value:?}")).collect();
        let referring: Vec<u32> = e.referring().map(|e| e.id.0).collect();
        format!("{} {} {} {values:?} {referring:?}", e.place(), e.class(), e.label())
    };
    let entities = exchange.entities.all().map(entity);
    [exchange.form.clone()].into_iter().chain(entities).chain(problems_of(&exchange)).collect()
}

fn in_parts_of(part: usize, bytes: &[u8]) -> Vec<String> {
    SEVEN.install(|| told(read_within(bytes, "m", Limits { part, ..Limits::default() })))
}

/// The same document, but not plain: it is read by the general reader.
fn not_plain(document: &str) -> String {
    format!("{document}<![CDATA[]]>")
}

#[test]
fn every_form_is_read_the_same_in_parts() {
    let nested = IfcXml(Style { flat: false, prefixed: false });
    let flat = IfcXml(Style { flat: true, prefixed: true });
    for form in [nested, flat, Part28, Step(Version::Ifc4), Step(Version::Ifc2x3)] {
        let bytes = crate::writer::bytes(&frames(4, false), form);
        let whole = told(read(&bytes, "m"));
        assert!(whole.len() > 500, "{form:?} {whole:?}");
        for part in [1, 5_000, bytes.len() / 3] {
            assert!(in_parts_of(part, &bytes) == whole, "{form:?} in parts of {part}");
        }
        let text = String::from_utf8(bytes).unwrap();
        if text.starts_with('<') {
            assert!(told(read(not_plain(&text).as_bytes(), "m")) == whole, "{form:?} by the general reader");
        }
    }
}

#[test]
fn an_id_in_two_parts_means_the_first_one() {
    let filler = |i: u32| format!(" <IfcMaterial id='m{i}' Name='filler'/>\n");
    let many: String = (0..50).map(filler).collect();
    let point = |x: u32| {
        format!(
            " <IfcCartesianPoint id='p' Coordinates='{x} 0'/>\n <IfcVertexPoint><VertexGeometry ref='p'/></IfcVertexPoint>\n"
        )
    };
    let xml = format!("<ifcXML>\n{}{many}{}</ifcXML>", point(1), point(2));
    let step: String = [1, 2, 1]
        .iter()
        .flat_map(|n| {
            (0..50).map(move |i| format!("#{}=IFCMATERIAL('x',$,$);\n#{i}9=IFCMATERIALLIST((#{i}));\n", n * i))
        })
        .collect();
    let step = format!("ISO-10303-21;HEADER;FILE_SCHEMA(('IFC4'));ENDSEC;DATA;\n{step}ENDSEC;END-ISO-10303-21;");
    for text in [xml, step] {
        let whole = told(read(text.as_bytes(), "m"));
        assert!(whole.iter().any(|line| line.contains("is given a second time")), "{whole:?}");
        assert_eq!(in_parts_of(100, text.as_bytes()), whole);
    }
}

/// A document on many lines whose elements and records can be cut apart, with what makes that hard.
const XML: &str = "<?xml version='1.0'?>\n<ifcXML xmlns='http://www.buildingsmart-tech.org/ifc/IFC4/Add2TC1'>\n \
<IfcMaterial id='a' Name='&lt;'/>\n <!--\n <IfcMaterial/> -->\n <IfcPlate id='p' GlobalId='0000000000000000000001'>\n  \
<HasOpenings ref='v'/>\n  <ObjectPlacement ref='o'/>\n </IfcPlate>\n <IfcLocalPlacement id='o'>\n  <PlacementRelTo ref='o'/>\n \
</IfcLocalPlacement>\n <IfcFoo id='f' x='1'/>\n <IfcBar Name=' é\n <IfcMaterial/>'/>\n <IfcPropertySingleValue Name='n'>\n  \
<NominalValue><IfcLabel-wrapper>a\n <IfcMaterial/></IfcLabel-wrapper></NominalValue>\n </IfcPropertySingleValue>\n \
<IfcRelVoidsElement id='v' GlobalId='0000000000000000000002'/>\n <IfcFoo Y='2'/>\n</ifcXML>\n";

const STEP: &str = "ISO-10303-21;\nHEADER;\nFILE_SCHEMA(('IFC4'));\nENDSEC;\nDATA;\n#1=IFCMATERIAL('a\n#2=b;',$,$);\n\
#3=IFCMATERIALLIST((#1,#4,#99));\n/*\n#4=IFCMATERIAL('no',$,$);\n*/\n#4=IFCMATERIAL('b',$,$);\n#5=IFCFOO(#1,\n#3,'x');\n\
#4294967296=IFCPROPERTYSINGLEVALUE('n',$,IFCFOOMEASURE(#5),$);\n#7=IFCPROPERTYSET('g',$,$,$,(#4294967296,#1));\n\
#8=(IFCA()IFCB());\n#9=IFCCARTESIANPOINT((1.,2.);\n#10=IFCCARTESIANPOINT((1.E999,2.));\n#11=IFCMATERIAL('\u{e9}',$,$);\n\
ENDSEC;\nDATA;\n#12=IFCBAR(#11);\nENDSEC;\nEND-ISO-10303-21;\n";

proptest! {
    #[test]
    fn whatever_is_damaged_is_read_the_same_in_parts(
        is_step: bool, position in 0_usize..1300, cut in 0_usize..30, part in 1_usize..400,
        damage in "(\n #|#1=|\n|<|>|'|;|/|ENDSEC;|/[*]|[*]/|<!--|-->| |&|&amp;|&x;|[(]|[)]|</ifcXML>|[a-z]){0,3}",
    ) {
        let text = if is_step { STEP } else { XML };
        let at = |offset: usize| (0..=offset.min(text.len())).rev().find(|at| text.is_char_boundary(*at)).unwrap_or(0);
        let (start, end) = (at(position), at(position + cut));
        let damaged = format!("{}{damage}{}", &text[..start], &text[end..]);
        let whole = told(read(damaged.as_bytes(), "m"));
        prop_assert_eq!(&in_parts_of(part, damaged.as_bytes()), &whole, "{}", damaged);
        if !is_step && read(damaged.as_bytes(), "m").is_ok() {
            prop_assert_eq!(told(read(not_plain(&damaged).as_bytes(), "m")), whole, "{}", damaged);
        }
    }
}
