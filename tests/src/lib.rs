//! Shared means of the tests.
