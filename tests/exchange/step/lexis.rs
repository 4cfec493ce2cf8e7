//! Ways of writing that mean the same.

use super::*;

/// One material's name.
fn name(written: &str) -> String {
    let exchange = read_clean_records(&format!("#1=IFCMATERIAL('{written}',$,$);"));
    let text = exchange.entities.all().next().unwrap().value("Name").to_value();
    let Value::Text(text) = text else { panic!("{written}: {text:?}") };
    text.into()
}

#[test]
fn strings_are_decoded() {
    // ISO 10303-21:2002, 6.3.3, and ISO/IEC 8859-1 and 10646 for the characters
    for (written, text) in [
        ("", ""),
        ("S355", "S355"),
        ("it''s", "it's"),
        ("''", "'"),
        ("a\\\\b", "a\\b"),
        ("C:\\temp\\x", "C:\\temp\\x"),
        ("\\X\\E9t\\X\\e9", "été"),
        ("\\X2\\00E9\\X0\\t\\X2\\00e903B1\\X0\\", "étéα"),
        ("\\X2\\D83DDE00\\X0\\", "😀"),
        ("\\X4\\0001F6000000006D\\X0\\2", "😀m2"),
        ("\\S\\i", "é"),
        ("\\PA\\\\S\\i", "é"),
        ("\\S\\''", "\u{a7}"),
        ("PL 15 × 200", "PL 15 × 200"),
        ("a\r\n  b", "a  b"),
        ("a;b /* c */ #1=", "a;b /* c */ #1="),
        ("(,)$*", "(,)$*"),
    ] {
        assert_eq!(name(written), text, "{written}");
    }
}

#[test]
fn bytes_that_are_not_utf8_are_latin1_and_said_once() {
    let file = file_of("IFC4", "#1=IFCMATERIAL('Tr~ger',$,$);\n#2=IFCMATERIAL('~',$,$);\n#3=IFCMATERIAL('é',$,$);");
    let bytes: Vec<u8> = file.bytes().map(|b| if b == b'~' { 0xE4 } else { b }).collect();
    let exchange = read(&bytes, "t.ifc").unwrap();
    let names: Vec<_> = exchange.entities.all().map(|e| e.text("Name").unwrap()).collect();
    assert_eq!(names, ["Träger", "ä", "é"]);
    assert_eq!(
        problems_of(&exchange),
        ["2:1 texts with bytes that are not UTF-8, 2 from here on, are read as ISO 8859-1"]
    );
}

/// Ways of writing `#1=IFCCARTESIANPOINT((1.,-2.5,0.00001));`.
const POINTS: &[&str] = &[
    "#1=IFCCARTESIANPOINT((1.,-2.5,0.00001));",
    "#1 = IfcCartesianPoint ( ( 1. , -2.5 , 1.E-005 ) ) ;",
    "#1=ifccartesianpoint((+1,-25.E-1,1.e-5));",
    "#1=\r\nIFCCARTESIANPOINT(\r\n(1.,\r\n-2.5,1.0E-5)\r\n)\r\n;",
    "/* a */#1/* ; */=/*'*/IFCCARTESIANPOINT/**/(/* #2=IFCX(); */(1./***/,-2.5,1.E-05)/* ) */);/* b */",
    "\u{a0}#1=\u{a0}IFCCARTESIANPOINT(\u{a0}(1.\u{a0},\t-2.5,1.E-05));",
    "ENDSEC;DATA('second',('IFC4'));#1=IFCCARTESIANPOINT((1.,-2.5,1.E-05));",
];

#[test]
fn one_record_in_many_ways() {
    for records in POINTS {
        let exchange = read_clean_records(records);
        assert_eq!(exchange.entities.len(), 1, "{records}");
        let point = exchange.entities.all().next().unwrap();
        assert_eq!((point.class(), point.label()), ("IfcCartesianPoint", "#1"), "{records}");
        assert_eq!(point.numbers("Coordinates").unwrap(), [1.0, -2.5, 0.00001], "{records}");
    }
}

