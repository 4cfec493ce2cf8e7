//! The few reasons for which a file is not read at all.

use super::*;

#[test]
fn a_file_that_is_no_exchange_says_why_in_one_sentence() {
    for (text, reason) in [
        ("", "the file is empty"),
        (" \r\n\t ", "the file is empty"),
        ("\u{feff}\nISO-10303-21;\nHEADER;", "the file breaks off before its DATA section: the file is truncated"),
        (
            "ISO-10303-21;HEADER;\n FILE_SCHEMA(('AUTOMOTIVE_DESIGN { 1 0 10303 214 }'));ENDSEC;DATA;ENDSEC;",
            "the file is STEP of the schema \"AUTOMOTIVE_DESIGN\" at line 2, column 2; IFC2X3, IFC4 and IFC4X3 are read",
        ),
        (
            "Mark,Moment\n",
            "the file is no exchange: it starts with \"Mark,Moment\\n\", ifcXML or STEP (ISO-10303-21) is required",
        ),
        (
            "<ex:iso_10303_28 xmlns:ex='urn:iso.org:standard:10303:part(28):version(2):xmlschema:common'/>",
            "the file is ifcXML by ISO 10303-28 without a uos, which would hold the entities",
        ),
        ("<!-- nothing -->", "the file holds no XML element"),
        (
            "<ifcXML>\n<IfcBeam>",
            "the file breaks off at line 2, column 10: an element is not closed, the file is truncated",
        ),
        (
            "<ifcXML>\n<IfcBeam Name='x",
            "the file breaks off inside the markup at line 2, column 1: tag not closed: `>` not found before end of input",
        ),
        (
            "<ifcXML>\n<IfcBeam Name=x/></ifcXML>",
            "the file is not well-formed XML at line 2, column 1: position 13: attribute value must be enclosed in `\"` or `'`",
        ),
    ] {
        let error = read(text.as_bytes(), "model.ifcxml").unwrap_err();
        assert_eq!(error.reason, reason, "{text}");
        assert_eq!(error.to_string(), format!("model.ifcxml: {reason}"));
    }
}
