//! What is broken is said, costs its own record at most, and never the program.

use proptest::prelude::*;

use super::*;

/// Records, starting on line 2, and the problems they give. Behind each stands a record that must not be lost.
const PROBLEMS: &[(&str, &[&str])] = &[
    (
        "#1=IFCPOLYLINE((#2,#3));#2=IFCCARTESIANPOINT((0.,0.));",
        &["2:1 IfcPolyline #1 refers to #3, but no entity has that id"],
    ),
    (
        "#1=IFCMATERIAL('a',$,$);\n #1=IFCMATERIAL('b',$,$);",
        &["3:2 the id #1 is given a second time; references to it mean the one at t.ifc:2:1"],
    ),
    (
        "#1=IFCCARTESIANPOINT((0.,1.E999,0.));",
        &["2:1 Coordinates of IfcCartesianPoint #1 is \"1.E999\", a finite number is required"],
    ),
    (
        "#1=IFCCARTESIANPOINT((0.,1.#INF,NAN));",
        &["2:1 Coordinates of IfcCartesianPoint #1 is \"1.#INF\", a number is required"],
    ),
    ("#1=IFCCARTESIANPOINT((0.,$,0.));", &["2:1 Coordinates of IfcCartesianPoint #1 has $ in a list of numbers"]),
    ("#1=IFCPOLYLINE(($));", &["2:1 Points of IfcPolyline #1 has $ in its list; the others are read"]),
    (
        "#1=IFCCARTESIANPOINTLIST3D(((0.,0.,0.),(1.,1.)));",
        &["2:1 CoordList of IfcCartesianPointList3D #1 has a row of 2 values, but rows of 3 are required"],
    ),
    (
        "#1=IFCEXTRUDEDAREASOLID($,$,$,'7');",
        &["2:1 Depth of IfcExtrudedAreaSolid #1 is the text \"7\", a number is required"],
    ),
    (
        "#1=IFCEXTRUDEDAREASOLID($,$,$,(7.));",
        &["2:1 Depth of IfcExtrudedAreaSolid #1 is a list, a single value is required"],
    ),
    (
        "#1=IFCEXTRUDEDAREASOLID($,$,$,IFCLABEL('7'));",
        &["2:1 Depth of IfcExtrudedAreaSolid #1 is a typed value of another kind, a number is required"],
    ),
    ("#1=IFCMATERIAL(5,$,$);", &["2:1 Name of IfcMaterial #1 is \"5\", a text in quotes is required"]),
    ("#1=IFCMATERIAL(,$,$);", &["2:1 Name of IfcMaterial #1 is \"\", a text in quotes is required"]),
    ("#1=IFCHALFSPACESOLID($,YES);", &["2:1 AgreementFlag of IfcHalfSpaceSolid #1 is \"YES\", .T. or .F. is required"]),
    ("#1=IFCPLANE(7);", &["2:1 Position of IfcPlane #1 is \"7\", an entity #1 is required"]),
    (
        "#1=IFCMATERIALLIST(#2);#2=IFCMATERIAL('a',$,$);",
        &["2:1 Materials of IfcMaterialList #1 is a single value, a list in ( ) is required; read as a list of one"],
    ),
    ("#1=IFCMATERIAL('a');", &["2:1 IfcMaterial #1 has 1 attributes, 3 are required; those that are there are read"]),
    (
        "#1=IFCMATERIAL('a',$,$,#99999);",
        &["2:1 IfcMaterial #1 has 4 attributes, 3 are required; those that are there are read"],
    ),
    (
        "#1=IFCPROPERTYSINGLEVALUE('a',$,'8.8',$);",
        &[
            "2:1 NominalValue of IfcPropertySingleValue #1 holds a bare value; a type such as IFCLABEL('…') is required around it",
        ],
    ),
    (
        "#1=IFCPROPERTYSINGLEVALUE('a',$,IFCGRADE('8.8'),$);",
        &["2:1 NominalValue of IfcPropertySingleValue #1 holds IFCGRADE, which is no type of the schema"],
    ),
    (
        "#1=IFCMATERIAL('\\X2\\00E\\X0\\',$,$);",
        &[
            "2:1 Name of IfcMaterial #1 holds \\X2\\ without groups of 4 hexadecimal digits and \\X0\\ after it; it is kept as it stands",
        ],
    ),
    (
        "#1=IFCMATERIAL('\\PF\\\\S\\!',$,$);",
        &["2:1 Name of IfcMaterial #1 holds \\S\\!, which the code page \\PF\\ does not have"],
    ),
    (
        "#1=IFCBOLT('x',#99999);",
        &["2:1 IFCBOLT is no entity of the schema; it is kept, but nothing of it is understood"],
    ),
    ("#1=IFCCURVE();", &["2:1 IfcCurve is abstract: one of its subtypes is required"]),
    (
        "#1=(IFCCURVE()IFCLABELLED('a);(b'));",
        &["2:1 #1 is of several classes at once; it is kept, but nothing of it is understood"],
    ),
    ("#1=IFCMATERIAL('it's',$,$);", &["2:1 Name of IfcMaterial #1 has a single ' in its text; it is read as \"it's\""]),
    (
        "#1=IFCMATERIAL('it,$,$);#2=IFCMATERIAL('a',$,$);#3=IFCMATERIAL('b',$,$);",
        &[
            "2:1 IfcMaterial #1 holds a string that is not closed (or longer than 1048576 bytes); what follows in it is not read",
        ],
    ),
    ("/* #1=IFCMATERIAL('a',$,$);", &["2:1 a comment starts here and is not closed; it is read as if it were none"]),
    (
        "#1=IFCMATERIAL('it,$,$);",
        &[
            "2:1 IfcMaterial #1 holds a string that is not closed (or longer than 1048576 bytes); what follows in it is not read",
        ],
    ),
    (
        "#1=IFCMATERIAL('a',$",
        &["2:1 IfcMaterial #1 has \"#99999=IFCMATERIAL('\" where , or ) is required; what follows in it is not read"],
    ),
    (
        "#1=IFCMATERIAL('a',$,",
        &["2:1 IfcMaterial #1 has \"#99999=IFCMATERIAL('\" where a value is required; what follows in it is not read"],
    ),
    ("#1=IFCMATERIAL('a',$,$)", &["2:1 IfcMaterial #1 has \"#99999=IFCMATERIAL('\" where ; at its end is required"]),
    (
        "#1=IFCMATERIAL;",
        &["2:1 IfcMaterial #1 has \";\" where ( after the class is required; what follows in it is not read"],
    ),
    ("#1=;", &["2:1 #1 names no entity after its ="]),
    ("#1;", &["2:1 #1 starts no record #1=…"]),
    ("#=IFCMATERIAL('a',$,$);", &["2:1 # starts no record #1=…"]),
    ("FILE_X('a');", &["2:1 the statement \"FILE_X\" is not read: records #1=… and sections are allowed here"]),
    (
        "ENDSEC;\n#1=IFCMATERIAL('a',$,$);DATA;",
        &["3:1 a record stands outside a DATA section; it is read all the same"],
    ),
    ("ENDSEC;ANCHOR;<x>=#1;ENDSEC;DATA;", &["2:8 the section ANCHOR is not read: HEADER and DATA are"]),
    ("#1=IFCBEAM($,$,$,$,$,$,$,$,$);", &["2:1 IfcBeam #1 has no GlobalId"]),
];

