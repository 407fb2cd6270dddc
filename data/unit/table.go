package unit

// Pascals and their like in dyn/cm²: 1 Pa is 10 dyn/cm². The water column is
// the conventional one of 980.665 dyn/cm², the pound per square inch
// 68 947.57 dyn/cm², the torr 1 013 250/760 dyn/cm² (NIST SP 811, appendix B).
const (
	dynPerPa    = 10
	dynPerCmH2O = 980.665
	dynPerPsi   = 68947.57293168
	dynPerTorr  = 1013250. / 760
)

// units is every unit under its canonical spelling, see [canonical].
var units = func() map[string]Unit {
	t := map[string]Unit{}
	add := func(u Unit, spellings ...string) {
		for _, s := range spellings {
			t[s] = u
		}
	}
	for _, u := range pressures {
		add(calibrated(u.name, Pressure, u.factor), u.spellings...)
	}
	for _, v := range volumes {
		add(calibrated(v.name, Volume, v.factor), v.spellings...)
		for _, p := range periods {
			name := v.name + "/" + p.name
			for _, a := range v.spellings {
				for _, b := range p.spellings {
					add(calibrated(name, Flow, v.factor/p.factor), a+"/"+b)
				}
			}
		}
	}
	for _, l := range lengths {
		for _, b := range periods[0].spellings {
			add(calibrated(l.name+"/s", Velocity, l.factor), l.spellings[0]+"/"+b)
		}
	}
	for _, u := range others {
		add(u.unit, u.spellings...)
	}
	return t
}()

type row struct {
	name      string
	factor    float64 // to the internal unit; of a period, in s
	spellings []string
}

var pressures = []row{
	{"mmHg", 1, []string{"mmhg"}},
	{"Torr", dynPerTorr / DynPerMmHg, []string{"torr"}},
	{"kPa", 1000 * dynPerPa / DynPerMmHg, []string{"kpa"}},
	{"hPa", 100 * dynPerPa / DynPerMmHg, []string{"hpa"}},
	{"mbar", 100 * dynPerPa / DynPerMmHg, []string{"mbar"}},
	{"Pa", dynPerPa / DynPerMmHg, []string{"pa"}},
	{"cmH2O", dynPerCmH2O / DynPerMmHg, []string{"cmh2o"}},
	{"dyn/cm2", 1 / DynPerMmHg, []string{"dyn/cm2", "dyne/cm2", "dynes/cm2", "barye"}},
	{"psi", dynPerPsi / DynPerMmHg, []string{"psi"}},
}

var volumes = []row{
	{"mL", 1, []string{"ml", "cc", "cm3"}},
	{"L", 1000, []string{"l", "liter", "liters", "litre", "litres"}},
	{"uL", 1e-3, []string{"ul"}},
	{"m3", 1e6, []string{"m3"}},
}

var periods = []row{
	{"s", 1, []string{"s", "sec", "second"}},
	{"min", 60, []string{"min", "minute"}},
	{"h", 3600, []string{"h", "hour"}},
}

var lengths = []row{
	{"cm", 1, []string{"cm"}},
	{"m", 100, []string{"m"}},
	{"mm", 0.1, []string{"mm"}},
}

var others = []struct {
	unit      Unit
	spellings []string
}{
	{calibrated("L/min", Flow, 1000./60), []string{"lpm"}},
	{calibrated("1000/min", Speed, 1), []string{"1000/min", "krpm"}},
	{calibrated("rpm", Speed, 1e-3), []string{"rpm", "1/min", "r/min", "rev/min"}},
	{bare("V"), []string{"v", "volt", "volts"}},
	{bare("mV"), []string{"mv"}},
	{bare("uV"), []string{"uv"}},
	{bare("adu"), []string{"adu", "count", "counts"}},
	{bare("NU"), []string{"nu"}},
	{bare("a.u."), []string{"a.u.", "a.u", "au", "arb.u.", "arbitraryunits"}},
	{bare("bpm"), []string{"bpm", "beats/min"}},
	{bare("%"), []string{"%", "percent", "pct"}},
	{bare("°C"), []string{"°c", "degc"}},
	{Unit{"s", Time, 1, true}, []string{"s", "sec", "secs", "second", "seconds"}},
	{Unit{"ms", Time, 1. / 1e3, true}, []string{"ms", "msec", "millisecond", "milliseconds"}},
	{Unit{"us", Time, 1. / 1e6, true}, []string{"us", "usec", "microsecond", "microseconds"}},
	{Unit{"min", Time, 60, true}, []string{"min", "mins", "minute", "minutes"}},
	{Unit{"h", Time, 3600, true}, []string{"h", "hr", "hrs", "hour", "hours"}},
}

func calibrated(name string, q Quantity, factor float64) Unit {
	return Unit{Name: name, Quantity: q, Factor: factor, Calibrated: true}
}

// bare is a unit that by itself is none of a quantity's.
func bare(name string) Unit { return Unit{Name: name, Quantity: Other, Factor: 1} }
