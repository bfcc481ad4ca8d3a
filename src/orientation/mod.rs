//! Typed orientations: angles, axes, planes, lines and the tensor that sums them.
//!
//! Invariant: nothing in this folder knows a file, a map or a statistic. Angles cross the border in
//! degrees; the frame inside is right-handed east, north, up.

mod angle;
mod attitude;
mod axis;
mod exact_sum;
pub mod notation;
mod tensor;

pub use angle::{AngleError, Bearing, Dip, GridAzimuth, MagneticAzimuth, Rotation, TrueAzimuth, wrap_degrees};
pub use attitude::{Attitude, Line, Measured, Plane, Polarity};
pub use axis::{Axis, AxisError};
pub use exact_sum::ExactSum;
pub use tensor::{Eigen, OrientationTensor};
