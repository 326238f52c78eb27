//! A painter that needs no graphics driver: the window's triangles, filled by the processor.
//!
//! [`canvas`] holds the pixels, [`triangle`] fills them, [`paint`] takes what egui wants painted,
//! and [`window`] opens a window on it where the system has no OpenGL. The same bytes come of the same input on
//! every machine, which is why pictures in tests are painted with it.

pub mod canvas;
pub mod paint;
pub mod texture;
pub mod triangle;
pub mod window;
