//! Reports of invented assessments: their shape, their page, their pictures.

mod data;
mod fixture;
mod page;
mod picture;
