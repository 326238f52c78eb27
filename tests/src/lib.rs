//! Tests of the whole program against sources outside it.