#[test]
fn what_is_broken_is_said_and_costs_no_other_record() {
    for (records, expected) in PROBLEMS {
        let exchange = read_records(&format!("{records}\n#99999=IFCMATERIAL('kept',$,$);"));
        assert_eq!(problems_of(&exchange), *expected, "{records}");
        assert_eq!(labelled(&exchange, "#99999").text("Name"), Some("kept"), "{records}");
    }
}

#[test]
fn what_is_there_is_kept() {
    let exchange = read_records(
        "#1=IFCMATERIAL('short');#2=IFCMATERIAL('long',$,$,#1,5);#3=IFCMATERIAL('broken',$ $);\n\
         #4=IFCBOLT('x',(#1,.A.),IFCLABEL('y'));#5=IFCMATERIALLIST((#1,#8,#2));#6=(IFCA()IFCB());#7=IFCMATERIALLIST((#6));",
    );
    let names = |ids: &[&str]| ids.iter().map(|id| labelled(&exchange, id).text("Name").unwrap()).collect::<Vec<_>>();
    assert_eq!(names(&["#1", "#2", "#3"]), ["short", "long", "broken"]);
    assert_eq!(labelled(&exchange, "#2").entity("4").unwrap().label(), "#1");
    assert_eq!(labelled(&exchange, "#4").text("3"), Some("y"));
    assert_eq!(
        labelled(&exchange, "#5").entities("Materials").iter().map(|e| e.label()).collect::<Vec<_>>(),
        ["#1", "#2"]
    );
    assert_eq!(labelled(&exchange, "#7").entities("Materials")[0].label(), "#6");
    assert_eq!(labelled(&exchange, "#1").referring().map(|e| e.label()).collect::<Vec<_>>(), ["#2", "#4", "#5"]);
}

