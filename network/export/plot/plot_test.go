package plot

import (
	"bytes"
	"encoding/xml"
	"fmt"
	"image"
	"image/color"
	"image/png"
	"io"
	"math"
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"

	"workheat/network/element"
	"workheat/network/export/outcome"
	"workheat/network/export/outcome/outcometest"
	"workheat/network/record"
	"workheat/network/unit"
)

func pictured(t *testing.T, o *outcome.Run) image.Image {
	t.Helper()
	var out bytes.Buffer
	if err := PNG(&out, o); err != nil {
		t.Fatal(err)
	}
	img, err := png.Decode(&out)
	if err != nil {
		t.Fatal(err)
	}
	if b := img.Bounds(); b.Dx() != 1320 || b.Dy() < 744 || b.Dy() > 1100 {
		t.Errorf("the picture is %d x %d", b.Dx(), b.Dy())
	}
	return img
}

// pixels counts the pixels of a colour left of x.
func pixels(img image.Image, c color.Color, x int) int {
	want := color.RGBAModel.Convert(c)
	n := 0
	for i := img.Bounds().Min.X; i < x; i++ {
		for j := img.Bounds().Min.Y; j < img.Bounds().Max.Y; j++ {
			if color.RGBAModel.Convert(img.At(i, j)) == want {
				n++
			}
		}
	}
	return n
}

// plotRight is a pixel column inside the plot area, left of the legend.
const plotRight = 880

func TestEveryCurveAndLimitIsDrawn(t *testing.T) {
	img := pictured(t, outcometest.Run(9, 2400))
	for i, c := range inks {
		if n := pixels(img, c, plotRight); n < 200 {
			t.Errorf("curve %d has %d pixels of its own colour in the plot", i+1, n)
		}
	}
	if n := pixels(img, red, plotRight); n < 300 {
		t.Errorf("the limit lines have %d red pixels", n)
	}
	if n := pixels(img, heldInk, plotRight); n < 50 {
		t.Errorf("the held node has %d grey pixels", n)
	}
}

func TestWithoutLimitsNothingIsRed(t *testing.T) {
	o := outcometest.Run(3, 2400)
	inner := o.Series
	o.Series = func(h float64) *record.Series {
		s := inner(h)
		for i := range s.Columns {
			s.Columns[i].Limits = nil
		}
		return s
	}
	if n := pixels(pictured(t, o), red, 2000); n != 0 {
		t.Errorf("%d red pixels", n)
	}
	o.Book.Closed = false
	if n := pixels(pictured(t, o), red, 2000); n < 100 {
		t.Errorf("an open energy book shows in %d red pixels", n)
	}
}

func TestPeaksAreDrawn(t *testing.T) {
	s := newScene(outcometest.Run(4, 2400))
	at := func(v float64) vg.Length { return vg.Length(v) }
	for i := range 3 {
		want, when := outcometest.Peak(4, i, 2400)
		found := false
		for _, p := range s.path(&s.curves[i], at, at) {
			found = found || math.Abs(float64(p.Y)-(want-273.15)) < 1e-9 && math.Abs(float64(p.X)-when/60) < 1e-9
		}
		if !found {
			t.Errorf("the peak of node %d, %g at %g s, is not on its path", i+1, want, when)
		}
	}
}

// drawn writes an SVG, checks that it is well formed and returns it with its texts.
func drawn(t *testing.T, o *outcome.Run) (svg string, texts []string) {
	t.Helper()
	var out bytes.Buffer
	if err := SVG(&out, o); err != nil {
		t.Fatal(err)
	}
	svg = out.String()
	d := xml.NewDecoder(strings.NewReader(svg))
	inside := false
	for {
		token, err := d.Token()
		if err == io.EOF {
			return svg, texts
		}
		if err != nil {
			t.Fatalf("not well formed: %v", err)
		}
		switch token := token.(type) {
		case xml.StartElement:
			inside = token.Name.Local == "text"
		case xml.CharData:
			if inside {
				texts = append(texts, string(token))
			}
		case xml.EndElement:
			inside = false
		}
	}
}

