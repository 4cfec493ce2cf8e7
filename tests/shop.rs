//! Exchange to steelwork. All models here are invented; expected values are own arithmetic on their numbers.

#[path = "shop/model.rs"]
mod model;

#[path = "shop/bolts.rs"]
mod bolts;
#[path = "shop/faces.rs"]
mod faces;
#[path = "shop/functions.rs"]
mod functions;
#[path = "shop/hostile.rs"]
mod hostile;
#[path = "shop/members.rs"]
mod members;
#[path = "shop/plates.rs"]
mod plates;
#[path = "shop/polyhedra.rs"]
mod polyhedra;
#[path = "shop/relations.rs"]
mod relations;
#[path = "shop/solids.rs"]
mod solids;
#[path = "shop/units.rs"]
mod units;
#[path = "shop/welds.rs"]
mod welds;
