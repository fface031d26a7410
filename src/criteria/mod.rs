//! Published criteria, one formula a file, each with its range and source.

mod absolute_stability;
mod critical_deflection;
mod end_constant;
mod transverse_rate;

pub use absolute_stability::stable_below;
pub use critical_deflection::{
    critical_share, effective_end_constant, is_beyond_peak, never_critical_below, second_share,
};
pub use end_constant::{
    EndConstant, HandbookCase, HandbookEnd, end_constants, handbook_case, handbook_cases,
    nearest_case,
};
pub use transverse_rate::transverse_rate_ratio;
