//! Formulas of EN 1993-1-8:2005: numbers with units in, numbers with units and their working out.
