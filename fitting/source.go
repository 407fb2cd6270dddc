package fitting

// source is what replicates are drawn from: the spectra of the single beats and
// of every run of block successive beats, so that a draw costs a few additions
// and no transform.
type source struct {
	*pool
	plan     *transform
	flow     []complex128 // spectrum of the average beat
	pressure []complex128
	flows    [][]complex128 // of the single beats
	presses  [][]complex128
	runFlow  [][]complex128 // sum over beats i .. i+block-1, counted round the end
	runPress [][]complex128
	storage  *storage // nil: draws are not repaired
}

// pool is the part of a source that its replicates keep.
type pool struct {
	beats   Beats
	mean    []float64   // the average flow beat
	block   int         // beats
	inflate float64     // factor on the distance of a draw from the average
	runs    [][]float64 // flow over time, summed over beats i .. i+block-1, counted round the end
}

func newSource(b Beats) *source {
	n, bins := b.Samples(), b.Samples()/2+1
	s := &source{pool: &pool{beats: b, mean: meanOf(b.Flow), inflate: 1}, plan: newTransform(n)}
	s.flow, s.pressure = make([]complex128, bins), make([]complex128, bins)
	s.flows, s.presses = spectra(b.Count(), bins), spectra(b.Count(), bins)
	for i := range b.Count() {
		s.plan.pair(s.flows[i], s.presses[i], b.Flow[i], b.Pressure[i])
		add(s.flow, s.flows[i])
		add(s.pressure, s.presses[i])
	}
	scale(s.flow, 1/float64(b.Count()))
	scale(s.pressure, 1/float64(b.Count()))
	return s
}

func spectra(beats, bins int) [][]complex128 {
	all := make([]complex128, beats*bins)
	list := make([][]complex128, beats)
	for i := range list {
		list[i] = all[i*bins : (i+1)*bins : (i+1)*bins]
	}
	return list
}

func add(to, x []complex128) {
	for k, v := range x {
		to[k] += v
	}
}

func scale(x []complex128, by float64) {
	for k, v := range x {
		x[k] = complex(by*real(v), by*imag(v))
	}
}

// useBlocks sums the runs of block beats.
func (s *source) useBlocks(block int, inflate float64) {
	n, bins := len(s.flows), len(s.flow)
	s.block, s.inflate = block, inflate
	s.runFlow, s.runPress = spectra(n, bins), spectra(n, bins)
	for i := range n {
		for j := range block {
			add(s.runFlow[i], s.flows[(i+j)%n])
			add(s.runPress[i], s.presses[(i+j)%n])
		}
	}
	s.runs = runSums(s.beats.Flow, block)
}

// runSums adds up every run of block successive beats, counted round the end.
func runSums(beats [][]float64, block int) [][]float64 {
	n := len(beats)
	store := make([]float64, n*len(beats[0]))
	runs := make([][]float64, n)
	for i := range runs {
		runs[i] = store[i*len(beats[0]) : (i+1)*len(beats[0])]
		for j := range block {
			addTo(runs[i], beats[(i+j)%n])
		}
	}
	return runs
}

func addTo(to, x []float64) {
	for i, v := range x {
		to[i] += v
	}
}

// blocks is the number of runs in a draw, the last of them cut short where the
// beats do not divide.
func (s *source) blocks() int { return (len(s.flows) + s.block - 1) / s.block }

// draw writes the spectra of the average over the runs that begin at starts,
// moved away from the average beat by the factor inflate.
func (s *source) draw(starts []int32, flow, pressure []complex128) {
	clear(flow)
	clear(pressure)
	n, left, rise := len(s.flows), len(s.flows), 0.0
	for _, from := range starts {
		rise += s.storage.rise(int(from), min(left, s.block))
		if left >= s.block {
			add(flow, s.runFlow[from])
			add(pressure, s.runPress[from])
			left -= s.block
			continue
		}
		for j := range left {
			add(flow, s.flows[(int(from)+j)%n])
			add(pressure, s.presses[(int(from)+j)%n])
		}
		left = 0
	}
	s.storage.repair(pressure, rise)
	s.spread(flow, s.flow)
	s.spread(pressure, s.pressure)
}

// spread turns a sum over all beats into the average, moved away from mean.
func (s *source) spread(sum, mean []complex128) {
	f := s.inflate / float64(len(s.flows))
	for k, v := range mean {
		sum[k] = complex(f*real(sum[k])+(1-s.inflate)*real(v), f*imag(sum[k])+(1-s.inflate)*imag(v))
	}
}
