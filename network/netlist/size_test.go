package netlist_test

import (
	"bytes"
	"fmt"
	"math/rand/v2"
	"os"
	"runtime"
	"strings"
	"testing"
	"time"

	"workheat/library"
	"workheat/network/diag"
	"workheat/network/netlist"
)

// timed reads a text and reports how long it took and the memory it took in all.
func timed(t *testing.T, name string, text []byte) (*netlist.Netlist, []diag.Problem, time.Duration) {
	t.Helper()
	var before, after runtime.MemStats
	runtime.ReadMemStats(&before)
	begun := time.Now()
	net, problems := netlist.Read(&diag.Source{Name: name, Text: text}, library.Catalogue(), nil)
	took := time.Since(begun)
	runtime.ReadMemStats(&after)
	t.Logf("%s: %.1f MB in %v, %.1f MB/s, %d MB allocated, %d problems", name, float64(len(text))/1e6, took.Round(time.Millisecond),
		float64(len(text))/1e6/took.Seconds(), (after.TotalAlloc-before.TotalAlloc)>>20, len(problems))
	return net, problems, took
}

// slow is what no file of the sizes below may take; the times measured are some hundredths of it.
const slow = 30 * time.Second

// Garbage of 20 MB is reported in short, and soon.
func TestGarbage(t *testing.T) {
	const size = 20 << 20
	fill := func(head, piece, tail string) []byte {
		n := (size - len(head) - len(tail)) / len(piece)
		return []byte(head + strings.Repeat(piece, n) + tail)
	}
	numbered := func(head, format, tail string) []byte {
		var b bytes.Buffer
		b.WriteString(head)
		for i := 0; b.Len() < size; i++ {
			fmt.Fprintf(&b, format, i)
		}
		b.WriteString(tail)
		return b.Bytes()
	}
	noise := make([]byte, size)
	random := rand.New(rand.NewPCG(1, 2))
	for i := range noise {
		noise[i] = byte(random.Uint32())
	}
	nodes := `{"workheat":1,"nodes":{"a":{"heat capacity":"1 J/K"},"b":{"held":"20 degC"}},`
	cases := []struct {
		name string
		text []byte
	}{
		{"bytes by chance", noise},
		{"brackets", fill("", "[", "")},
		{"quotes", fill("{", `"`, "")},
		{"backslashes", fill(`{"a":"`, `\\`, `"}`)},
		{"commas", fill("{", ",", "}")},
		{"comments", fill("{", "//x\n", "}")},
		{"one-letter words", fill("{", "x ", "}")},
		{"numbers", fill(`{"duty":[1`, ",1", "]}")},
		{"equal keys", fill(`{"a":1`, `,"a":1`, "}")},
		{"unknown keys", numbered(`{"a":1`, `,"key %d":1`, "}")},
		{"misspelt nodes", numbered(`{"workheat":1,"nodes":{"a":1`, `,"node %d":{"mas":"2 kgg"}`, "}}")},
		{"unknown nodes", numbered(nodes+`"conductances":{"x":1`, `,"path %d":{"kind":"conduction","between":["aa","bb"],"value":"1 W/k"}`, "}}")},
		{"unknown units", numbered(`{"workheat":1,"parameters":{"a":1`, `,"par%d":"3 kgmm/sex"`, "}}")},
		{"wrong phases", fill(nodes+`"duty":[{}`, `,{"brake":{"tto":"1 m/x"}}`, "]}")},
		{"wrong rows", fill(`{"nodes":{"a":{"heat capacity":{"table":[[]`, `,["1 K","2 J"]`, "]}}}}")},
	}
	for _, c := range cases {
		_, problems, took := timed(t, c.name, c.text)
		if len(problems) == 0 || len(problems) > 101 {
			t.Errorf("%s: %d problems", c.name, len(problems))
		}
		if took > slow {
			t.Errorf("%s took %v", c.name, took)
		}
	}
}

// A file beyond the bounds is refused at once.
func TestTooLarge(t *testing.T) {
	for _, c := range []struct{ name, text, want string }{
		{"bytes", "{" + strings.Repeat(" ", 64<<20) + "}", "too large"},
		{"values", `{"a":[1` + strings.Repeat(",1", 5<<20) + "]}", "more than"},
	} {
		_, problems, took := timed(t, c.name, []byte(c.text))
		if len(problems) != 1 || !strings.Contains(problems[0].Text, c.want) || took > slow {
			t.Errorf("%s: %v after %v", c.name, problems, took)
		}
	}
}

// chain is a netlist of n nodes in a row, each linked to the next and to the air.
func chain(n int) []byte {
	var b bytes.Buffer
	b.WriteString(`{"workheat":1,"nodes":{"air":{"held":"20 degC"}`)
	for i := range n {
		fmt.Fprintf(&b, ",\n\"node %d\":{\"mass\":\"%d.5 g\",\"material\":\"carbon steel\",\"start\":\"20 degC\",\"limits\":{\"fade\":\"450 degC\"}}", i, i%9+1)
	}
	b.WriteString(`},"conductances":{"about":"a row"`)
	for i := range n {
		fmt.Fprintf(&b, ",\n\"cool %d\":{\"kind\":\"convection\",\"between\":[\"node %d\",\"air\"],\"area\":\"12 cm^2\",\"coefficient\":\"8 W/(m^2 K)\"}", i, i)
		if i > 0 {
			fmt.Fprintf(&b, ",\n\"link %d\":{\"kind\":\"conduction\",\"between\":[\"node %d\",\"node %d\"],\"value\":\"3 W/K\"}", i, i-1, i)
		}
	}
	b.WriteString(`},"duty":[{"rest":{"for":"10 min"}}]}`)
	return b.Bytes()
}

// A valid netlist of many nodes reads without a problem and in reasonable time: 10,000 nodes, or 100,000
// with -long.
func TestManyNodes(t *testing.T) {
	n := 10_000
	if *long {
		n = 100_000
	}
	net, problems, took := timed(t, fmt.Sprintf("%d nodes", n), chain(n))
	if len(problems) > 0 || len(net.Nodes) != n+1 || took > slow {
		t.Errorf("%d nodes, %v after %v", len(net.Nodes), problems, took)
	}
}

// A long list of problems is cut, and says so.
func TestManyProblems(t *testing.T) {
	text, err := os.ReadFile("testdata/bad/many-nodes.json")
	if err != nil {
		t.Fatal(err)
	}
	_, problems, _ := timed(t, "241 problems", text)
	if len(problems) != 101 || problems[100].Text != "… and 141 more" || problems[100].Warning {
		t.Errorf("%d problems, the last %v", len(problems), problems[len(problems)-1])
	}
}
