package network

import (
	"context"
	"testing"
)

// A run whose steps go across the jump of a heat capacity: the book must not close, and the named check must say so.
func TestJumpsNotSplit(t *testing.T) {
	for _, n := range odd {
		if n.name != "capacity with a jump" {
			continue
		}
		for _, split := range []bool{true, false} {
			r := newRunner(load(t, n.text), Options{Rel: 1e-5, Audit: true}, nil)
			if !split {
				r.jumpers = nil
			}
			b := r.run(context.Background(), Options{Audit: true}).Book
			for _, c := range b.Checks {
				if c.Name == "breaks" && c.Passed != split || !c.Passed && split {
					t.Errorf("split %t: check %q passed %t\n%s", split, c.Name, c.Passed, account(b))
				}
			}
			if b.Closed != split {
				t.Errorf("split %t: closed %t", split, b.Closed)
			}
		}
		return
	}
	t.Error("the network with a jump is gone")
}
