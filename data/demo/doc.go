// Package demo holds the demo case: a recording of an invented adult with a
// failing, dilated heart before support, and the choices made about it.
//
// No patient stands behind it. The generator, cmd/demodata, writes a pulse of
// flow for every beat and drives a load of known parameters with it, a
// three-element windkessel (Westerhof 1969),
//
//	C dPd/dt = Q - Pd/R,   P = Pv + Pd + Zc Q
//
// solved in closed form over the whole record, so that beats are no more
// periodic than a patient's. Then it spoils both traces the way recordings are
// spoilt: breathing, noise that is partly correlated, a premature beat with the
// pause after it, pressure that arrives late, and rounding. [Truth] has the
// parameters, for the tests that compare them with what a fit finds.
//
// The velocity is that of the outflow tract with a blunt profile and no angle,
// v = Q/(pi d^2/4).
//
// `go generate ./data/demo` writes the files anew.
package demo
