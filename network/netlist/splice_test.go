package netlist_test

import (
	"bytes"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/goccy/go-json/jsontext"

	"workheat/library"
	"workheat/network/diag"
	"workheat/network/netlist"
)

// tokens splits a netlist into its tokens, white space and punctuation staying with the token before.
func tokens(t testing.TB, text []byte) (parts []string) {
	t.Helper()
	d := jsontext.NewDecoder(bytes.NewBuffer(text), jsontext.AllowDuplicateNames(true))
	from := 0
	for {
		if _, err := d.ReadToken(); err != nil {
			return append(parts, string(text[from:]))
		}
		to := int(d.InputOffset())
		for to < len(text) && strings.IndexByte(" \t\r\n,:", text[to]) >= 0 {
			to++
		}
		parts = append(parts, string(text[from:to]))
		from = to
	}
}

// odd are values and pieces that no netlist should hold in most places.
var odd = []string{
	"null", "true", "1e30", "-1", "0", `""`, `"about"`, "{}", "[]", `"1e29 kg"`, `"1e-29 kg"`, `"1e30 W/K"`, `"-1 K"`, `"0 K"`, `"disc"`, `"air"`,
	`{"signal":"weather"}`, `{"table":[["0 s","1 K"],["0 s","2 K"]]}`, `"0 km/h"`, `"1e20 km/h"`, `"1e-20 s"`, `"1e25 s"`, "1000000", `"90 deg"`, ",", "}", "]", "//",
}

// spliced returns a netlist in which a few tokens were exchanged with others, left out or doubled. Mostly
// the punctuation is kept, so that what comes out is JSON.
func spliced(parts, pool []string, random *rand.Rand) []byte {
	out := append([]string(nil), parts...)
	for range 1 + random.IntN(4) {
		i := random.IntN(len(out))
		word := pool[random.IntN(len(pool))]
		if random.IntN(3) == 0 {
			word = odd[random.IntN(len(odd))]
		}
		tail := out[i][len(strings.TrimRight(out[i], " \t\r\n,:")):]
		switch random.IntN(8) {
		case 0:
			out[i] = ""
		case 1:
			out[i] += out[i]
		case 2:
			j := random.IntN(len(out))
			out[i], out[j] = out[j], out[i]
		default:
			out[i] = strings.TrimRight(word, " \t\r\n,:") + tail
		}
	}
	return []byte(strings.Join(out, ""))
}

// material returns the tokens of the good netlists, each on its own and all together.
func material(t testing.TB) (each [][]string, all []string) {
	for _, name := range names(t, "testdata/good") {
		text, err := os.ReadFile(filepath.Join("testdata/good", name))
		if err != nil {
			t.Fatal(err)
		}
		parts := tokens(t, bytes.TrimPrefix(text, []byte("\xef\xbb\xbf")))
		each, all = append(each, parts), append(all, parts...)
	}
	return each, all
}

// splice reads one spliced netlist and checks what FuzzRead checks; it reports whether it was usable.
func splice(t *testing.T, each [][]string, all []string, seed uint64) bool {
	random := rand.New(rand.NewPCG(seed, 7))
	text := spliced(each[random.IntN(len(each))], all, random)
	defer func() {
		if fault := recover(); fault != nil {
			t.Fatalf("seed %d: %v\n%s", seed, fault, text)
		}
	}()
	begun := time.Now()
	net, problems := netlist.Read(&diag.Source{Name: "spliced", Text: text}, library.Catalogue(), in("testdata/good"))
	if took := time.Since(begun); took > 5*time.Second {
		t.Errorf("seed %d took %v", seed, took)
	}
	wellPlaced(t, problems)
	if !usable(problems) {
		return false
	}
	sound(t, net)
	if t.Failed() {
		t.Fatalf("seed %d:\n%s", seed, text)
	}
	return true
}

// Netlists that are nearly right: every exchange of tokens is either reported or harmless.
func TestSpliced(t *testing.T) {
	each, all := material(t)
	rounds, good := 2000, 0
	if *long {
		rounds = 200_000
	}
	for seed := range rounds {
		if splice(t, each, all, uint64(seed)) {
			good++
		}
	}
	t.Logf("%d of %d were usable", good, rounds)
	if good == 0 || good > rounds/2 {
		t.Errorf("%d of %d were usable: the exchange does not do its work", good, rounds)
	}
}
