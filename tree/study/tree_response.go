package study

import (
	"context"
	"math"

	"afterbeat/tree"
)

// Response is how fast the beds follow a step at the root of the refined tree,
// from rest: a property of the tree alone, the same natively and on support.
type Response struct {
	Flow, Pressure []BedResponse // of a step of flow, of pressure; in the order of Tree.Beds
}

// BedResponse is that of one bed: the times at which the outflow of its terminals
// passes 50 and 90 % of its change, averaged by what the outflow comes to.
type BedResponse struct {
	Bed      string
	T50, T90 float64 // s; NaN where nothing flows out
}

// WithResponse is the tree with the response of its beds.
func (t Tree) WithResponse(ctx context.Context) (Tree, error) {
	if t.Reason != "" || t.Response != nil {
		return t, nil
	}
	r, err := respond(ctx, t)
	switch {
	case err == nil:
		t.Response = &r
	case ctx.Err() != nil:
		return t, err
	}
	return t, nil
}

// respond computes the response of every terminal, and of the beds from it.
func respond(ctx context.Context, t Tree) (Response, error) {
	if err := ctx.Err(); err != nil {
		return Response{}, err
	}
	r, err := tree.Respond(t.Network)
	if err != nil {
		return Response{}, err
	}
	return Response{Flow: byBed(t, r.FlowStep), Pressure: byBed(t, r.PressureStep)}, nil
}

func byBed(t Tree, terminals []tree.BedResponse) []BedResponse {
	of := map[int]tree.Course{}
	for _, x := range terminals {
		of[x.Segment] = x.Outflow
	}
	var out []BedResponse
	for _, b := range t.Beds {
		one, sum := BedResponse{Bed: b.Name}, 0.0
		for _, k := range b.Terminals {
			c := of[t.Segments[k].Index]
			if !(c.Final > 0) || math.IsNaN(c.T50+c.T90) {
				continue
			}
			sum += c.Final
			one.T50 += c.Final * c.T50
			one.T90 += c.Final * c.T90
		}
		one.T50, one.T90 = one.T50/sum, one.T90/sum
		out = append(out, one)
	}
	return out
}