#[test]
fn a_file_that_breaks_off_is_read_as_far_as_it_goes_and_says_so() {
    let file =
        |end: &str| format!("{}{end}", file_of("IFC4", "#1=IFCMATERIAL('a',$,$);").split_once("\nENDSEC").unwrap().0);
    for (end, problem) in [
        ("\nENDSEC;", "3:8 the file ends without END-ISO-10303-21; what may have followed is not read"),
        ("", "2:25 the file breaks off: ENDSEC and END-ISO-10303-21 are missing, what followed is not read"),
        ("\nENDSEC;END-ISO-10303-21;\n#2=IFCMATERIAL('b',$,$);", "4:1 what follows END-ISO-10303-21 is not read"),
    ] {
        let exchange = read(file(end).as_bytes(), "t.ifc").unwrap();
        assert_eq!((problems_of(&exchange), exchange.entities.len()), (vec![problem.to_owned()], 1), "{end}");
    }
    let exchange = read(file("\n#2=IFCMATERIAL('b").as_bytes(), "t.ifc").unwrap();
    assert_eq!(exchange.problems.len(), 2, "{:?}", exchange.problems);
}

#[test]
fn a_schema_that_is_missing_or_unknown_is_said() {
    for (header, form, problem) in [
        ("", "IFC4 STEP", "1:28 FILE_SCHEMA is missing: read as IFC4"),
        ("FILE_SCHEMA(('IFC4X1'));", "IFC4 STEP", "1:21 the schema \"IFC4X1\" has no tables here: read as IFC4"),
        (
            "FILE_SCHEMA(('IFC4X3_RC2'));",
            "IFC4X3 STEP",
            "1:21 the schema \"IFC4X3_RC2\" has no tables here: read as IFC4X3",
        ),
        (
            "FILE_SCHEMA(('IFC2X2_FINAL'));",
            "IFC2X3 STEP",
            "1:21 the schema \"IFC2X2_FINAL\" has no tables here: read as IFC2X3",
        ),
    ] {
        let text = format!("ISO-10303-21;HEADER;{header}ENDSEC;DATA;ENDSEC;END-ISO-10303-21;");
        let exchange = read(text.as_bytes(), "t.ifc").unwrap();
        assert_eq!((exchange.form.as_str(), problems_of(&exchange)), (form, vec![problem.to_owned()]));
    }
}

#[test]
fn nesting_and_strings_have_a_limit() {
    let deep =
        format!("#1=IFCX({}1{});#2=IFCX({}", "(".repeat(100_000), ")".repeat(100_000), "IFCLABEL(".repeat(100_000));
    let long = format!("#3=IFCMATERIAL('{}',$,$);", "x".repeat(1 << 21));
    let fits = format!("#4=IFCMATERIAL('{}',$,$);", "x".repeat(1 << 20));
    let exchange = read_records(&format!("{deep}\n{long}\n{fits}\n#5=IFCMATERIAL('kept',$,$);"));
    assert_eq!(labelled(&exchange, "#5").text("Name"), Some("kept"));
    assert_eq!(labelled(&exchange, "#4").text("Name").unwrap().len(), 1 << 20);
    assert_eq!(labelled(&exchange, "#3").text("Name"), None);
    let problems = problems_of(&exchange);
    assert!(problems.iter().any(|p| p.contains("IFCX #1 nests values deeper than 64")), "{problems:?}");
    assert!(problems.iter().any(|p| p.contains("IFCX #2 nests values deeper than 64")), "{problems:?}");
    assert!(problems.iter().any(|p| p.contains("IfcMaterial #3 holds a string that is not closed")), "{problems:?}");
}

#[test]
fn broken_files_take_linear_time() {
    for piece in [
        "''');",
        "'a'b",
        "#1=A('' ",
        "#1=A('\\X2\\",
        "/*",
        "'",
        "#1='",
        "#1=IFCX('';",
        "#1=IFCX(",
        ";   ",
        "';#1",
        "\"",
        "#",
        "(",
    ] {
        let exchange = read_records(&piece.repeat(300_000));
        assert!(!exchange.problems.is_empty() || exchange.entities.is_empty(), "{piece}");
    }
}

#[test]
fn escapes_without_end_take_linear_time() {
    for end in ["", "\\X0\\"] {
        let exchange = read_records(&format!("#1=IFCMATERIAL('{}{end}',$,$);", "\\X2\\".repeat(200_000)));
        assert_eq!(exchange.problems.len(), 1);
    }
}

