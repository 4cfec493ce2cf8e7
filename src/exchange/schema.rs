//! The schema's entities, supertypes and attributes: data, so that every exchange form is read by one table.

use std::sync::LazyLock;

use hashbrown::HashTable;

/// An entity of the schema, by its index in the table.
pub(super) type ClassId = u16;
/// A defined type of the schema, by its index in the table.
pub(super) type TypeId = u16;

/// What an attribute holds at the innermost level of its lists.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Base {
    Text,
    Real,
    Integer,
    Boolean,
    Logical,
    Token,
    Binary,
    Select,
    Entity(ClassId),
    /// The schema does not say: kept as it is written.
    Any,
}

/// The kind of an attribute or defined type.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Kind {
    pub base: Base,
    /// 0 a single value, 1 a list, 2 a list of lists.
    pub depth: u8,
    /// Length of the rows of a list of lists; 0 where the schema leaves it open.
    pub row: u8,
}

impl Kind {
    pub const ANY: Self = Self::one(Base::Any);

    pub const fn one(base: Base) -> Self {
        Self { base, depth: 0, row: 0 }
    }
}

/// An explicit attribute.
#[derive(Clone, Copy, Debug)]
pub(super) struct Attribute {
    pub name: &'static str,
    pub kind: Kind,
    /// Derived in this entity: keeps its position in STEP, never has a value.
    pub derived: bool,
}

/// An inverse attribute: entities of `class` point here by their `attribute`.
#[derive(Clone, Copy, Debug)]
pub(super) struct Inverse {
    pub name: &'static str,
    pub class: ClassId,
    pub attribute: &'static str,
}

/// An entity of the schema, with what it inherits.
#[derive(Debug)]
pub(super) struct Class {
    pub name: &'static str,
    /// Its supertypes from the outermost one on, and itself.
    pub line: Vec<ClassId>,
    pub is_abstract: bool,
    /// Explicit attributes, inherited ones first: the positions of STEP.
    pub attributes: Vec<Attribute>,
    pub inverses: Vec<Inverse>,
    /// The attributes' positions and one more, each at the first free place from its name's hash on; the length is a
    /// power of two above that of `attributes`.
    places: Box<[u8]>,
}

impl Class {
    /// The position of the attribute of that name.
    #[inline]
    pub fn position(&self, name: &str) -> Option<usize> {
        let mask = self.places.len().checked_sub(1)?;
        let mut at = exact_hash(name) as usize & mask;
        loop {
            let position = usize::from(*self.places.get(at)?).checked_sub(1)?; // a free place ends the search
            if self.attributes.get(position)?.name == name {
                return Some(position);
            }
            at = (at + 1) & mask;
        }
    }

    /// Fills the places.
    fn index(mut self) -> Self {
        self.places = vec![0; (2 * self.attributes.len() + 1).next_power_of_two()].into();
        let mask = self.places.len() - 1;
        for (position, attribute) in self.attributes.iter().enumerate() {
            let mut at = exact_hash(attribute.name) as usize & mask;
            while self.places[at] != 0 {
                at = (at + 1) & mask;
            }
            self.places[at] = u8::try_from(position + 1).expect("fewer than 255 attributes");
        }
        self
    }
}

/// What a name stands for in the schema.
#[derive(Clone, Copy)]
pub(super) enum Named {
    Class(ClassId),
    Type(TypeId, Kind),
    Neither,
}

