//! (front page to come)
