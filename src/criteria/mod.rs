//! Published criteria, one formula a file, each with its range and source.

mod absolute_stability;
mod critical_deflection;
mod end_constant;
mod transverse_rate;

pub use absolute_stability::stable_below;
pub use critical_deflection::{critical_share, second_share};
pub use end_constant::{EndConstant, HandbookEnd, end_constants};
pub use transverse_rate::transverse_rate_ratio;
