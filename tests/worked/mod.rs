//! Published worked examples, one file a publication.

pub mod p398;
