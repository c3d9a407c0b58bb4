//! What is known of the mount's errors: prior, readings, fit, prediction.
