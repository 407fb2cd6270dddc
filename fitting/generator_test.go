package fitting

import (
	"math"
	"math/rand/v2"

	"afterbeat/data"
)

// generate makes a recording of the worked example's wk3 and cuts it into beats
// of n samples: the stroke volume varies by 4 % (sd) independently from beat to
// beat, and pressure carries white noise of sd white and an AR(1) noise of sd
// 0.8 white with a time constant of 0.3 s, mmHg. The pressure is the response to
// the whole recording, so beats are not periodic.
func generate(beats, n int, white float64, rng *rand.Rand) Beats {
	m, _ := ByName("wk3")
	return generateFrom(Lumped{m, example}, beats, n, white, rng)
}

// generateFrom does that for any load.
func generateFrom(l Load, beats, n int, white float64, rng *rand.Rand) Beats {
	whole := data.Period{Rate: float64(n) / exampleT}
	const lead = 10 // beats thrown away, so that the recording does not close on itself
	one := sample(exampleFlow, n, 0.5)
	for range lead + beats {
		amplitude := 1 + 0.04*rng.NormFloat64()
		for _, q := range one.Samples {
			whole.Samples = append(whole.Samples, amplitude*q)
		}
	}
	p := Respond(l, whole, 0)
	phi := math.Exp(-1 / (0.3 * whole.Rate))
	red := 0.8 * white * rng.NormFloat64()
	b := Beats{Rate: whole.Rate, Site: data.SiteRoot}
	for i := range beats {
		for j := range n {
			red = phi*red + 0.8*white*math.Sqrt(1-phi*phi)*rng.NormFloat64()
			p.Samples[(lead+i)*n+j] += red + white*rng.NormFloat64()
		}
		b.Flow = append(b.Flow, whole.Samples[(lead+i)*n:(lead+i+1)*n])
		b.Pressure = append(b.Pressure, p.Samples[(lead+i)*n:(lead+i+1)*n])
	}
	return b
}

func newSeeded(seed uint64) *rand.Rand { return rand.New(rand.NewPCG(seed, 0)) }

// noisy are beats of the generator with its usual noise of 1 mmHg.
func noisy(n, beats int, seed uint64) Beats {
	return generate(beats, n, 1, rand.New(rand.NewPCG(seed, 0)))
}
