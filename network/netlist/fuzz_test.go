package netlist_test

import (
	"bytes"
	"errors"
	"math"
	"os"
	"path/filepath"
	"runtime"
	"slices"
	"testing"
	"time"

	"workheat/library"
	"workheat/network/diag"
	"workheat/network/duty"
	"workheat/network/netlist"
)

// Whatever the text, reading ends soon, does not panic, keeps its memory in hand, and either reports or
// returns a netlist of finite values that refers only to what is there. The second text serves as every
// file that the netlist names.
func FuzzRead(f *testing.F) {
	trace := []byte("time [s],speed [km/h]\n0,36\n5,0\n")
	for _, folder := range []string{"testdata/bad", "testdata/good"} {
		for _, name := range names(f, folder) {
			text, err := os.ReadFile(filepath.Join(folder, name))
			if err != nil {
				f.Fatal(err)
			}
			f.Add(text, trace)
		}
	}
	follow := []byte(`{"workheat":1,"nodes":{"a":{"heat capacity":{"file":"f"}}},"duty":[{"follow":{"file":"g"}}]}`)
	for _, table := range []string{"", "\xef\xbb\xbfa [s],\"b\n[m/s]\"\n1,2\n", "a,b\n\"", "t [degC];x [J/K]\n1;2", "t [degC],x [J/K]\n1,2\n1,3\n1,4", "\x00"} {
		f.Add(follow, []byte(table))
	}
	catalogue := library.Catalogue()
	f.Fuzz(func(t *testing.T, text, table []byte) {
		if len(text) > 1<<16 || len(table) > 1<<16 {
			return
		}
		open := func(name string) ([]byte, error) {
			if name == "none" {
				return nil, errors.New("there is no such file")
			}
			return table, nil
		}
		var before, after runtime.MemStats
		runtime.ReadMemStats(&before)
		begun := time.Now()
		net, problems := netlist.Read(&diag.Source{Name: "net", Text: text}, catalogue, open)
		took := time.Since(begun)
		runtime.ReadMemStats(&after)
		if size := after.TotalAlloc - before.TotalAlloc; size > 64<<20+2000*uint64(len(text)+len(table)) {
			t.Errorf("%d bytes were allocated for %d", size, len(text)+len(table))
		}
		if took > 5*time.Second {
			t.Errorf("reading took %v", took)
		}
		if len(problems) > 101 {
			t.Errorf("%d problems", len(problems))
		}
		var out bytes.Buffer
		if err := diag.Render(&out, problems, false); err != nil || bytes.ContainsRune(out.Bytes(), 0x1b) {
			t.Errorf("rendering: %v, %q", err, out.Bytes())
		}
		wellPlaced(t, problems)
		if usable(problems) {
			sound(t, net)
		}
	})
}

func usable(problems []diag.Problem) bool {
	for _, p := range problems {
		if !p.Warning {
			return false
		}
	}
	return true
}

// wellPlaced checks that every problem points into a text.
func wellPlaced(t *testing.T, problems []diag.Problem) {
	for _, p := range problems {
		if p.At.Source == nil || p.At.Start < 0 || p.At.Start > p.At.End || p.At.End > len(p.At.Source.Text) || p.Text == "" {
			t.Errorf("%q stands at %d to %d", p.Text, p.At.Start, p.At.End)
		}
	}
}

// sound checks what every netlist without problems must keep.
func sound(t *testing.T, n *netlist.Netlist) {
	finite := func(what string, x float64) {
		if math.IsNaN(x) || math.IsInf(x, 0) {
			t.Errorf("%s is %g", what, x)
		}
	}
	if len(n.Nodes) == 0 || len(n.Order) != len(n.Nodes) || len(n.Duty.Phases) == 0 {
		t.Errorf("%d nodes, %d in order, %d phases", len(n.Nodes), len(n.Order), len(n.Duty.Phases))
	}
	for _, node := range n.Nodes {
		finite("start of "+node.Name, node.Start)
		if node.Capacity != nil && !(slices.Min(node.Capacity.Y) > 0) {
			t.Errorf("the capacity of %q", node.Name)
		}
	}
	for _, g := range n.Groups {
		for _, d := range g.Elements {
			for key, v := range d.Values {
				finite(d.Name+", "+key, v.Number)
				sum := 0.0
				for i, node := range v.Nodes {
					if node < 0 || node >= len(n.Nodes) {
						t.Errorf("%s, %s: node %d", d.Name, key, node)
					}
					if v.Shares != nil {
						sum += v.Shares[i]
					}
				}
				if v.Shares != nil && sum != 1 {
					t.Errorf("%s: the shares add to %.17g", d.Name, sum)
				}
				if v.Signal >= duty.FirstTable+len(n.Tables) {
					t.Errorf("%s, %s: signal %d", d.Name, key, v.Signal)
				}
			}
		}
	}
	walk(t, n)
}

// walk goes through the duty, each phase to its end, as a run would.
func walk(t *testing.T, n *netlist.Netlist) {
	c := duty.NewCursor(&n.Duty)
	for range 1000 {
		leg, ok := c.Next()
		if !ok {
			return
		}
		if math.IsNaN(leg.End) || math.IsInf(leg.End, 0) || leg.End < leg.Start {
			t.Errorf("%s goes from %g to %g", leg.Label, leg.Start, leg.End)
			return
		}
		if v := leg.Speed(leg.End); math.IsNaN(v) || v < -1e-6 {
			t.Errorf("%s ends at %g m/s", leg.Label, v)
			return
		}
		c.Done(leg.End)
	}
}
