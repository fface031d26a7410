//! Reports of invented assessments: their shape, their page, their pictures.

mod fixture;