/// What stands behind a quote that was not doubled is not lost: a member would lose its place and its body.
#[test]
fn a_quote_that_is_not_doubled_costs_nothing() {
    let exchange = read_records(
        "#1=IFCBEAM('0000000000000000000001',$,'Beam's 'far' end',$,'it's' ,#2,$,'T''7',.BEAM.);#2=IFCLOCALPLACEMENT($,$);",
    );
    let beam = labelled(&exchange, "#1");
    assert_eq!((beam.text("Name"), beam.text("ObjectType")), (Some("Beam's 'far' end"), Some("it's")));
    assert_eq!((beam.text("Tag"), beam.token("PredefinedType")), (Some("T'7"), Some("BEAM")));
    assert_eq!(beam.entity("ObjectPlacement").map(|e| e.label()), Some("#2"));
    assert_eq!(exchange.problems.len(), 2);
}

/// Two quotes are one quote of the text, as the standard has it, even where the writer meant the end: that swallows
/// the next text, and the record says that it is short.
#[test]
fn a_quote_that_is_not_doubled_at_the_end_of_a_text_is_said() {
    let exchange = read_records("#1=IFCMATERIAL('in'',$,'x');#2=IFCMATERIAL('kept',$,$);");
    assert_eq!(labelled(&exchange, "#1").text("Name"), Some("in',$,'x"));
    assert_eq!(labelled(&exchange, "#2").text("Name"), Some("kept"));
    assert!(problems_of(&exchange).iter().any(|p| p.contains("has 1 attributes, 3 are required")));
}

const SMALL: &str = "ISO-10303-21;HEADER;FILE_SCHEMA(('IFC4'));ENDSEC;DATA;\n\
    #1=IFCPLATE('0000000000000000000001',$,'a''b\\X2\\00E9\\X0\\\\S\\i',$,$,#2,$,'7',.NOTDEFINED.);\n\
    #2=IFCLOCALPLACEMENT($,#3);/* c */#3=IFCAXIS2PLACEMENT3D(#4,$,$);#4=IFCCARTESIANPOINT((1.,2.5E1,-3.));\n\
    #5=IFCPROPERTYSINGLEVALUE('a',*,IFCBOOLEAN(.T.),$);#6=(IFCA()IFCB('x'));#7=IFCX(\"0F\",((1),(2)));\n\
    ENDSEC;END-ISO-10303-21;";

#[test]
fn no_beginning_of_a_file_panics() {
    for end in 0..SMALL.len() {
        let _ = read(&SMALL.as_bytes()[..end], "t");
    }
}

/// Bytes that mean something in STEP, and others.
fn bytes() -> impl Strategy<Value = Vec<u8>> {
    let byte = prop_oneof![proptest::sample::select(b"#=('),;$*.\\\"/X2410S!E-\n".to_vec()), any::<u8>()];
    proptest::collection::vec(byte, 0..12)
}

proptest! {
    #[test]
    fn no_damage_panics(position in 0..SMALL.len(), damage in bytes(), cut in 0usize..40) {
        let mut text = SMALL.as_bytes().to_vec();
        let end = (position + cut).min(text.len());
        text.splice(position..end, damage);
        if let Ok(exchange) = read(&text, "t") {
            exchange.entities.all().for_each(|e| e.values().for_each(drop));
        }
    }

    /// Whatever the text of one record, the records on the lines around it are read.
    #[test]
    fn no_record_costs_another(damage in bytes()) {
        prop_assume!(!damage.windows(2).any(|w| w == b"/*"));
        let text = file_of("IFC4", "#1=IFCMATERIAL('a',$,$);\n#2=IFCMATERIAL(~);\n#3=IFCMATERIAL('c',$,$);");
        let at = text.find('~').unwrap();
        let mut text = text.into_bytes();
        text.splice(at..=at, damage);
        let exchange = read(&text, "t").unwrap();
        let names: Vec<_> = exchange.entities.all().map(|e| (e.label(), e.text("Name"))).collect();
        prop_assert!(names.contains(&("#1", Some("a"))));
        prop_assert!(names.contains(&("#3", Some("c"))), "{:?}", exchange.problems);
    }

    /// What is written into a string comes out of it.
    #[test]
    fn strings_come_back(text in "[^\\\\\\x00-\\x1f\\x7f-\\x9f]{0,20}") {
        let exchange = read_records(&format!("#1=IFCMATERIAL('{}',$,$);", text.replace('\'', "''")));
        let value = exchange.entities.all().next().unwrap().value("Name").to_value();
        prop_assert_eq!(value, Value::Text(text.into()));
    }
}
