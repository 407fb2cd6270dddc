package data

// Code names a kind of warning; [WarningCodes] says what each means.
type Code string

// Warning is doubt that travels with a result until a screen or a note shows
// it. Every warning says what would cure it.
type Warning struct {
	Code    Code
	Channel Text   // the channel it speaks of; empty where it is none in particular
	Text    string // what is the matter, with the number that shows it
	Cure    string // what to do about it
}

// The codes of warnings.
const (
	CodeMissing       Code = "missing-samples"
	CodeHole          Code = "hole"
	CodeRepeatedTimes Code = "repeated-times"
	CodeUnevenClock   Code = "uneven-clock"
	CodeNoUnit        Code = "no-unit"
	CodeUncalibrated  Code = "uncalibrated"
	CodeUnlikely      Code = "unlikely-value"
	CodeGuessedRole   Code = "guessed-role"
	CodeStandIn       Code = "stand-in-pressure"
	CodeRegional      Code = "regional"
	CodeSiteUnknown   Code = "site-unknown"
	CodePerArea       Code = "per-unit-area"
	CodeProfile       Code = "profile-assumed"
	CodeSteepAngle    Code = "steep-angle"
	CodeManyRejected  Code = "many-rejected"
	CodeIrregular     Code = "irregular-rhythm"
	CodeFewBeats      Code = "few-beats"
	CodeFaintPulse    Code = "faint-pulse"
	CodeOpenBeat      Code = "beat-not-closed"
	CodeDelay         Code = "delay-unknown"
	CodeOutflow       Code = "outflow-pressure-assumed"
	CodeNotIdentified Code = "not-identified"
	CodeMisfit        Code = "misfit"
	CodeNotConverged  Code = "not-converged"
	CodeBalance       Code = "balance"
	CodeNegativeFlow  Code = "reversed-flow"
	CodeDisagree      Code = "estimators-disagree"
	CodeNotArterial   Code = "not-arterial"
	CodeNoFlow        Code = "no-flow"
	CodeNoSupport     Code = "no-comparison"
	CodeGivenRate     Code = "given-rate"
	CodeNotSettled    Code = "not-settled"
	CodeBackFlow      Code = "back-flow"
	CodeLittleFlow    Code = "little-pump-flow"
	CodeSuction       Code = "suction"
	CodeValveShut     Code = "valve-shut"
	CodePublished     Code = "outside-published"
	CodeNativeMiss    Code = "native-state-missed"
	CodeFewDraws      Code = "few-draws"
	CodeBeyondPump    Code = "beyond-pump"
	CodeHeld          Code = "held-samples"
	CodeQuantised     Code = "quantised"
	CodeFlat          Code = "flat-line"
	CodeRecalibrated  Code = "cuff-recalibration"
	CodeClipped       Code = "clipped"
	CodeSpikes        Code = "spikes"
	CodeDrift         Code = "drift"
	CodeHum           Code = "hum"
	CodeNotMatched    Code = "not-matched"
	CodeCuff          Code = "cuff-calibrated"
	CodeLine          Code = "pressure-line"
	CodeFiltered      Code = "filtered-flow"
	CodeAliased       Code = "aliased-velocity"
	CodeWallFilter    Code = "wall-filter"
	CodeSlowWander    Code = "slow-wander"
	CodeTreeStretched Code = "tree-stretched"
	CodeNoTree        Code = "no-tree"
)

// WarningCode is a row of the table that `afterbeat help warnings` prints.
type WarningCode struct {
	Code    Code
	Meaning string
}

