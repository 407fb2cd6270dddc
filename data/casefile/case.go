package casefile

// Case is a recording with the choices made about it. Strings, lists and tables
// that are empty and numbers that are nil were not chosen; numbers are finite.
//
// A field is a key of the file and a flag: key is its name in the file, value
// what stands for it in help texts, an amount takes numbers and text alike.
type Case struct {
	Recording string `key:"recording" value:"FILE" help:"the recording, relative to the case file"`
	Label     string `key:"label" value:"LABEL" help:"research label, such as pilot-07; never the name of a patient"`

	Time     string `key:"time" value:"NAME" help:"column of the time"`
	Pressure string `key:"pressure" value:"NAME" help:"column of the pressure"`
	Flow     string `key:"flow" value:"NAME" help:"column of the flow"`
	Velocity string `key:"velocity" value:"NAME" help:"column of the velocity"`

	Site   map[string]string  `key:"site" value:"NAME=SITE" help:"where on the body a column was measured"`
	Unit   map[string]string  `key:"unit" value:"NAME=UNIT" help:"unit of a column"`
	Scale  map[string]float64 `key:"scale" value:"NAME=FACTOR" help:"factor on a column"`
	Offset map[string]float64 `key:"offset" value:"NAME=VALUE" help:"added to a column after scaling, in its own unit"`
	// Calibrate holds what a cuff read: systolic/diastolic, or mean:M/D.
	Calibrate      map[string]string  `key:"calibrate" value:"NAME=SYS/DIA" help:"what a cuff read, mmHg, to calibrate a column of pressure by; or NAME=mean:MEAN/DIA"`
	SensorHeightCM map[string]float64 `key:"sensor_height_cm" value:"NAME=CM" help:"height of the sensor of a column of pressure above the heart"`
	VelocityRange  map[string]float64 `key:"velocity_range" value:"NAME=RANGE" help:"whole range of a Doppler scale, to unfold a velocity by, in the column's own unit"`
	Invert         []string           `key:"invert" value:"NAME" help:"change the sign of a column"`

	Rate    *float64 `key:"rate" value:"HZ" help:"sampling rate, where there is no time column"`
	From    *float64 `key:"from" value:"S" help:"begin of the span used, on the file's own clock"`
	To      *float64 `key:"to" value:"S" help:"end of the span used, on the file's own clock"`
	Exclude string   `key:"exclude" value:"FILE" help:"file of intervals to leave out, relative to the case file"`

	DiameterCM *float64 `key:"diameter_cm" value:"D" help:"inner diameter where the velocity was measured"`
	AngleDeg   *float64 `key:"angle_deg" value:"A" help:"Doppler angle that the velocity is not yet corrected for"`
	Profile    string   `key:"profile" value:"FACTOR" amount:"true" help:"mean velocity over measured velocity"`

	OutflowPressure *float64          `key:"outflow_pressure" value:"MMHG" help:"pressure that the outflow goes to"`
	Delay           string            `key:"delay" value:"auto|S" amount:"true" help:"delay of the pressure behind the flow, or auto to estimate it; positive where pressure is late"`
	CardiacOutput   *float64          `key:"cardiac_output" value:"L_PER_MIN" help:"cardiac output measured beside the recording"`
	OutputBy        string            `key:"output_by" value:"HOW" help:"fick, thermodilution, assumed-fick, outflow-doppler, contour or pump"`
	Cuff            string            `key:"cuff" value:"SYS/DIA[/MEAN]" help:"reading of a cuff beside the recording, mmHg"`
	Error           map[string]string `key:"error" value:"WHAT=HALFWIDTH[%]" amount:"true" help:"95 % half-width of a systematic error"`

	Drop []float64 `key:"drop" value:"S" help:"a time inside a beat to leave out, on the file's own clock"`
	Keep []float64 `key:"keep" value:"S" help:"a time inside a beat to use although a rule rejects it"`

	Beats      string    `key:"beats" value:"measured|support" help:"how beats are looked for: support for a pulse of a few mmHg"`
	OneBeat    bool      `key:"one_beat" help:"the recording is exactly one period"`
	Model      string    `key:"model" value:"NAME|all" help:"model to fit"`
	Basis      string    `key:"basis" value:"beat|span" help:"what the fit that goes downstream is fitted to, the average beat or the whole span"`
	Replicates *int      `key:"replicates" value:"N" help:"replicates of the uncertainty"`
	Seed       *int      `key:"seed" value:"N" help:"seed of the replicates"`
	Share      []float64 `key:"share" value:"0..1" help:"share of the flow that the pump takes"`

	EDVML *float64 `key:"edv_ml" value:"ML" help:"end-diastolic volume of the left ventricle"`
	EF    *float64 `key:"ef" value:"0..1" help:"ejection fraction of the left ventricle"`
	// Pump is a set of coefficients by its name, under "set", and what of it is
	// one's own.
	Pump           map[string]string `key:"pump" value:"NAME" plain:"set" entries:"set=text,name=text,a,b,c,Rc,Lc,lowest,highest,inlet=text" help:"set of pump coefficients; or a=, b=, c=, Rc=, Lc=, lowest=, highest= (speeds), name=, inlet=ventricle or atrium"`
	Ventricle      map[string]string `key:"ventricle" value:"WHAT=VALUE" entries:"activation=text,Emax,Emin,Tes,Tr,V0,Pfill,Rmv,Rav,Rar,filling_slope" help:"what is known of the ventricle: V0=, Pfill=, Rmv=, Rav=, Rar= (leak), filling_slope=; or Emax=, Emin=, Tes=, Tr= together"`
	Speed          []float64         `key:"speed" value:"N" help:"speed of the pump, 1000/min"`
	Quote          *float64          `key:"quote" value:"N" help:"the speed that the note quotes in short, 1000/min; else the middle one"`
	Match          string            `key:"match" value:"flow|pressure|none" help:"what is made equal to the native state: mean flow, by the filling pressure; mean pressure, by the resistance"`
	HoldResistance *float64          `key:"hold_resistance" value:"FACTOR" help:"resistance on support over the native one; then a matched pressure is met by the filling pressure"`
	Modulation     map[string]string `key:"modulation" value:"FILE" plain:"file" entries:"file=text,shape=text,low,high,rise_s,duty,phase,period_s,locked" help:"speed over one period: a file with time_s,speed_1000_per_min; or shape=sine or square, low=, high= (1000/min), rise_s=, duty=, phase=, locked= (beats; 0: free, of period_s=)"`

	HeightCM *float64 `key:"height_cm" value:"CM" help:"height of the patient"`
	WeightKG *float64 `key:"weight_kg" value:"KG" help:"weight of the patient"`
	Age      *float64 `key:"age" value:"YEARS" help:"age of the patient"`
	Sex      string   `key:"sex" value:"female|male" help:"sex of the patient"`
	PWV      *float64 `key:"pwv_m_s" value:"V" help:"measured carotid-femoral pulse-wave velocity, m/s"`
	// VesselCM are inner diameters measured of arteries, by the site that lies in
	// them.
	VesselCM  map[string]float64 `key:"vessel_cm" value:"SITE=CM" help:"measured inner diameter of the artery of a site: root, carotid, brachial, radial, femoral, renal"`
	Tree      string             `key:"tree" value:"TABLE.csv" help:"the patient's own table of arteries, relative to the case file"`
	BrainFlow *float64           `key:"brain_flow_ml_min" value:"ML_PER_MIN" help:"flow of the brain, in place of its share of the output"`
	HoldOut   string             `key:"hold_out" value:"NAME" help:"a distal pressure or velocity that the tree is tested by, not refined to"`

	Brief  bool   `key:"brief" help:"a note of what matters most: in short, the recording, what was given and assumed, the forecast, what is held, the warnings"`
	Remark string `key:"remark" value:"TEXT" help:"a remark at the end of the note"`

	lines map[string]int
}

// Line is the line of the case file that sets key, such as "rate" or, for an
// entry of a table, "site.abp"; 0 where none does, which [data.FileError] takes
// for the whole file.
func (c Case) Line(key string) int { return c.lines[key] }

// Errors are the names that the table of systematic errors knows.
func Errors() []string {
	return []string{
		"cardiac-output", "flow", "pressure-scale", "pressure-offset",
		"diameter", "angle", "delay", "outflow-pressure", "filling-slope", "cuff",
	}
}
