// Package numeric owns every loop of the engine that converges: bracketed
// roots, maxima, monotone tables and ordinary differential equations with
// events. It contains no physics and knows no units: x, f and t carry
// whatever unit the caller gives them, and tolerances on x are relative.
//
// Nothing here clamps, guesses or extrapolates in silence. A solver either
// returns its answer with the work that it took, or an error that says what
// had no solution and where it looked. Conditions that depend on data (no sign
// change, a value that is not finite, a table out of order) are errors; a
// mistake in the calling code (a negative tolerance, a tolerance vector of the
// wrong length) panics with the prefix "numeric: ".
//
// All functions are deterministic, and safe for concurrent use as far as the
// functions handed to them are.
package numeric
