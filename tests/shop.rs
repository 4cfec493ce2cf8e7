//! Exchange to steelwork. All models here are invented; expected values are own arithmetic on their numbers.

#[path = "shop/model.rs"]
mod model;

#[path = "shop/bolts.rs"]
mod bolts;
#[path = "shop/members.rs"]
mod members;
#[path = "shop/plates.rs"]
mod plates;
#[path = "shop/relations.rs"]
mod relations;
#[path = "shop/units.rs"]
mod units;
#[path = "shop/welds.rs"]
mod welds;
