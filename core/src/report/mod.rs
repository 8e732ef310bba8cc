//! Documents for people and for other programs.