/// One version of the schema.
#[derive(Debug)]
pub(super) struct Schema {
    /// Its name for people.
    pub name: &'static str,
    classes: Vec<Class>,
    by_name: HashTable<(&'static str, ClassId)>,
    by_exact_name: HashTable<(&'static str, ClassId)>,
    /// As STEP spells them.
    by_upper_name: HashTable<(Box<str>, ClassId)>,
    types: Vec<(&'static str, Kind)>,
    types_by_name: HashTable<(&'static str, TypeId)>,
}

impl Schema {
    /// IFC4 ADD2 TC1.
    pub fn ifc4() -> &'static Self {
        static IFC4: LazyLock<Schema> = LazyLock::new(|| Schema::parse("IFC4", include_str!("schema/ifc4.txt")));
        &IFC4
    }

    /// IFC2X3 TC1.
    pub fn ifc2x3() -> &'static Self {
        static IFC2X3: LazyLock<Schema> = LazyLock::new(|| Schema::parse("IFC2X3", include_str!("schema/ifc2x3.txt")));
        &IFC2X3
    }

    /// IFC4X3.
    pub fn ifc4x3() -> &'static Self {
        static IFC4X3: LazyLock<Schema> = LazyLock::new(|| Schema::parse("IFC4X3", include_str!("schema/ifc4x3.txt")));
        &IFC4X3
    }

    /// The entity of that name, in whatever case.
    pub fn find(&self, name: &str) -> Option<ClassId> {
        // the two usual spellings first, because they are found sooner
        let upper = || self.by_upper_name.find(exact_hash(name), |(known, _)| **known == *name);
        if let Some(class) = self.find_exact(name).or_else(|| upper().map(|(_, class)| *class)) {
            return Some(class);
        }
        self.by_name.find(hash(name), |(known, _)| known.eq_ignore_ascii_case(name)).map(|(_, class)| *class)
    }

    /// The entity of exactly that name.
    #[inline]
    pub fn find_exact(&self, name: &str) -> Option<ClassId> {
        self.by_exact_name.find(exact_hash(name), |(known, _)| *known == name).map(|(_, class)| *class)
    }

    /// The entity or the defined type of that name, in whatever case.
    pub fn named(&self, name: &str) -> Named {
        if let Some(class) = self.find(name) {
            return Named::Class(class);
        }
        let known = self.types_by_name.find(hash(name), |(known, _)| known.eq_ignore_ascii_case(name));
        known.and_then(|(_, id)| Some(Named::Type(*id, self.types.get(usize::from(*id))?.1))).unwrap_or(Named::Neither)
    }

    /// The defined type of that name, in whatever case, and its kind.
    pub fn find_type(&self, name: &str) -> Option<(TypeId, Kind)> {
        let (_, id) = self.types_by_name.find(hash(name), |(known, _)| known.eq_ignore_ascii_case(name))?;
        Some((*id, self.types.get(usize::from(*id))?.1))
    }

    /// The name of a defined type as the schema spells it.
    pub fn type_name(&self, id: TypeId) -> Option<&'static str> {
        self.types.get(usize::from(id)).map(|(name, _)| *name)
    }

    /// How many defined types the schema has; numbers from here on are free for unknown ones.
    pub fn types(&self) -> usize {
        self.types.len()
    }

    /// The entity; `None` for the number of an entity that the schema does not know.
    pub fn class(&self, class: ClassId) -> Option<&Class> {
        self.classes.get(usize::from(class))
    }

    /// The inverse of that name. An entity that the schema does not know is asked for an element's and a spatial
    /// element's, so that what a later version of the schema adds keeps its relations.
    pub fn inverse(&self, class: ClassId, name: &str) -> Option<&Inverse> {
        let known = self.class(class);
        let stand_ins = ["IfcElement", "IfcSpatialElement"].iter().filter_map(|name| self.class(self.find(name)?));
        match known {
            Some(known) => known.inverses.iter().find(|inverse| inverse.name == name),
            None => stand_ins.flat_map(|class| &class.inverses).find(|inverse| inverse.name == name),
        }
    }

    /// How many entities the schema has; numbers from here on are free for unknown ones.
    pub fn len(&self) -> usize {
        self.classes.len()
    }

    /// Whether `class` is `ancestor` or a subtype of it.
    pub fn is_subtype(&self, class: ClassId, ancestor: ClassId) -> bool {
        let line = |class| self.class(class).map(|c| &c.line);
        class == ancestor
            || line(ancestor).is_some_and(|of| line(class).and_then(|line| line.get(of.len() - 1)) == Some(&ancestor))
    }

