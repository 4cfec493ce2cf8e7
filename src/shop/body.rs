//! Bodies of parts: the solids of their representations, mapped any number of times.

use std::rc::Rc;

use glam::{DAffine3, DVec3};

use super::reading::Reading;
use super::solid::{Cut, Solid};
use crate::exchange::Entity;

/// Boolean results nest; a beam in the wild was cut 21 times.
const DEPTH: usize = 128;
/// Mapped items and unions nest.
const NESTED: usize = 16;
/// A body of more items than this is no fastener group but a mistake (or an attack: maps can multiply).
const ITEMS: usize = 10_000;

/// What of an exchange is a body, besides mapped items and boolean results.
const SOLIDS: [&str; 5] = [
    "IfcSolidModel",
    "IfcTessellatedItem",
    "IfcFaceBasedSurfaceModel",
    "IfcShellBasedSurfaceModel",
    "IfcCsgPrimitive3D",
];

impl<'a> Reading<'a> {
    /// The solids of a part's body in the world; an error where there is none at all.
    pub fn body(&self, product: Entity<'a>) -> Result<Vec<Solid>, String> {
        let world = self.placement_of(product)?;
        let shape = product.entity("Representation");
        let representations = || shape.into_iter().flat_map(|shape| self.each(shape, "Representations"));
        let body = |r: &Entity<'_>| {
            r.text("RepresentationIdentifier").is_some_and(|identifier| identifier.eq_ignore_ascii_case("Body"))
        };
        let mut bodies = representations().filter(body).filter(|r| self.each(*r, "Items").next().is_some());
        let own = bodies.next();
        if bodies.next().is_some() {
            self.problem(product, "It has several bodies; only the first is looked at.");
        }
        let (mut solids, mut budget) = (Vec::new(), ITEMS);
        let mut take = |item| self.solids(item, world, 0, &mut budget, &mut solids);
        match own {
            Some(body) => self.each(body, "Items").for_each(&mut take),
            None => {
                let solid = |item: &Entity<'_>| {
                    item.is_a("IfcMappedItem")
                        || item.is_a("IfcBooleanResult")
                        || SOLIDS.iter().any(|class| item.is_a(class))
                };
                representations().flat_map(|r| self.each(r, "Items")).filter(solid).for_each(&mut take);
            }
        }
        if solids.is_empty() { Err("it has no body".into()) } else { Ok(solids) }
    }

    /// End points of its Axis representation in the world, if it is a polyline.
    pub fn axis_line(&self, product: Entity<'a>) -> Option<Vec<DVec3>> {
        let line = self
            .each(product.entity("Representation")?, "Representations")
            .filter(|r| r.text("RepresentationIdentifier").is_some_and(|i| i.eq_ignore_ascii_case("Axis")))
            .flat_map(|r| self.each(r, "Items"))
            .find(|item| item.is_a("IfcPolyline"))?;
        let world = self.placement_of(product).ok()?;
        let ends = [self.each(line, "Points").next()?, self.each(line, "Points").last()?];
        ends.into_iter().map(|p| Some(world.transform_point3(self.point(Some(p)).ok()?))).collect()
    }

    fn solids(&self, item: Entity<'a>, map: DAffine3, depth: usize, budget: &mut usize, into: &mut Vec<Solid>) {
        if *budget == 0 {
            return;
        }
        *budget -= 1;
        if *budget == 0 || !self.spend(1) {
            into.push(Err(format!("its body has more than {ITEMS} items, or the exchange more than can be read")));
            *budget = 0;
        } else if depth > NESTED {
            into.push(Err(format!("its body is of mapped items nested deeper than {NESTED} levels")));
        } else if item.is_a("IfcMappedItem") {
            match self.mapping(item) {
                Ok((inner, items)) => {
                    for item in items {
                        self.solids(item, map * inner, depth + 1, budget, into);
                    }
                }
                Err(reason) => into.push(Err(reason)),
            }
        } else {
            let straight = self.straight();
            // A plain sweep of one part's own is nobody else's.
            if depth == 0 && item.is_a("IfcSweptAreaSolid") && !self.solids_of.borrow().contains_key(&item.id) {
                let solids = self.compose(item, 0);
                if solids.len() >= *budget || !self.spend(solids.len()) {
                    *budget = 0;
                    return into.push(Err(format!("its body has more than {ITEMS} solids")));
                }
                *budget -= solids.len();
                return into.extend(solids.into_iter().map(|solid| solid?.moved(map, straight)));
            }
            let solids = self.own_solids(item);
            if solids.len() >= *budget || !self.spend(solids.len()) {
                *budget = 0;
                return into.push(Err(format!("its body has more than {ITEMS} solids")));
            }
            *budget -= solids.len();
            into.extend(solids.iter().map(|solid| solid.as_ref().map_err(Clone::clone)?.clone().moved(map, straight)));
        }
    }

    /// The sine of the angle within which two directions are one.
    pub fn straight(&self) -> f64 {
        self.rulebook.tolerances.angle.to_radians().sin()
    }

    /// The map of a mapped item and the items it maps. The mapping origin is applied first, then the target, as
    /// exports are written; for the usual origin without offset every reading of the standard agrees.
    fn mapping(&self, item: Entity<'a>) -> Result<(DAffine3, Vec<Entity<'a>>), String> {
        let source = item.entity("MappingSource").ok_or("its body has a mapped item without a source")?;
        let origin = source.entity("MappingOrigin").map_or(Ok(DAffine3::IDENTITY), |o| self.axes(o))?;
        let target = item.entity("MappingTarget").map_or(Ok(DAffine3::IDENTITY), |t| self.operator(t))?;
        let items = source.entity("MappedRepresentation").map(|r| r.entities("Items")).unwrap_or_default();
        Ok((target * origin, items))
    }

    /// The solids of an item in its own coordinates, kept: many may share it.
    fn own_solids(&self, item: Entity<'a>) -> Rc<Vec<Solid>> {
        if let Some(known) = self.solids_of.borrow().get(&item.id) {
            return known.clone();
        }
        let solids = Rc::new(self.compose(item, 0));
        self.solids_of.borrow_mut().insert(item.id, solids.clone());
        solids
    }

    /// The solids of an item: the first operands of boolean results with what they cut, both of unions.
    fn compose(&self, item: Entity<'a>, depth: usize) -> Vec<Solid> {
        if depth > NESTED {
            return vec![Err(format!("its body is of unions nested deeper than {NESTED} levels"))];
        }
        if !item.is_a("IfcCsgSolid") && !item.is_a("IfcBooleanResult") {
            return match self.spend(1) {
                true => self.single(item),
                false => vec![Err("the exchange has more cut bodies than can be read".into())],
            };
        }
        let (mut cutters, mut joined) = (Vec::new(), Vec::new());
        let mut item = item;
        let mut links = 0;
        loop {
            if links > DEPTH {
                return vec![Err(format!("its body is cut more than {DEPTH} times"))];
            }
            links += 1;
            if item.is_a("IfcCsgSolid") {
                let Some(root) = item.entity("TreeRootExpression") else {
                    return vec![Err("its body is an IfcCsgSolid without a root".into())];
                };
                item = root;
            } else if item.is_a("IfcBooleanResult") {
                match item.token("Operator") {
                    Some("DIFFERENCE") => cutters.push(item.entity("SecondOperand")),
                    // What is cut off afterwards is told of both; before, of the first only.
                    Some("UNION") => joined.extend(item.entity("SecondOperand").map(|other| (other, cutters.len()))),
                    operator => {
                        let operator = operator.unwrap_or("none").to_lowercase();
                        return vec![Err(format!(
                            "its body is made by the boolean operator {operator}; only difference and union are read"
                        ))];
                    }
                }
                let Some(first) = item.entity("FirstOperand") else {
                    return vec![Err("its body has a boolean result without a first operand".into())];
                };
                item = first;
            } else {
                break;
            }
        }
        if !self.spend(links) {
            return vec![Err("the exchange has more cut bodies than can be read".into())];
        }
        let cuts: Vec<Vec<Cut>> = cutters.iter().map(|cutter| self.cut(*cutter, depth)).collect();
        let with = |solid: Solid, outer: usize| {
            solid.map(|mut prism| {
                prism.cuts.extend(cuts.iter().take(outer).rev().flatten().cloned());
                prism
            })
        };
        let mut solids: Vec<Solid> = self.single(item).into_iter().map(|solid| with(solid, cuts.len())).collect();
        for (other, outer) in joined {
            if solids.len() > ITEMS {
                return vec![Err(format!("its body is a union of more than {ITEMS} solids"))];
            }
            solids.extend(self.compose(other, depth + 1).into_iter().map(|solid| with(solid, outer)));
        }
        solids
    }

    /// One item that is no boolean result.
    fn single(&self, item: Entity<'a>) -> Vec<Solid> {
        self.faces(item).or_else(|| self.turned_body(item)).unwrap_or_else(|| vec![self.sweep(item)])
    }

    fn cut(&self, cutter: Option<Entity<'a>>, depth: usize) -> Vec<Cut> {
        let Some(cutter) = cutter else { return vec![Cut::Other("nothing".into())] };
        let other = || vec![Cut::Other(cutter.class().to_owned())];
        if cutter.is_a("IfcHalfSpaceSolid") {
            return self.half_space(cutter).map_or_else(other, |cut| vec![cut]);
        }
        let solids = if depth < NESTED { self.compose(cutter, depth + 1) } else { Vec::new() };
        let plain = |solid: Solid| {
            solid.ok().filter(|prism| prism.beyond.is_none() && prism.cuts.is_empty()).map(|p| Cut::Prism(Box::new(p)))
        };
        let cuts: Option<Vec<Cut>> = solids.into_iter().map(plain).collect();
        cuts.filter(|cuts| !cuts.is_empty()).unwrap_or_else(other)
    }

    fn half_space(&self, cutter: Entity<'a>) -> Option<Cut> {
        let surface = cutter.entity("BaseSurface").filter(|s| s.is_a("IfcPlane"))?;
        let plane = self.axes(surface.entity("Position")?).ok()?;
        let normal = plane.matrix3.z_axis;
        // AgreementFlag true: the half-space that is taken off lies on the side away from the normal.
        let keep = if cutter.truth("AgreementFlag")? { normal } else { -normal };
        let bounds = if cutter.is_a("IfcPolygonalBoundedHalfSpace") {
            let position = self.axes(cutter.entity("Position")?).ok()?;
            Some((position, self.closed_curve(cutter.entity("PolygonalBoundary")).ok()?))
        } else {
            None
        };
        Some(Cut::Plane { at: plane.translation, keep, bounds })
    }
}