func has(texts []string, want string) bool {
	for _, s := range texts {
		if s == want {
			return true
		}
	}
	return false
}

func TestTextsOfThePicture(t *testing.T) {
	o := outcometest.Run(9, 2400)
	svg, texts := drawn(t, o)
	highest, _ := outcometest.Peak(9, 0, 2400)
	for _, want := range []string{
		o.Title, o.Caution, "time [min]", "temperature [degC]", "fade 250 degC (node 1)", "limits above the scale:",
		"paint 5000 degC (node 2)", "node 9 (held)", "15 × brake, speed up", "rest", fmt.Sprintf("%.1f", highest-273.15), "8",
	} {
		if !has(texts, want) {
			t.Errorf("no text %q in %q", want, texts)
		}
	}
	if strings.Contains(svg, "Serif") || !strings.Contains(svg, "font-family:'Liberation Sans',Arial,Helvetica,sans-serif") {
		t.Error("a text is not in the sans font with a fallback")
	}
	if len(svg) > 400_000 {
		t.Errorf("the drawing takes %d bytes", len(svg))
	}
}

func TestHostileAndHugeNames(t *testing.T) {
	o := outcometest.Run(3, 900)
	inner := o.Series
	huge := strings.Repeat("very long name ", 40)
	o.Title = huge + `<script>"&'` + "\x00\n"
	o.Source, o.Caution = "]]></svg>", huge
	o.Series = func(h float64) *record.Series {
		s := inner(h)
		s.Columns[0].Name = huge
		s.Columns[1].Name = "</text>\xff\x01"
		s.Columns[0].Limits = []element.Limit{{Name: huge, Temperature: 400}}
		s.Segments[0].Label = "1.1 " + huge
		return s
	}
	_, texts := drawn(t, o)
	for _, s := range texts {
		if n := len([]rune(s)); n > 260 {
			t.Errorf("a text of %d characters is not clipped: %.40q", n, s)
		}
	}
	pictured(t, o)
}

func TestOddRuns(t *testing.T) {
	level := &outcome.Run{End: 10, Series: func(float64) *record.Series {
		return &record.Series{Time: []float64{0, 10}, Columns: []record.Column{{Name: "a", Want: unit.Temperature, Values: []float64{300, 300}}}}
	}}
	gaps := &outcome.Run{End: 10, Series: func(float64) *record.Series {
		return &record.Series{Time: []float64{0, 5, 10}, Columns: []record.Column{
			{Name: "a", Want: unit.Temperature, Values: []float64{300, math.NaN(), 310}},
			{Name: "b", Want: unit.Temperature, Values: []float64{math.NaN(), math.Inf(1), math.NaN()}},
		}}
	}}
	for name, o := range map[string]*outcome.Run{
		"empty":     {Series: func(float64) *record.Series { return nil }},
		"no length": outcometest.Run(2, 0), "very short": outcometest.Run(2, 1e-4), "very long": outcometest.Run(2, 3e7),
		"level": level, "gaps": gaps, "many": outcometest.Run(60, 900),
	} {
		t.Run(name, func(t *testing.T) {
			pictured(t, o)
			if _, texts := drawn(t, o); name == "empty" && !has(texts, "nothing was recorded") {
				t.Errorf("texts are %q", texts)
			}
		})
	}
	for n := 1; n <= 30; n++ {
		s := newScene(outcometest.Run(n, 900))
		if len(s.curves) != n || s.height() < s.legend.height() {
			t.Errorf("%d nodes: %d curves, legend of %g in a picture of %g points", n, len(s.curves), s.legend.height(), s.height())
		}
	}
}

