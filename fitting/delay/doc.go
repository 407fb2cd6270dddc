// Package delay estimates by how much a pressure was recorded later than the flow
// that belongs to it, jointly with a three-element load.
//
// For each delay d from -20 to 80 ms the pressure of the average beat is moved
// earlier by d (its trigonometric interpolation, P_k exp(i w_k d)), wk3 is fitted,
// and the sum of squares S(d) that is left is noted: the profile. The estimate is
// where it is lowest. With n = 2 H + 1 numbers that carry the fit, H the harmonics
// whose flow stands out of its scatter (package harmonic), and k = 4 unknowns (R,
// C, Zc, d), the 95 % interval is
//
//	S(d) <= S_min (1 + F/(n - k)),  F the 0.95 quantile of F(1, n - k)
//
// (profile likelihood of normal errors; what the model leaves counts as noise). The
// delay is not identified where the interval reaches an end of the range, or is
// wider than 40 ms, or Zc vanishes at the estimate: the profile is flat. An
// inertance in series acts as a negative delay does: the delay is never estimated
// together with the L of wk4s.
//
// Times are in s, positive where pressure is late.
package delay
