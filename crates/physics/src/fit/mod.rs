//! Setbacks.
