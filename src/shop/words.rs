//! Words by which parts are called; whole words only, in the languages that shop models come in (from memory).

/// What a part may be called.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(super) enum Word {
    Bolt,
    Nut,
    Washer,
    Anchor,
    Stud,
    Screw,
    Countersunk,
    Weld,
    Butt,
    Fillet,
    NoSteel,
}

const fn spellings(word: Word) -> &'static [&'static str] {
    match word {
        Word::Bolt => &[
            "bolt",
            "bolts",
            "schraube",
            "schrauben",
            "boulon",
            "boulons",
            "bullone",
            "bulloni",
            "tornillo",
            "bout",
            "bult",
            "pultti",
        ],
        Word::Nut => {
            &["nut", "nuts", "mutter", "muttern", "écrou", "écrous", "ecrou", "dado", "tuerca", "moer", "mutteri"]
        }
        Word::Washer => &[
            "washer",
            "washers",
            "scheibe",
            "unterlegscheibe",
            "rondelle",
            "rondella",
            "arandela",
            "sluitring",
            "aluslevy",
        ],
        Word::Anchor => &[
            "anchor",
            "anchors",
            "anchorbolt",
            "anchorrod",
            "anker",
            "ankerschraube",
            "ancrage",
            "ancoraggio",
            "anclaje",
        ],
        Word::Stud => &["stud", "studs", "shearstud", "kopfbolzen", "goujon", "goujons"],
        Word::Screw => &["screw", "screws", "nail", "rivet", "dowel", "staple"],
        Word::Countersunk => &[
            "countersunk",
            "csk",
            "senkkopf",
            "senkschraube",
            "senkschrauben",
            "fraisée",
            "fraisee",
            "svasata",
            "avellanado",
        ],
        Word::Weld => &[
            "weld",
            "welds",
            "weldseam",
            "schweißnaht",
            "schweissnaht",
            "naht",
            "kehlnaht",
            "stumpfnaht",
            "soudure",
            "saldatura",
            "soldadura",
            "svets",
            "hitsi",
        ],
        Word::Butt => &["butt", "groove", "stumpfnaht", "cjp", "pjp"],
        Word::Fillet => &["fillet", "kehlnaht"],
        Word::NoSteel => &[
            "concrete",
            "beton",
            "béton",
            "timber",
            "wood",
            "holz",
            "bois",
            "glulam",
            "glass",
            "glas",
            "masonry",
            "brick",
            "grout",
            "mortar",
            "gypsum",
            "insulation",
            "elastomer",
            "neoprene",
            "rubber",
        ],
    }
}

/// Whether a text consists of nothing but words for a weld and numbers: "Fillet weld 12".
pub(super) fn only_weld(text: &str) -> bool {
    let lower = text.to_lowercase();
    let mut words = lower.split(|c: char| !c.is_alphabetic()).filter(|word| !word.is_empty());
    says(text, Word::Weld)
        && words.all(|word| {
            [Word::Weld, Word::Fillet, Word::Butt].into_iter().any(|known| spellings(known).contains(&word))
        })
}

/// Whether a text says the word.
pub(super) fn says(text: &str, word: Word) -> bool {
    let lower = text.to_lowercase();
    lower.split(|c: char| !c.is_alphabetic()).any(|token| spellings(word).contains(&token))
}
