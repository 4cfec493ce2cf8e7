//! The trip of the data, from bytes to [`Review`].

use miette::Diagnostic;

use crate::compose::{self, Sources};
use crate::review::Review;
use crate::rulebook::Rulebook;
use crate::{exchange, intent, joints, shop};

/// Everything that a review is made from: names as the caller gave them, and what they hold.
#[derive(Clone, Debug)]
pub struct Inputs<'a> {
    /// The shop model.
    pub model: (&'a str, &'a [u8]),
    /// The schedules, in the order in which they are read.
    pub schedules: Vec<(&'a str, &'a [u8])>,
    /// Rule files that stand in for the built-in ones, named by their path inside the rule folder.
    pub rules: Vec<(&'a str, &'a str)>,
}

/// Why there is no review at all.
#[derive(Debug, thiserror::Error, Diagnostic)]
pub enum Failed {
    /// The model is no exchange.
    #[error(transparent)]
    Exchange(#[from] exchange::Unreadable),
    /// A schedule can't be read.
    #[error("{0}")]
    #[diagnostic(transparent)]
    Schedule(Box<dyn Diagnostic + Send + Sync>),
    /// A rule file can't be read.
    #[error("{0}")]
    #[diagnostic(transparent)]
    Rules(Box<dyn Diagnostic + Send + Sync>),
    /// No such annex.
    #[error("{0}")]
    Annex(String),
}

/// Reviews a model.
///
/// # Errors
/// [`Failed`] where an input can't be read at all; whatever else is odd is a problem in the review.
pub fn run(inputs: &Inputs<'_>) -> Result<Review, Failed> {
    run_by(inputs, None)
}

/// The same by an annex of the rules; `None` for the one that the rules choose.
///
/// # Errors
/// As [`run`].
pub fn run_by(inputs: &Inputs<'_>, annex: Option<&str>) -> Result<Review, Failed> {
    run_with(inputs, inputs.model.1, annex)
}

/// As [`run_by`], but with the model's `bytes` given away instead of those in the inputs: they are let go once the
/// model is read, because their memory is better used for what follows.
///
/// # Errors
/// As [`run`].
pub fn run_letting_go(inputs: &Inputs<'_>, bytes: Vec<u8>, annex: Option<&str>) -> Result<Review, Failed> {
    run_with(inputs, bytes, annex)
}

fn run_with(inputs: &Inputs<'_>, bytes: impl AsRef<[u8]> + Send, annex: Option<&str>) -> Result<Review, Failed> {
    let mut rulebook = Rulebook::with_overrides(&inputs.rules).map_err(|e| Failed::Rules(Box::new(e)))?;
    if let Some(annex) = annex {
        rulebook.use_annex(annex).map_err(Failed::Annex)?;
    }
    let intent = intent::read_all(&inputs.schedules).map_err(|e| Failed::Schedule(Box::new(e)))?;
    let file = inputs.model.0;
    let mut exchange = exchange::read(bytes.as_ref(), file)?;
    let last_use = move || compose::sha256(bytes.as_ref());
    let (steelwork, sha256) = rayon::join(|| shop::take_up(&exchange, &rulebook), last_use);
    // Nobody asks the graph any more: its memory is better used for what follows.
    exchange.entities = exchange::Entities::default();
    let joints = joints::recognise(&steelwork, &rulebook);
    let pairing = intent::pair(&intent, &joints, &steelwork);
    let sources = Sources {
        rulebook: &rulebook,
        exchange: &exchange,
        steelwork: &steelwork,
        joints: &joints,
        intent: &intent,
        pairing: &pairing,
        schedules: inputs.schedules.iter().map(|(file, _)| *file).collect(),
    };
    let review = compose::review_of(&sources, file, sha256);
    // What nobody asks any more is let go while the report is drawn.
    rayon::spawn(move || drop((steelwork, joints)));
    Ok(review)
}