// WarningCodes is the table of all codes, in the order of the work.
func WarningCodes() []WarningCode {
	return []WarningCode{
		{CodeMissing, "samples of a channel have no value"},
		{CodeHole, "the clock jumps over a stretch of time"},
		{CodeRepeatedTimes, "rows carry the same time as the row before"},
		{CodeUnevenClock, "steps of the clock differ; values were resampled to an even one"},
		{CodeGivenRate, "a given rate rules over times in the file that say another"},
		{CodeNoUnit, "the header names no unit that fits the quantity"},
		{CodeUncalibrated, "the channel is in a unit that is none of its quantity, such as volts"},
		{CodeUnlikely, "values lie outside what the quantity has in people"},
		{CodeHeld, "values are repeated; the true rate of the channel is lower than the file's"},
		{CodeQuantised, "values come in steps that are coarse beside the pulse"},
		{CodeFlat, "the trace does not move for seconds"},
		{CodeRecalibrated, "a finger cuff calibrates itself and measures no pressure meanwhile"},
		{CodeClipped, "the trace reaches the end of its scale"},
		{CodeSpikes, "single samples stand far out of their neighbours"},
		{CodeDrift, "the level of the trace rises or falls all through the recording"},
		{CodeHum, "the mains is in the trace"},
		{CodeAliased, "a Doppler scale has folded the velocity; it was unfolded"},
		{CodeWallFilter, "low velocities are cut off by a wall filter: indices are bounds"},
		{CodeFiltered, "the flow was low-pass filtered more than the pressure"},
		{CodeLine, "the natural frequency and damping of the pressure line, from a fast flush; or that they are unknown"},
		{CodeCuff, "a pressure was calibrated by a cuff, whose error every interval carries"},
		{CodeGuessedRole, "a channel was chosen from its name"},
		{CodeStandIn, "pressure of a limb, or of an unnamed artery, stands in for the root's"},
		{CodeRegional, "the fit is the load of one vascular bed, not of the body"},
		{CodeSiteUnknown, "where a channel was measured is not known"},
		{CodePerArea, "velocity without a diameter: the fit is per unit area"},
		{CodeProfile, "the ratio of mean to measured velocity is an assumption"},
		{CodeSteepAngle, "the Doppler angle is above 60 degrees"},
		{CodeManyRejected, "a large part of the beats was not used"},
		{CodeIrregular, "the intervals between beats vary"},
		{CodeFewBeats, "few beats carry the average and its intervals"},
		{CodeFaintPulse, "the pulse is small beside the noise"},
		{CodeOpenBeat, "the average beat does not end where it began"},
		{CodeDelay, "the delay between pressure and flow was not measured"},
		{CodeOutflow, "the outflow pressure is an assumption"},
		{CodeNotIdentified, "the data do not determine a parameter"},
		{CodeMisfit, "the model leaves a residual that is large beside the pulse"},
		{CodeNotConverged, "the search for the best fit gave up"},
		{CodeBalance, "the balance of power does not close"},
		{CodeNegativeFlow, "mean flow is not positive; the channel may be inverted"},
		{CodeDisagree, "two ways to the same parameter give values far apart"},
		{CodeNotArterial, "the pressure chosen is, by its name, none of a systemic artery"},
		{CodeNoFlow, "no flow was recorded: a fit is not possible"},
		{CodeNoSupport, "native and supported state could not be compared"},
		{CodeNotSettled, "no periodic state of ventricle, pump and load was found"},
		{CodeBackFlow, "blood flows back through the pump within the beat"},
		{CodeLittleFlow, "pump flow falls under 0.5 L/min within the beat"},
		{CodeSuction, "the pump empties the ventricle to near its unstressed volume"},
		{CodeValveShut, "the aortic valve does not open at any time of the beat"},
		{CodePublished, "a number of the forecast lies outside the range that is published of patients"},
		{CodeNativeMiss, "the native state of the model differs from what was measured"},
		{CodeFewDraws, "few of the drawn ventricles meet the native state, so that intervals are unsure"},
		{CodeTreeStretched, "the tree had to be changed far from its table to meet what was measured"},
		{CodeNoTree, "no tree of arteries could be made"},
		{CodeBeyondPump, "a speed lies outside the range in which the pump's coefficients make sense"},
		{CodeNotMatched, "the mean flow or pressure that was to be matched cannot be met at a speed"},
		{CodeSlowWander, "the residual wanders too slowly for the length of the recording: the interval of R is too narrow"},
	}
}
