package fitting

import (
	"context"
	"sync"
)

// FitAll fits the models on both bases, first all to the average beat, then all to
// the whole span where it has eight usable beats or more. Errors are those of
// [FitBeat] and [FitSpan]; interrupted, it returns what there is.
func FitAll(ctx context.Context, models []Model, s Span, set Settings) ([]Result, error) {
	if err := s.check(); err != nil {
		return nil, err
	}
	set = set.WithDefaults()
	spans := s.beatsInRuns() >= fewBeats
	beat, span := make([]Result, len(models)), make([]Result, len(models))
	failed := make([]error, len(models))
	var workers sync.WaitGroup
	for i, m := range models {
		workers.Go(func() {
			f := newBeatFit(m, s.Beats)
			beat[i] = f.result()
			failed[i] = f.doubt(ctx, &beat[i], set)
			f.judge(&beat[i])
			if !spans {
				return
			}
			g := newSpanFit(f, s)
			span[i] = g.result()
			if err := g.doubt(ctx, &span[i], set); err != nil {
				failed[i] = err
			}
			g.judge(&span[i])
		})
	}
	workers.Wait()
	all := beat
	if spans {
		all = append(all, span...)
	}
	for _, err := range failed {
		if err != nil {
			return all, err
		}
	}
	return all, nil
}
