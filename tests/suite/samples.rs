//! Records with stereo groups: sets of possible samples.

mod known;
mod random;
mod statement;
