//! The other way to the settled drag: one sparse LU of K - v C a speed. A cross-check of the recurrence, in tests.
#![cfg(test)]
