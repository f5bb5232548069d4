package diag

import (
	"strings"
	"testing"
	"unicode"
	"unicode/utf8"
)

func TestPosition(t *testing.T) {
	s := &Source{Name: "n", Text: []byte("a\tb\r\nµx\xffy\n\nlast")}
	cases := []struct {
		what         string
		offset       int
		line, column int
	}{
		{"first byte", 0, 1, 1},
		{"before the text", -7, 1, 1},
		{"after a tab", 2, 1, 3},
		{"at the carriage return", 3, 1, 4},
		{"second line", 5, 2, 1},
		{"inside a character", 6, 2, 1},
		{"after a wide character", 7, 2, 2},
		{"a byte that is no UTF-8", 8, 2, 3},
		{"after it", 9, 2, 4},
		{"end of the line", 10, 2, 5},
		{"empty line", 11, 3, 1},
		{"last line", 12, 4, 1},
		{"end of the text", 16, 4, 5},
		{"beyond the text", 99, 4, 5},
	}
	for _, c := range cases {
		if line, column := s.Position(c.offset); line != c.line || column != c.column {
			t.Errorf("%s: Position(%d) = %d:%d, want %d:%d", c.what, c.offset, line, column, c.line, c.column)
		}
	}
	if line, column := new(Source).Position(3); line != 1 || column != 1 {
		t.Errorf("empty text: %d:%d, want 1:1", line, column)
	}
}

// Positions on one huge line must not each cost the whole line.
func TestManyPositionsOnOneLine(t *testing.T) {
	text := strings.Repeat("µ", 1<<21)
	s := &Source{Text: []byte(text)}
	for i := 0; i < len(text); i += 20 {
		if _, column := s.Position(i); column != i/2+1 {
			t.Fatalf("Position(%d): column %d, want %d", i, column, i/2+1)
		}
	}
}

func TestRender(t *testing.T) {
	s := &Source{Name: "corner.json", Text: []byte("{\n\t\"value\": \"6.2 kg\",\n\t\"value\": 3\n}\n")}
	long := &Source{Name: "long.json", Text: []byte(strings.Repeat("x", 300) + "HERE" + strings.Repeat("y", 300))}
	bad := &Source{Name: "b\x1b[31mad", Text: []byte("a\x1b[2Jb\xff\u202ec\x00d")}
	cases := []struct {
		name    string
		problem Problem
		want    string
	}{
		{"no place", Problem{Text: "no netlist given"}, "no netlist given\n"},
		{"whole file", Problem{At: s.Whole(), Text: "the file is too large"}, "corner.json: the file is too large\n"},
		{
			"span, cure, note",
			Problem{
				At: s.Span(12, 18), Text: "6.2 kg is a mass, but a conductance is due", Help: "give it in W/K",
				See: []Note{{s.Span(24, 31), "the second of the name"}},
			},
			"corner.json:2:11: 6.2 kg is a mass, but a conductance is due\n" +
				"        \"value\": \"6.2 kg\",\n" +
				"                 ~~~~~~\n" +
				"  cure: give it in W/K\n" +
				"  see corner.json:3:3: the second of the name\n",
		},
		{"one character", Problem{At: s.Span(0, 1), Text: "odd"}, "corner.json:1:1: odd\n    {\n    ^\n"},
		{"end before start", Problem{At: s.Span(1, 0), Text: "odd"}, "corner.json:1:2: odd\n    {\n     ^\n"},
		{"end of the text", Problem{At: s.Span(99, 120), Text: "cut short"}, "corner.json:5:1: cut short\n    \n    ^\n"},
		{"over the line end", Problem{At: s.Span(34, 99), Text: "odd"}, "corner.json:4:1: odd\n    }\n    ^\n"},
		{"warning", Problem{At: s.Span(0, 1), Text: "odd", Warning: true}, "warning: corner.json:1:1: odd\n    {\n    ^\n"},
		{
			"long line", Problem{At: long.Span(300, 304), Text: "odd"},
			"long.json:1:301: odd\n" +
				"    …" + strings.Repeat("x", 40) + "HERE" + strings.Repeat("y", 56) + "…\n" +
				"     " + strings.Repeat(" ", 40) + "~~~~\n",
		},
		{
			"long span", Problem{At: long.Span(0, 604), Text: "odd"},
			"long.json:1:1: odd\n    " + strings.Repeat("x", 100) + "…\n    " + strings.Repeat("~", 100) + "\n",
		},
		{
			"nothing reaches the terminal", Problem{At: bad.Span(5, 6), Text: "t\x1b]0;x\a\nu", Help: "h\x9b1m"},
			"b\uFFFD[31mad:1:6: t\uFFFD]0;x\uFFFD u\n" +
				"    a\uFFFD[2Jb\uFFFD\uFFFDc\uFFFDd\n" +
				"         ^\n" +
				"  cure: h\uFFFD1m\n",
		},
	}
	for _, c := range cases {
		var out strings.Builder
		if err := Render(&out, []Problem{c.problem}, false); err != nil {
			t.Fatal(err)
		}
		if got := out.String(); got != c.want {
			t.Errorf("%s:\ngot\n%s\nwant\n%s\n(%q)", c.name, got, c.want, got)
		}
	}
}

