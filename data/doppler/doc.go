// Package doppler turns a measured blood velocity into flow.
//
// With the diameter d of the vessel in cm, the velocity v in cm/s, the factor k
// and the angle theta left between the beam and the flow,
//
//	Q = k v (pi d^2/4) / cos(theta)          mL/s
//
// so that one number, the [Conversion.Gain] k (pi d^2/4)/cos(theta) in cm²,
// carries everything: flow is the gain times the velocity, and the stroke
// volume the gain times the velocity-time integral. Forward velocity is
// positive, and so is forward flow.
//
// # The factor
//
// k is the mean velocity over the cross-section divided by the velocity that
// was measured. It is 1 where v is the spatial mean already. Where v is the
// envelope (the largest velocity of the section, which is what a spectral
// Doppler trace outlines), k depends on the profile:
//
//   - root, outflow tract, graft: 1. The profile is blunt there, since it needs
//     0.06 Re d, more than a metre, to develop; a parabola's 1/2 would halve
//     the output.
//   - elsewhere: not known from the site alone; between 1/2 (steady parabola)
//     and 1 (blunt). The package takes 1 and says so in a warning.
//
// A device that corrects for its beam angle delivers v along the vessel; theta
// is only what is left to correct, 0 unless given.
//
// # Errors
//
// As 95 % half-widths relative to Q, to first order and in quadrature,
//
//	(dQ/Q)^2 = (2 dd/d)^2 + (dv/v)^2 + (tan(theta) dtheta)^2      dtheta in radians
//
// The first order understates an angle's error: an angle 5 degrees too large
// raises Q by 10.0 % at 45 degrees and 18.3 % at 60, where tan(theta) dtheta
// is 8.7 % and 15.1 %. Who needs it exact draws diameters and angles and takes
// the gain of each. These errors shift every sample of a recording together:
// averaging beats does not lessen them.
//
// Sources: Evans and McDicken, Doppler Ultrasound, 2000 (conversion, profile;
// from memory); entrance length 0.06 Re d: common practice.
package doppler