func TestLineStylesDiffer(t *testing.T) {
	seen := map[string]int{}
	for k := range curves {
		s := lineStyle(k)
		look := fmt.Sprint(s.Color, s.Dashes)
		if other, ok := seen[look]; ok {
			t.Errorf("curves %d and %d look alike", other, k)
		}
		seen[look] = k
	}
}

func TestBlocks(t *testing.T) {
	blocks, marks := blocksOf(outcometest.Run(1, 2400))
	if len(blocks) != 2 || blocks[0].text != "15 × brake, speed up" || blocks[0].end != 675 || blocks[1].text != "rest" {
		t.Errorf("got blocks %+v", blocks)
	}
	if len(marks) != 3*15+1 {
		t.Errorf("got %d marks", len(marks))
	}
	plain := []record.Segment{{Start: 0, End: 1, Label: "odd", First: true}, {Start: 1, End: 2, Label: "odd"}, {Start: 2, End: 3, Label: "3 stop", First: true}}
	blocks, _ = blocksOf(&outcome.Run{End: 3, Series: func(float64) *record.Series { return &record.Series{Segments: plain} }})
	if len(blocks) != 2 || blocks[0].text != "odd" || blocks[0].end != 2 || blocks[1].text != "stop" {
		t.Errorf("got blocks %+v", blocks)
	}
}

func TestTicks(t *testing.T) {
	ticks := steps(0.1).Ticks(-0.2, 0.35)
	var labels []string
	for _, k := range ticks {
		labels = append(labels, k.Label)
	}
	if got := strings.Join(labels, " "); got != "-0.2 -0.1 0.0 0.1 0.2 0.3" {
		t.Errorf("ticks %s", got)
	}
}

func TestSpread(t *testing.T) {
	for _, c := range []struct{ at, want []vg.Length }{
		{[]vg.Length{10, 50, 90}, []vg.Length{10, 50, 90}},
		{[]vg.Length{50, 50, 50}, []vg.Length{40, 50, 60}},
		{[]vg.Length{0, 1, 2}, []vg.Length{0, 10, 20}},
		{[]vg.Length{100, 100}, []vg.Length{90, 100}},
		{nil, nil},
	} {
		got := append([]vg.Length(nil), c.at...)
		spread(got, 10, 0, 100)
		for i := range got {
			if math.Abs(float64(got[i]-c.want[i])) > 1e-9 {
				t.Errorf("spread(%v) = %v, want %v", c.at, got, c.want)
				break
			}
		}
	}
}

func TestClip(t *testing.T) {
	s := write(9, ink, 0, 0)
	for _, text := range []string{"", "short", "a rather longer line of text", "äöü°äöü°äöü°äöü°"} {
		got := clip(s, text, 60)
		if s.Width(got) > 60 || text == "short" && got != text {
			t.Errorf("%q is clipped to %q, %g wide", text, got, s.Width(got))
		}
	}
	if got := clip(s, "xxxxxxxx", 1); got != "" {
		t.Errorf("clipped to nothing is %q", got)
	}
}

func TestSameRunSameBytes(t *testing.T) {
	for _, write := range []func(io.Writer, *outcome.Run) error{PNG, SVG} {
		var a, b bytes.Buffer
		if err := write(&a, outcometest.Run(8, 900)); err != nil {
			t.Fatal(err)
		}
		if err := write(&b, outcometest.Run(8, 900)); err != nil {
			t.Fatal(err)
		}
		if !bytes.Equal(a.Bytes(), b.Bytes()) {
			t.Error("two pictures of one run differ")
		}
	}
}

func BenchmarkPNG(b *testing.B) { benchmark(b, PNG) }
func BenchmarkSVG(b *testing.B) { benchmark(b, SVG) }

func benchmark(b *testing.B, write func(io.Writer, *outcome.Run) error) {
	o := outcometest.Run(12, 1998)
	for b.Loop() {
		if err := write(io.Discard, o); err != nil {
			b.Fatal(err)
		}
	}
}