#[test]
fn headers_in_many_ways() {
    for start in [
        "ISO-10303-21;HEADER;FILE_SCHEMA(('IFC4'));ENDSEC;DATA;",
        "\u{feff}\r\n iso-10303-21 ; header ; file_schema ( ( 'ifc4' ) ) ; endsec ; data ;",
        "/* by hand */ /**/ISO-10303-21;/*;*/HEADER;/* FILE_SCHEMA(('IFC2X3')); */FILE_NAME('it''s; ENDSEC','',(),(),'','','');\
         FILE_SCHEMA(/* ' */('IFC4'));ENDSEC;/*'*/DATA;",
        "ISO-10303-21;HEADER;FILE_SCHEMA(('OTHER','IFC4 {1 0}'));ENDSEC;DATA;",
    ] {
        let text = format!("{start}#1=IFCMATERIAL('m',$,$);ENDSEC;END-ISO-10303-21;");
        let exchange = read(text.as_bytes(), "t.ifc").unwrap();
        assert_eq!(problems_of(&exchange), [""; 0], "{start}");
        assert_eq!((exchange.form.as_str(), exchange.entities.len()), ("IFC4 STEP", 1), "{start}");
    }
    let utf16: Vec<u8> = [0xFEFF_u16]
        .into_iter()
        .chain(file_of("IFC4", "#1=IFCMATERIAL('é',$,$);").encode_utf16())
        .flat_map(u16::to_le_bytes)
        .collect();
    assert_eq!(read(&utf16, "t.ifc").unwrap().entities.all().next().unwrap().text("Name"), Some("é"));
}

#[test]
fn values_by_their_kinds() {
    let exchange = read_clean_records(
        "#1=IFCPROPERTYSINGLEVALUE('a',$,IFCBOOLEAN(.T.),$);\n\
         #2=IFCPROPERTYSINGLEVALUE('a',$,IFCLOGICAL(.U.),$);\n\
         #3=IFCPROPERTYSINGLEVALUE('a',$,IFCCOMPOUNDPLANEANGLEMEASURE((1,2,3)),$);\n\
         #4=IFCINDEXEDPOLYCURVE(#5,(IFCLINEINDEX((1,2)),IFCARCINDEX((2,3,1))),.F.);\n\
         #5=IFCCARTESIANPOINTLIST2D(((1.,2.),(3.,4.),(5.,6.)));\n\
         #6=IFCPIXELTEXTURE(.T.,.F.,$,$,$,1,1,3,(\"0FF00FF\"));\n\
         #7=IFCPROPERTYSINGLEVALUE('a',$,IFCMASSMEASURE(12),$);\n\
         #8=IFCEXTRUDEDAREASOLID($,$,$,IFCPOSITIVELENGTHMEASURE(7.));\n\
         #9=IFCPRESENTATIONSTYLEASSIGNMENT((IFCNULLSTYLE(.NULL.)));",
    );
    let value = |label: &str, attribute: &str| labelled(&exchange, label).value(attribute).to_value();
    let typed = |name: &str, value| Value::Typed(name.into(), Box::new(value));
    let list = |items: &[i64]| Value::List(items.iter().map(|i| Value::Integer(*i)).collect());
    assert_eq!(value("#1", "NominalValue"), typed("IfcBoolean", Value::Truth(true)));
    assert_eq!(value("#2", "NominalValue"), typed("IfcLogical", Value::Token("UNKNOWN".into())));
    assert_eq!(value("#3", "NominalValue"), typed("IfcCompoundPlaneAngleMeasure", list(&[1, 2, 3])));
    assert_eq!(
        value("#4", "Segments"),
        Value::List(vec![typed("IfcLineIndex", list(&[1, 2])), typed("IfcArcIndex", list(&[2, 3, 1]))])
    );
    let row = |a, b| Value::List(vec![Value::Number(a), Value::Number(b)]);
    assert_eq!(value("#5", "CoordList"), Value::List(vec![row(1.0, 2.0), row(3.0, 4.0), row(5.0, 6.0)]));
    assert_eq!(value("#6", "Pixel"), Value::List(vec![Value::Text("0FF00FF".into())]));
    assert_eq!(value("#7", "NominalValue"), typed("IfcMassMeasure", Value::Number(12.0)));
    assert_eq!(value("#8", "Depth"), Value::Number(7.0));
    assert_eq!(value("#9", "Styles"), Value::List(vec![typed("IFCNULLSTYLE", Value::Token("NULL".into()))]));
}

#[test]
fn references_forward_backward_and_by_large_ids() {
    let exchange = read_clean_records(
        "#9=IFCPOLYLINE((#18446744073709551615,#4294967297,#007,#9000));\n\
         #4294967297=IFCCARTESIANPOINT((1.));#18446744073709551615=IFCCARTESIANPOINT((2.));\n\
         #7=IFCCARTESIANPOINT((3.));#9000=IFCCARTESIANPOINT((4.));#3=IFCPOLYLINE((#7));",
    );
    let line = labelled(&exchange, "#9");
    let first = |point: Entity| point.numbers("Coordinates").unwrap()[0];
    assert_eq!(line.entities("Points").into_iter().map(first).collect::<Vec<_>>(), [2.0, 1.0, 3.0, 4.0]);
    assert_eq!(labelled(&exchange, "#18446744073709551615").place().line, 3);
    assert_eq!(labelled(&exchange, "#3").place().column, 58);
    assert_eq!(labelled(&exchange, "#7").referring().map(|e| e.label()).collect::<Vec<_>>(), ["#9", "#3"]);
}
