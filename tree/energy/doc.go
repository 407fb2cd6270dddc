// Package energy computes what a pulse carries: the energy-equivalent pressure,
// the power that a pair of pressure P(t) and flow Q(t) delivers, and the ledger
// that sets power in against power lost and passed on. It knows signals, terms
// and balance; who computes a load, a tree or a ventricle fills the ledger.
//
// # Energy-equivalent pressure
//
//	EEP = int P Q dt / int Q dt                      mmHg
//	SHE = 1333.22387415 (EEP - mean P)               erg/cm³
//	percent pulsatility = 100 (EEP/mean P - 1)       %
//
// (Shepard, Simpson, Sharp 1966, Arch Surg 93:730; surplus haemodynamic energy:
// Undar et al. 2005, ASAIO J, with the exact 1333.22387415 dyn/cm² per mmHg in
// place of its rounded constant; percent pulsatility: Bartoli et al. 2010,
// ASAIO J 56(5). Formulas of the first two from memory.) EEP is the mean of
// pressure weighted by flow. It lies below the mean of pressure where flow is
// high while pressure is low, and is never clamped. Steady pressure or steady
// flow gives EEP = mean P.
//
// # Power
//
//	mean PQ = mean P mean Q + sum_k 1/2 Re(P_k Q_k*)
//	input   = steady        + pulsatile
//
// with P_k, Q_k the complex amplitudes of harmonic k >= 1 (Milnor 1989; from
// memory). Powers are means over the period in mmHg mL/s; printed, they are
// converted by [unit.MilliwattPerMmHgMLPerS]. What is called power here is that
// of the arterial side: a pump or a ventricle spends more than it delivers.
//
// # Ledger
//
//	balance = (input - sum of terms)/input
//
// closes to [Tolerance] or the result carries a warning.
//
// Pressure and flow of one period have the same samples and the same rate;
// anything else is a mistake of the caller, and panics.
package energy
