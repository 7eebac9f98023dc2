//! Under construction in this commit series.