    /// Reads the table; its own head says how it is written. The table is part of the program, so a line that
    /// breaks the format is an error of the program and panics.
    fn parse(name: &'static str, text: &'static str) -> Self {
        let mut schema = Self {
            name,
            classes: Vec::new(),
            by_name: HashTable::new(),
            by_exact_name: HashTable::new(),
            by_upper_name: HashTable::new(),
            types: Vec::new(),
            types_by_name: HashTable::new(),
        };
        let lines = || text.lines().filter(|line| !line.starts_with('#') && !line.is_empty());
        let entities = || lines().filter(|line| !line.starts_with('='));
        for (number, line) in entities().enumerate() {
            let name = line.trim_start_matches('*').split([' ', '<']).next().unwrap_or_default();
            let entry = (name, number as ClassId);
            schema.by_name.insert_unique(hash(name), entry, |(name, _)| hash(name));
            schema.by_exact_name.insert_unique(exact_hash(name), entry, |(name, _)| exact_hash(name));
            let (upper, hash) =
                (Box::<str>::from(name.to_ascii_uppercase()), |(name, _): &(Box<str>, _)| exact_hash(name));
            schema.by_upper_name.insert_unique(exact_hash(&upper), (upper, number as ClassId), hash);
        }
        for line in lines().filter_map(|line| line.strip_prefix('=')) {
            let (name, kind) = line.split_once(':').expect("a defined type and its kind");
            let id = schema.types.len() as TypeId;
            schema.types_by_name.insert_unique(hash(name), (name, id), |(name, _)| hash(name));
            schema.types.push((name, schema.kind(kind)));
        }
        for line in entities() {
            let class = schema.entity(line);
            schema.classes.push(class);
        }
        schema
    }

    fn entity(&self, line: &'static str) -> Class {
        let (head, items) = line.split_once(' ').unwrap_or((line, ""));
        let (name, parent) = head.split_once('<').map_or((head, None), |(name, parent)| (name, Some(parent)));
        let parent = parent.map(|parent| self.find(parent).expect("a supertype that the table has"));
        let (mut attributes, mut inverses, mut line) = match parent.and_then(|id| self.class(id)) {
            Some(parent) => (parent.attributes.clone(), parent.inverses.clone(), parent.line.clone()),
            None => Default::default(),
        };
        line.push(self.classes.len() as ClassId);
        for item in items.split_ascii_whitespace() {
            if let Some(name) = item.strip_prefix('-') {
                attributes.iter_mut().filter(|a| a.name == name).for_each(|a| a.derived = true);
            } else if let Some(inverse) = item.strip_prefix('^') {
                let (name, by) = inverse.split_once('=').expect("an inverse and who points");
                let (class, attribute) = by.split_once('.').expect("who points and by which attribute");
                let class = self.find(class).expect("an entity that the table has");
                inverses.push(Inverse { name, class, attribute });
            } else {
                let (name, kind) = item.split_once(':').expect("an attribute and its kind");
                attributes.push(Attribute { name, kind: self.kind(kind), derived: false });
            }
        }
        let (name, is_abstract) = (name.trim_start_matches('*'), name.starts_with('*'));
        Class { name, line, is_abstract, attributes, inverses, places: [].into() }.index()
    }

    fn kind(&self, code: &str) -> Kind {
        let inner = code.trim_start_matches('[');
        let depth = (code.len() - inner.len()) as u8;
        let letters = inner.trim_start_matches(|c: char| c.is_ascii_digit());
        let row = inner[..inner.len() - letters.len()].parse().unwrap_or(0);
        let base = match letters {
            "s" => Base::Text,
            "r" => Base::Real,
            "i" => Base::Integer,
            "b" => Base::Boolean,
            "l" => Base::Logical,
            "t" => Base::Token,
            "x" => Base::Binary,
            "c" => Base::Select,
            entity => Base::Entity(self.find(entity).expect("an entity that the table has")),
        };
        Kind { base, depth, row }
    }
}

/// A quick hash of a name in whatever case; the names that are looked for are few and not the file's.
fn hash(name: &str) -> u64 {
    let mixed = name.bytes().fold(name.len() as u64, |hash, byte| {
        (hash.rotate_left(5) ^ u64::from(byte | 0x20)).wrapping_mul(0x9E37_79B9_7F4A_7C15) // 2^64 / golden ratio
    });
    mixed ^ mixed >> 32
}

/// A quicker hash of a name as it is spelt. The program's own names are constants where it is called, and so is their
/// hash once it is inlined there.
#[inline(always)]
fn exact_hash(name: &str) -> u64 {
    let bytes = name.as_bytes();
    let (first, last) = match (bytes.first_chunk::<8>(), bytes.last_chunk::<8>()) {
        (Some(first), Some(last)) => (u64::from_le_bytes(*first), u64::from_le_bytes(*last)),
        _ => (bytes.iter().fold(0, |all, byte| all << 8 | u64::from(*byte)), 0),
    };
    let mixed = (first.rotate_left(23) ^ last ^ bytes.len() as u64).wrapping_mul(0x9E37_79B9_7F4A_7C15); // as above
    mixed ^ mixed >> 32
}
