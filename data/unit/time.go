package unit

// Time is the quantity of a time column; no channel has it.
const Time Quantity = "time"

// PerSecond is how many of the unit of time u are one second; 0 if u is no
// unit of time. Below one second it is a whole number, so that a stamp in it
// becomes the nearest number of seconds by one division.
func (u Unit) PerSecond() float64 {
	if u.Quantity != Time {
		return 0
	}
	return perSecond[u.Name]
}

var perSecond = map[string]float64{"s": 1, "ms": 1e3, "us": 1e6, "min": 1. / 60, "h": 1. / 3600}
