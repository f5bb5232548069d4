package csv

import (
	"bytes"
	stdcsv "encoding/csv"
	"errors"
	"math"
	"math/rand/v2"
	"strconv"
	"strings"
	"testing"

	"workheat/network/export/outcome"
	"workheat/network/export/outcome/outcometest"
	"workheat/network/record"
	"workheat/network/unit"
)

func written(t *testing.T, o *outcome.Run) (string, [][]string) {
	t.Helper()
	var out bytes.Buffer
	if err := Write(&out, o); err != nil {
		t.Fatal(err)
	}
	rows, err := stdcsv.NewReader(bytes.NewReader(out.Bytes())).ReadAll()
	if err != nil {
		t.Fatal(err)
	}
	return out.String(), rows
}

func TestFileReadsBackAsTheSamples(t *testing.T) {
	o := outcometest.Run(12, 2400)
	o.Interval = 0.7
	text, rows := written(t, o)
	if lines := strings.Count(text, "\n"); lines != strings.Count(text, "\r\n") || lines != len(rows) {
		t.Errorf("%d line feeds, %d with carriage return, %d rows", lines, strings.Count(text, "\r\n"), len(rows))
	}
	if got, want := rows[0][0]+";"+rows[0][1]+";"+rows[0][len(rows[0])-1], "time [s];node 1 [degC];speed [km/h]"; got != want {
		t.Errorf("header %q, want %q", got, want)
	}
	s := o.Series(0.7)
	if len(rows) != len(s.Time)+1 || rows[len(rows)-1][0] != "2400" {
		t.Fatalf("%d rows for %d samples, the last at %s", len(rows), len(s.Time), rows[len(rows)-1][0])
	}
	for i, row := range rows[1:] {
		same(t, row[0], s.Time[i], 0)
		for k, c := range s.Columns {
			same(t, row[k+1], c.Want.Show(c.Values[i]), 1e-10)
		}
	}
}

// same allows half a unit of the ninth digit, which is at most 5e-9 of the value, and a small remainder near zero.
func same(t *testing.T, got string, want, small float64) {
	t.Helper()
	v, err := strconv.ParseFloat(got, 64)
	if err != nil || math.Abs(v-want) > 5.01e-9*math.Abs(want)+small {
		t.Fatalf("got %q, want %v (%v)", got, want, err)
	}
}

func TestNumbers(t *testing.T) {
	for _, c := range []struct {
		v    float64
		want string
	}{
		{0, "0"}, {math.Copysign(0, -1), "0"}, {20, "20"}, {-20.5, "-20.5"}, {0.30000000000000004, "0.3"}, {1e8, "100000000"},
		{999999999.7, "1000000000"}, {0.1, "0.1"}, {0.00012345678949, "0.000123456789"}, {123456.7894, "123456.789"},
		{5.7e-14, "0"}, {1e-5, "1e-05"}, {2.5e12, "2.5e+12"}, {99.9999999999, "100"}, {math.NaN(), ""}, {math.Inf(-1), ""},
		{293.15 - 273.15, "20"}, {0.01, "0.01"}, {0.0999999999999, "0.1"}, {100, "100"},
	} {
		if got := string(number(nil, c.v)); got != c.want {
			t.Errorf("%v is written %q, want %q", c.v, got, c.want)
		}
	}
	r := rand.New(rand.NewPCG(1, 2))
	for range 200_000 {
		v := math.Pow(10, -4+12.9*r.Float64())
		got := string(number(nil, v))
		same(t, got, v, 0)
		if strings.ContainsAny(got, "e") || strings.Contains(got, ".") && strings.HasSuffix(got, "0") {
			t.Fatalf("%v is written %q", v, got)
		}
	}
}

func TestDangerousAndAwkwardNames(t *testing.T) {
	names := []string{"=HYPERLINK(\"x\")", "+1", "-1", "@SUM(A1)", "\tx", "\rx", "a,b", "a \"b\"", "plain = name"}
	o := &outcome.Run{End: 1, Series: func(float64) *record.Series {
		s := &record.Series{Time: []float64{0, 1}}
		for _, n := range names {
			s.Columns = append(s.Columns, record.Column{Name: n, Want: unit.Number, Values: []float64{-1, 2}})
		}
		return s
	}}
	text, rows := written(t, o)
	for i, n := range names {
		want := n
		if strings.ContainsRune("=+-@\t\r", rune(n[0])) {
			want = "'" + n
		}
		if got := rows[0][i+1]; got != want {
			t.Errorf("name %q is written %q", n, got)
		}
		if got := rows[1][i+1]; got != "-1" {
			t.Errorf("a negative number is written %q", got)
		}
	}
	if strings.Contains(text, ",=") || strings.Contains(text, `"=`) {
		t.Errorf("a cell begins a formula: %s", text)
	}
}

func TestGapsAreEmpty(t *testing.T) {
	o := &outcome.Run{End: 1, Series: func(float64) *record.Series {
		return &record.Series{Time: []float64{0, 1}, Columns: []record.Column{{Name: "a", Want: unit.Temperature, Values: []float64{math.NaN(), 300}}}}
	}}
	if text, _ := written(t, o); text != "time [s],a [degC]\r\n0,\r\n1,26.85\r\n" {
		t.Errorf("got %q", text)
	}
}

func TestDoubtsAreNoted(t *testing.T) {
	o := outcometest.Run(2, 100)
	_, rows := written(t, o)
	sound := len(rows[0])
	o.Book.Closed, o.Interrupted = false, true
	_, rows = written(t, o)
	last := len(rows[0]) - 1
	if last != sound || rows[0][last] != "note" {
		t.Fatalf("header of a doubtful run: %q", rows[0])
	}
	for i, want := range []string{"interrupted", "NOT CLOSED", "for tests only"} {
		if !strings.Contains(rows[i+1][last], want) {
			t.Errorf("note %d is %q, want it to hold %q", i, rows[i+1][last], want)
		}
	}
	o.Series = func(float64) *record.Series { return &record.Series{Time: []float64{0}} }
	if _, rows = written(t, o); !strings.Contains(rows[1][1], "for tests only") {
		t.Errorf("the notes do not fit on the only row: %q", rows)
	}
}

type fullDisk struct{ left int }

var errFull = errors.New("no room")

func (f *fullDisk) Write(p []byte) (int, error) {
	if f.left -= len(p); f.left < 0 {
		return 0, errFull
	}
	return len(p), nil
}

func TestErrorsOfTheWriterComeBack(t *testing.T) {
	for _, left := range []int{0, 100_000} {
		if err := Write(&fullDisk{left}, outcometest.Run(12, 2400)); !errors.Is(err, errFull) {
			t.Errorf("with room for %d bytes: %v", left, err)
		}
	}
}

func BenchmarkWrite(b *testing.B) {
	o := outcometest.Run(12, 1998)
	s := o.Series(1)
	o.Series = func(float64) *record.Series { return s }
	for b.Loop() {
		var out bytes.Buffer
		if err := Write(&out, o); err != nil {
			b.Fatal(err)
		}
	}
}
