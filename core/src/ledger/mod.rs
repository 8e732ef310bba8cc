//! Places, postings, the bench and the closing of the book.
