package network_test

import (
	"context"
	"math/rand/v2"
	"testing"

	"workheat/network"
)

// What ran on a model before leaves no trace in a run: the same at another tolerance, one that was interrupted after
// its first phase, its samples, and a description.
func TestSameBitsWhateverRanBefore(t *testing.T) {
	opt := network.Options{Rel: 1e-6, Audit: true}
	interrupted := 0
	for seed := range uint64(40) {
		maker := &maker{Rand: rand.New(rand.NewPCG(seed, 71)), heated: true}
		text := maker.netlist(2 + int(seed)%12)
		first := load(t, text, nil).Run(context.Background(), opt)
		m := load(t, text, nil)
		before := []struct {
			name string
			do   func()
		}{
			{"another tolerance", func() { m.Run(context.Background(), network.Options{Rel: 1e-3}) }},
			{"an interrupted run", func() {
				ctx, cancel := context.WithCancel(context.Background())
				defer cancel()
				if m.Run(ctx, network.Options{Rel: 1e-5, Progress: func(float64, string) { cancel() }}).Interrupted {
					interrupted++
				}
			}},
			{"samples of a run", func() { m.Run(context.Background(), network.Options{Rel: 1e-4}).Series(0.7) }},
			{"a description", func() { m.Describe() }},
		}
		for _, b := range before {
			b.do()
			sameBits(t, "after "+b.name, first, m.Run(context.Background(), opt))
		}
		if t.Failed() {
			t.Fatalf("seed %d:\n%s", seed, text)
		}
	}
	if interrupted < 20 {
		t.Errorf("only %d runs were interrupted", interrupted)
	}
}
