//! STEP physical files (ISO 10303-21): the same graph as from ifcXML, whatever the way of writing.

mod lexis;
mod problems;
mod versions;

use super::*;

/// A file of a schema around records; they start on line 2.
fn file_of(schema: &str, records: &str) -> String {
    format!(
        "ISO-10303-21;HEADER;FILE_DESCRIPTION((''),'2;1');FILE_NAME('','',(''),(''),'','','');\
         FILE_SCHEMA(('{schema}'));ENDSEC;DATA;\n{records}\nENDSEC;\nEND-ISO-10303-21;\n"
    )
}

/// Reads records of IFC4, whatever is wrong with them.
fn read_records(records: &str) -> Exchange {
    read(file_of("IFC4", records).as_bytes(), "t.ifc").unwrap()
}

/// Reads records of IFC4 in which nothing may be wrong.
fn read_clean_records(records: &str) -> Exchange {
    let exchange = read_records(records);
    assert_eq!(exchange.problems, [], "{records}");
    exchange
}

/// The rooted entities, each written out up to the next rooted ones, which are named by their GlobalId.
fn rooted(exchange: &Exchange) -> Vec<String> {
    fn value(v: View, exchange: &Exchange) -> String {
        match v {
            View::Entity(id) => {
                let to = exchange.entities.get(id);
                to.text("GlobalId").map_or_else(|| attributes(to, exchange), |guid| format!("-> {guid}"))
            }
            View::List(items) => items.iter().map(|i| value(i, exchange) + " ").collect(),
            View::Typed(name, inner) => format!("{name}:{}", value(inner.view(), exchange)),
            other => format!("{other:?}"),
        }
    }
    fn attributes(entity: Entity, exchange: &Exchange) -> String {
        let given = entity.values().filter(|(_, v)| !v.is_absent());
        let given: Vec<String> = given.map(|(name, v)| format!("{name}={}", value(v, exchange))).collect();
        format!("{}[{}]", entity.class(), given.join(", "))
    }
    let mut all: Vec<String> = exchange.entities.of_class("IfcRoot").map(|e| attributes(e, exchange)).collect();
    all.sort();
    all
}

#[test]
fn step_and_ifcxml_of_one_model_give_the_same_graph() {
    let step = read_clean_records(
        "#20=IFCRELDEFINESBYPROPERTIES('0000000000000000000003',$,$,$,(#10),#18);\n\
         #18=IFCPROPERTYSET('0000000000000000000004',$,'Bolts',$,(#16,#17));\n\
         #16=IFCPROPERTYSINGLEVALUE('class',$,IFCLABEL('8.8'),$);\n\
         #17=IFCPROPERTYSINGLEVALUE('count',$,IFCINTEGER(4),$);\n\
         #10=IFCPLATE('0000000000000000000001',$,'Pl''15',$,$,#11,#30,'7',.NOTDEFINED.);\n\
         #11=IFCLOCALPLACEMENT($,#12);\n\
         #12=IFCAXIS2PLACEMENT3D(#13,#14,$);\n\
         #13=IFCCARTESIANPOINT((1.,2.5E1,-3.));\n\
         #14=IFCDIRECTION((0.,0.,1.));\n\
         #30=IFCPRODUCTDEFINITIONSHAPE($,$,(#31));\n\
         #31=IFCSHAPEREPRESENTATION(#40,'Body','SweptSolid',(#32));\n\
         #32=IFCHALFSPACESOLID(#33,.F.);\n\
         #33=IFCPLANE(#12);\n\
         #40=IFCGEOMETRICREPRESENTATIONSUBCONTEXT('Body','Model',*,*,*,*,#41,$,.MODEL_VIEW.,$);\n\
         #41=IFCGEOMETRICREPRESENTATIONCONTEXT($,'Model',3,1.E-005,#12,$);\n\
         #50=IFCUNITASSIGNMENT((#51));\n\
         #51=IFCSIUNIT(*,.LENGTHUNIT.,.MILLI.,.METRE.);\n\
         #60=IFCPROJECT('0000000000000000000005',$,$,$,$,$,$,(#41),#50);",
    );
    let xml = read_clean(
        "<IfcProject GlobalId='0000000000000000000005'>\
           <RepresentationContexts><IfcGeometricRepresentationContext id='c' ContextType='Model'\
             CoordinateSpaceDimension='3' Precision='0.00001'><WorldCoordinateSystem><IfcAxis2Placement3D ref='a'/>\
             </WorldCoordinateSystem></IfcGeometricRepresentationContext></RepresentationContexts>\
           <UnitsInContext><Units><IfcSIUnit UnitType='lengthunit' Prefix='milli' Name='metre'/></Units></UnitsInContext>\
         </IfcProject>\
         <IfcPlate GlobalId='0000000000000000000001' Name='Pl&apos;15' Tag='7' PredefinedType='notdefined'>\
           <ObjectPlacement xsi:type='IfcLocalPlacement'><RelativePlacement><IfcAxis2Placement3D id='a'>\
             <Location Coordinates='1 25 -3'/><Axis DirectionRatios='0 0 1'/></IfcAxis2Placement3D></RelativePlacement>\
           </ObjectPlacement>\
           <Representation xsi:type='IfcProductDefinitionShape'><Representations>\
             <IfcShapeRepresentation RepresentationIdentifier='Body' RepresentationType='SweptSolid'>\
               <ContextOfItems xsi:type='IfcGeometricRepresentationSubContext' ContextIdentifier='Body'\
                 ContextType='Model' TargetView='model_view'><ParentContext ref='c'/></ContextOfItems>\
               <Items><IfcHalfSpaceSolid AgreementFlag='false'><BaseSurface xsi:type='IfcPlane'><Position ref='a'/>\
               </BaseSurface></IfcHalfSpaceSolid></Items></IfcShapeRepresentation></Representations></Representation>\
           <IsDefinedBy><IfcRelDefinesByProperties GlobalId='0000000000000000000003'><RelatingPropertyDefinition>\
             <IfcPropertySet GlobalId='0000000000000000000004' Name='Bolts'><HasProperties>\
               <IfcPropertySingleValue Name='class'><NominalValue><IfcLabel-wrapper>8.8</IfcLabel-wrapper></NominalValue></IfcPropertySingleValue>\
               <IfcPropertySingleValue Name='count'><NominalValue><IfcInteger-wrapper>4</IfcInteger-wrapper></NominalValue></IfcPropertySingleValue>\
             </HasProperties></IfcPropertySet></RelatingPropertyDefinition></IfcRelDefinesByProperties></IsDefinedBy>\
         </IfcPlate>",
    );
    assert_eq!(rooted(&step), rooted(&xml));
    assert_eq!(rooted(&step).len(), 4);
    assert_eq!(step.form, "IFC4 STEP");
}
