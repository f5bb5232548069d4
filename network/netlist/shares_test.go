package netlist_test

import (
	"fmt"
	"math/rand/v2"
	"strings"
	"testing"

	"workheat/library"
	"workheat/network/diag"
	"workheat/network/netlist"
)

// Shares that add to one but for the digits they were written with add to one exactly when they were read,
// in the order in which they are kept, and none moves by more than the check allows.
func TestSharesAddToOne(t *testing.T) {
	random := rand.New(rand.NewPCG(3, 4))
	for round := range 3000 {
		n := 2 + random.IntN(8)
		var nodes, shares strings.Builder
		written := make([]float64, n)
		left := 1.0
		for i := range n {
			x := left
			if i < n-1 {
				x = left * random.Float64()
			}
			left -= x
			fmt.Fprintf(&shares, `,"n%d":%.11f`, i, x)
			fmt.Fprintf(&nodes, `,"n%d":{"heat capacity":"1 J/K"}`, i)
			written[i] = x
		}
		text := fmt.Sprintf(`{"workheat":1,"nodes":{%s},"sources":{"s":{"kind":"given heat","into":{%s},"power":"1 W"}},"duty":[{"rest":{"for":"1 s"}}]}`,
			nodes.String()[1:], shares.String()[1:])
		net, problems := netlist.Read(&diag.Source{Name: "shares", Text: []byte(text)}, library.Catalogue(), nil)
		if len(problems) > 0 {
			t.Fatalf("round %d: %v\n%s", round, problems, text)
		}
		sum := 0.0
		for i, x := range elementNamed(t, net, "s").Values["into"].Shares {
			sum += x
			if d := x - written[i]; d > 1e-9 || d < -1e-9 {
				t.Errorf("round %d: share %d is %.17g, written %.17g", round, i, x, written[i])
			}
		}
		if sum != 1 {
			t.Errorf("round %d: the shares add to %.17g", round, sum)
		}
	}
}