func TestRenderColour(t *testing.T) {
	s := &Source{Name: "n", Text: []byte("ab\x1b[1m")}
	p := []Problem{{At: s.Span(1, 2), Text: "t", Help: "h"}}
	var out strings.Builder
	if err := Render(&out, p, true); err != nil {
		t.Fatal(err)
	}
	want := "n:1:2: t\n    ab\uFFFD[1m\n     \x1b[31;1m^\x1b[0m\n  \x1b[32mcure:\x1b[0m h\n"
	if out.String() != want {
		t.Errorf("got %q, want %q", out.String(), want)
	}
}

// failing is a writer that takes nothing.
type failing struct{}

func (failing) Write([]byte) (int, error) { return 0, errFull }

type full struct{}

func (full) Error() string { return "full" }

var errFull = full{}

func TestRenderReturnsTheError(t *testing.T) {
	if err := Render(failing{}, []Problem{{Text: "t"}}, false); err != errFull {
		t.Errorf("got %v, want %v", err, errFull)
	}
}

func TestList(t *testing.T) {
	a := &Source{Name: "a", Text: []byte("0123456789")}
	b := &Source{Name: "b", Text: []byte("0123456789")}
	var l List
	if l.Failed() || l.Len() != 0 {
		t.Error("a new list is not empty")
	}
	l.Warn(a.Span(3, 4), "x", "")
	if l.Failed() {
		t.Error("a warning counts as a failure")
	}
	l.At(b.Span(1, 2), "x", "")
	l.At(a.Span(3, 4), "x", "")
	l.At(a.Span(3, 4), "a", "h")
	l.At(a.Span(3, 4), "a", "another cure of the same")
	l.At(a.Span(1, 9), "z1", "")
	l.At(a.Span(1, 2), "z", "")
	l.At(Span{}, "nowhere", "")
	var got []string
	for _, p := range l.Problems() {
		got = append(got, p.Error())
	}
	want := []string{"nowhere", "a:1:2: z", "a:1:2: z1", "a:1:4: a", "warning: a:1:4: x", "a:1:4: x", "b:1:2: x"}
	if strings.Join(got, "|") != strings.Join(want, "|") {
		t.Errorf("got %q\nwant %q", got, want)
	}
	if !l.Failed() || l.Len() != len(want) {
		t.Errorf("Failed %v, Len %d; want true, %d", l.Failed(), l.Len(), len(want))
	}
}

