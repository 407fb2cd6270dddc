// Package unit knows the quantities of a recording and the units they come in:
// it parses a unit from a column header, converts a value to the internal unit
// where a file is read, and back where a number is printed.
//
// The internal unit of a quantity is mmHg for pressure, mL/s for flow, cm/s for
// velocity, mL for volume, 1000/min for speed (of a pump's rotor), mV for ecg.
// 1 mmHg is 1333.22387415 dyn/cm² (the conventional millimetre of mercury,
// ISO 80000-4).
package unit
