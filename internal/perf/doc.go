// Package perf is the map of the flight-performance engine; it has no code of
// its own. Read the packages below in this order.
//
//	units       quantities and units; the only conversion factors; messages with numbers
//	input       each number a user gives, described once: name, unit, range; parse and check
//	formula     published relations, their sources, and the recorded working
//	numeric     roots, maxima, monotone tables, differential equations; no physics
//	atmos       the air at an altitude on a day; altitudes; TAS, EAS, CAS and Mach
//	polar       drag coefficient against lift coefficient
//	dragbuild   minimum drag from the parts: friction, form, interference
//	propeller   thrust and power coefficients; the loaded disc
//	powerplant  what turns stored energy into thrust; one kind a file
//	aircraft    an aircraft as entered (Spec) and as flown (Aircraft)
//	pointperf   one condition: climb, speeds, turn, glide, ceilings
//	runway      take-off and landing distances
//	envelope    sweeps over speed and altitude
//	mission     legs flown one after another; fuel, time, reserves
//	sheet       tables as spreadsheets write them, turned into rows of a table of the document
//	project     the whole document: mission, days, strips, requirements, variants
//	study       everything about one variant of a project, computed once
//
// Beside them stand packages that only tests import: reference (published
// values), formula/formulatest (the working shown is the working done),
// powerplant/powerplanttest (the contract of a powerplant).
//
// The engine is pure: it opens no file or connection, reads no clock and no
// environment, and gives the same bits for the same inputs on one platform.
// policy_test.go holds it to that, and to who imports whom.
//
// # Units
//
// Inside the engine every number is a float64 in SI: m, m/s, kg, N, W, J, Pa, K,
// s, rad; rotation in rev/s; fuel flow in kg/s; fuel per work in kg/J.
// Conversion happens where text is read and where results are written.
//
// # Symbols
//
//	V        true airspeed, the unmarked speed; EAS, CAS and Mach are marked
//	hp       pressure altitude, the unmarked altitude; density altitude is marked
//	p T rho  static pressure, temperature and density of the air
//	a mu     speed of sound, dynamic viscosity
//	sigma    density ratio to standard sea level; delta pressure, theta temperature ratio
//	q        dynamic pressure
//	S b A e  wing area, span, aspect ratio, span efficiency
//	m W n    mass, weight, load factor
//	CL CD K  lift coefficient, drag coefficient, lift-dependent drag factor
//	phi      ground-effect factor on lift-dependent drag; also power against sea-level power
//	T P      thrust, power (T is temperature where p stands beside it)
//	J CT CP  advance ratio V/(n D), thrust and power coefficients; n here in rev/s
//	eta      propeller efficiency T V/P
//	c        fuel per shaft work
//	Ps       specific excess power (T - D) V/W
//	gamma    flight path angle, also the ratio of specific heats of air, 1.4
//
// # Signs
//
// Thrust is positive forward, drag positive aft; a windmilling propeller has
// negative thrust. Climb, an upward path and an uphill strip are positive. A
// head wind is positive, a tail wind negative. Fuel flow and power drawn are
// positive and never negative. Humidity and settings run from 0 to 1. A
// deviation from the standard day is positive when hotter.
package perf
