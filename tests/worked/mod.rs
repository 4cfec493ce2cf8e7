//! Published worked examples, one file a publication.

mod p398;
