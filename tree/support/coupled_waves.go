package support

import "afterbeat/data"

// Waves are the signals of a coupled state over one beat, from the onset of
// contraction, in even steps.
type Waves struct {
	Pressure    data.Period // Pao, mmHg
	RootFlow    data.Period // Qav + Qp, mL/s
	PumpFlow    data.Period // mL/s
	Ventricular data.Period // Plv, mmHg
	Volume      data.Period // of the ventricle, mL
}
