//! Trays made for the purpose.