func TestNearest(t *testing.T) {
	known := []string{"conductance", "convection", "radiation", "m", "min", "mm", "kPa", "mass", "disc face", "Disc"}
	cases := []struct{ word, want, why string }{
		{"conductnace", "conductance", "a swap is one slip"},
		{"convectoin", "convection", "a swap"},
		{"raditaion", "radiation", "a swap"},
		{"KPA", "kPa", "case only"},
		{"disc", "Disc", "case only"},
		{"mas", "mass", "one left out"},
		{"disk face", "disc face", "one changed"},
		{"x", "", "shares no character"},
		{"xy", "", "shares no character"},
		{"mi", "m", "equal cost: the first in the list"},
		{"turbulence", "", "not near"},
		{"", "", "nothing asked"},
		{strings.Repeat("conductance", 20), "", "too long"},
	}
	for _, c := range cases {
		if got := Nearest(c.word, known); got != c.want {
			t.Errorf("Nearest(%q) = %q, want %q (%s)", c.word, got, c.want, c.why)
		}
	}
	if got := Nearest("a", nil); got != "" {
		t.Errorf("nothing known: %q", got)
	}
}

// The distance is a metric up to the rule for swaps: zero on equals, symmetric,
// and never more than the length of the longer word.
func TestDistance(t *testing.T) {
	words := []string{"", "a", "ab", "ba", "abc", "Abc", "cba", "kelvin", "Klevin"}
	for _, a := range words {
		for _, b := range words {
			x, y := []rune(a), []rune(b)
			d := distance(x, y)
			if d != distance(y, x) || (d == 0) != (a == b) || d > slip*max(len(x), len(y)) {
				t.Errorf("distance(%q, %q) = %d", a, b, d)
			}
		}
	}
	if d := distance([]rune("ab"), []rune("ba")); d != slip {
		t.Errorf("a swap costs %d, want %d", d, slip)
	}
}

// Whatever the text and the offsets, nothing panics, positions agree with a
// plain count, and nothing but printable text comes out, in bounded amount.
func FuzzRender(f *testing.F) {
	f.Add("n", []byte("{\"a\": 1}\r\n"), 2, 5, "text", "help")
	f.Add("\x1b[1m", []byte("\xff\xfe\x00\t\u202e"), -3, 100, "\x1b", "")
	f.Add("n", []byte(strings.Repeat("µ\t", 150)), 200, 100, "", "\n")
	f.Fuzz(func(t *testing.T, name string, text []byte, start, end int, what, help string) {
		s := &Source{Name: name, Text: text}
		line, column := s.Position(start)
		if wl, wc := plainPosition(text, start); line != wl || column != wc {
			t.Errorf("Position(%d) = %d:%d, want %d:%d", start, line, column, wl, wc)
		}
		p := Problem{At: s.Span(start, end), Text: what, Help: help, See: []Note{{s.Span(end, start), what}}}
		var out strings.Builder
		if err := Render(&out, []Problem{p}, false); err != nil {
			t.Fatal(err)
		}
		got := out.String()
		if !utf8.ValidString(got) || strings.ContainsFunc(got, func(r rune) bool { return r != '\n' && !unicode.IsPrint(r) }) {
			t.Errorf("unsafe output %q", got)
		}
		if n := utf8.RuneCountInString(got); n > 6*(shownText+1)+2*(shownColumns+10)+200 {
			t.Errorf("output of %d characters", n)
		}
		if n := strings.Count(got, "\n"); n > 5 {
			t.Errorf("%d lines for one problem: %q", n, got)
		}
	})
}

// plainPosition is Position by counting from the start.
func plainPosition(text []byte, offset int) (line, column int) {
	offset = max(0, min(offset, len(text)))
	line, column = 1, 1
	for i := 0; i < offset; {
		r, size := utf8.DecodeRune(text[i:])
		if i+size > offset {
			break
		}
		i += size
		if column++; r == '\n' {
			line, column = line+1, 1
		}
	}
	return line, column
}
