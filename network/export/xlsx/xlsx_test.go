package xlsx

import (
	"archive/zip"
	"bytes"
	"fmt"
	"io"
	"math"
	"strings"
	"testing"

	"github.com/xuri/excelize/v2"

	"workheat/network/export/outcome"
	"workheat/network/export/outcome/outcometest"
	"workheat/network/record"
	"workheat/network/unit"
)

func written(t *testing.T, o *outcome.Run) []byte {
	t.Helper()
	var out bytes.Buffer
	if err := Write(&out, o); err != nil {
		t.Fatal(err)
	}
	return out.Bytes()
}

func opened(t *testing.T, data []byte) *excelize.File {
	t.Helper()
	f, err := excelize.OpenReader(bytes.NewReader(data))
	if err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { f.Close() })
	return f
}

// part returns a part of the zip archive.
func part(t *testing.T, data []byte, name string) string {
	t.Helper()
	z, err := zip.NewReader(bytes.NewReader(data), int64(len(data)))
	if err != nil {
		t.Fatal(err)
	}
	f, err := z.Open(name)
	if err != nil {
		t.Fatal(err)
	}
	defer f.Close()
	text, err := io.ReadAll(f)
	if err != nil {
		t.Fatal(err)
	}
	return string(text)
}

func value(t *testing.T, f *excelize.File, sheet, at string) string {
	t.Helper()
	v, err := f.GetCellValue(sheet, at, excelize.Options{RawCellValue: true})
	if err != nil {
		t.Fatal(err)
	}
	return v
}

// find returns the row in which column A of a sheet begins with a text.
func find(t *testing.T, f *excelize.File, sheet, text string) int {
	t.Helper()
	rows, err := f.GetRows(sheet)
	if err != nil {
		t.Fatal(err)
	}
	for i, row := range rows {
		if len(row) > 0 && strings.HasPrefix(row[0], text) {
			return i + 1
		}
	}
	t.Fatalf("%s has no row %q", sheet, text)
	return 0
}

func TestSheetsAreFrozenLandscapeAndCarryTheCaution(t *testing.T) {
	o := outcometest.Run(3, 900)
	f := opened(t, written(t, o))
	want := []string{"Summary", "Chart", "Temperatures", "Heat flows", "Energy book", "Inputs", "Chart data"}
	if got := f.GetSheetList(); strings.Join(got, ",") != strings.Join(want, ",") {
		t.Fatalf("sheets %q, want %q", got, want)
	}
	for _, sheet := range want {
		panes, err := f.GetPanes(sheet)
		if err != nil {
			t.Fatal(err)
		}
		if sheet != "Chart" && (!panes.Freeze || panes.YSplit < 2) {
			t.Errorf("%s: panes %+v", sheet, panes)
		}
		layout, err := f.GetPageLayout(sheet)
		if err != nil || layout.Orientation == nil || *layout.Orientation != "landscape" || *layout.FitToWidth != 1 {
			t.Errorf("%s: layout %+v (%v)", sheet, layout, err)
		}
		rows, _ := f.GetRows(sheet)
		if !strings.Contains(fmt.Sprint(rows[:2]), o.Caution) {
			t.Errorf("%s does not begin with the caution: %q", sheet, rows[:2])
		}
	}
}

func TestSamplesAreTypedNumbers(t *testing.T) {
	o := outcometest.Run(3, 900)
	o.Interval = 0.25
	f := opened(t, written(t, o))
	s := o.Series(0.25)
	if got := value(t, f, "Temperatures", "B2") + value(t, f, "Heat flows", "B2"); got != "node 1 [degC]node 1 to node 2 [W]" {
		t.Errorf("headers %q", got)
	}
	rows, _ := f.GetRows("Temperatures", excelize.Options{RawCellValue: true})
	if len(rows) != len(s.Time)+headRows {
		t.Fatalf("%d rows for %d samples", len(rows), len(s.Time))
	}
	for _, k := range []int{0, 17, 1000, len(s.Time) - 1} {
		at := fmt.Sprintf("B%d", k+1+headRows)
		kind, err := f.GetCellType("Temperatures", at)
		if err != nil || kind != excelize.CellTypeUnset && kind != excelize.CellTypeNumber {
			t.Errorf("%s is of type %v (%v)", at, kind, err)
		}
		var got float64
		if _, err := fmt.Sscan(rows[k+headRows][1], &got); err != nil || math.Abs(got-(s.Columns[0].Values[k]-273.15)) > 1e-9 {
			t.Errorf("%s holds %q, want %v", at, rows[k+headRows][1], s.Columns[0].Values[k]-273.15)
		}
	}
	style, err := f.GetCellStyle("Temperatures", "B5")
	if err != nil {
		t.Fatal(err)
	}
	if shown, _ := f.GetCellValue("Temperatures", "A4"); shown != "0.25" || style == 0 {
		t.Errorf("time is shown as %q, style of B5 is %d", shown, style)
	}
}

func TestSummaryHoldsPeaksMarginsAndWarnings(t *testing.T) {
	o := outcometest.Run(3, 900)
	f := opened(t, written(t, o))
	row := find(t, f, "Summary", "node 1")
	s := o.Summary[0]
	for column, want := range map[string]float64{"C": s.Highest - 273.15, "D": s.When, "H": 250, "I": s.Limits[0].Margin, "J": s.Limits[0].Above} {
		var got float64
		if _, err := fmt.Sscan(value(t, f, "Summary", fmt.Sprintf("%s%d", column, row)), &got); err != nil || math.Abs(got-want) > 1e-9 {
			t.Errorf("column %s of node 1: %v (%v), want %v", column, got, err, want)
		}
	}
	if s.Limits[0].Margin >= 0 {
		t.Error("the test wants a limit that is exceeded")
	}
	style, _ := f.GetCellStyle("Summary", fmt.Sprintf("I%d", row))
	if st, err := f.GetStyle(style); err != nil || !st.Font.Bold || st.Font.Color != red {
		t.Errorf("an exceeded limit does not stand out: %+v (%v)", st, err)
	}
	if got := value(t, f, "Summary", fmt.Sprintf("E%d", row)); got != "" {
		t.Errorf("a value that is no number is written %q", got)
	}
	find(t, f, "Summary", "Warnings: 1")
	find(t, f, "Summary", o.Warnings[0])
	find(t, f, "Summary", "The energy book is closed")
	find(t, f, "Summary", "node 3 (held)")
}

func TestChartDrawsItsLines(t *testing.T) {
	o := outcometest.Run(9, 2400)
	data := written(t, o)
	chart := part(t, data, "xl/charts/chart1.xml")
	if !strings.Contains(chart, "<scatterChart>") {
		t.Fatal("no scatter chart")
	}
	series := strings.Split(chart, "<ser>")[1:]
	near := 2 // fade and vapour lock; paint is far above the scale
	if len(series) != 9+near {
		t.Fatalf("%d series, want %d", len(series), 9+near)
	}
	looks := map[string]bool{}
	for i, s := range series {
		from := strings.Index(s, "<a:ln ")
		to := strings.Index(s, "</a:ln>")
		if from < 0 || to < from || !strings.Contains(s[from:to], "<a:solidFill><a:srgbClr") || strings.Contains(s[from:to], "noFill") {
			t.Errorf("series %d draws no line: %.300s", i, s)
			continue
		}
		if i < 9 {
			looks[s[from:to]] = true
		} else if !strings.Contains(s[from:to], "C00000") || !strings.Contains(s[from:to], "sysDash") {
			t.Errorf("limit %d is not dashed red: %s", i, s[from:to])
		}
	}
	if len(looks) != 9 {
		t.Errorf("9 nodes are drawn in %d ways", len(looks))
	}
	for _, want := range []string{"time [min]", "temperature [degC]", `rot="-5400000"`} {
		if !strings.Contains(chart, want) {
			t.Errorf("the chart lacks %q", want)
		}
	}
	if strings.Contains(chart, `rot="0" spcFirstLastPara="false"></a:bodyPr><a:p></a:p></txPr></title>`) {
		t.Error("an axis title is laid flat in some readers")
	}
	chartDataHoldsThePeaks(t, opened(t, data))
}

func chartDataHoldsThePeaks(t *testing.T, f *excelize.File) {
	rows, err := f.GetCols("Chart data", excelize.Options{RawCellValue: true})
	if err != nil {
		t.Fatal(err)
	}
	for i := range 8 {
		high, want := math.Inf(-1), 0.0
		want, _ = outcometest.Peak(9, i, 2400)
		column := rows[2*i+1]
		if len(column) > 2*chartBuckets+dataHead+3 {
			t.Errorf("the chart of node %d has %d rows", i+1, len(column))
		}
		for _, text := range column[dataHead:] {
			var v float64
			if _, err := fmt.Sscan(text, &v); err == nil {
				high = math.Max(high, v)
			}
		}
		if math.Abs(high-(want-273.15)) > 1e-9 {
			t.Errorf("highest of node %d in the chart is %v, want %v", i+1, high, want-273.15)
		}
	}
}

func TestTextStaysText(t *testing.T) {
	const formula = `=HYPERLINK("http://example.org","x")`
	o := outcometest.Run(2, 900)
	inner := o.Series
	o.Series = func(h float64) *record.Series {
		s := inner(h)
		s.Columns[0].Name = formula
		return s
	}
	o.Title, o.Summary[0].Name, o.Book.Nodes[0].Name = formula, formula, "@SUM(A1)"
	o.Warnings = []string{"+1+1", "-1", "\x00 <b>&amp;</b> ]]> \xff"}
	o.Netlist = []byte("=1+1\r\n\t=2\n" + strings.Repeat("x", 40_000))
	data := written(t, o)
	f := opened(t, data)
	for _, at := range [][2]string{{"Summary", "A1"}, {"Temperatures", "B2"}, {"Chart data", "B2"}} {
		if kind, _ := f.GetCellType(at[0], at[1]); kind != excelize.CellTypeInlineString && kind != excelize.CellTypeSharedString {
			t.Errorf("%s of %s is of type %v", at[1], at[0], kind)
		}
		if got := value(t, f, at[0], at[1]); !strings.HasPrefix(got, formula) {
			t.Errorf("%s of %s is %q", at[1], at[0], got)
		}
	}
	row := find(t, f, "Inputs", "Line") + 1
	if got := value(t, f, "Inputs", fmt.Sprintf("B%d", row)) + "|" + value(t, f, "Inputs", fmt.Sprintf("B%d", row+1)); got != "=1+1|    =2" {
		t.Errorf("netlist lines are %q", got)
	}
	if got := value(t, f, "Inputs", fmt.Sprintf("B%d", row+2)); !strings.HasSuffix(got, "(cut)") || len(got) > 32_767 {
		t.Errorf("a line of 40000 characters became %d", len(got))
	}
	for i := 1; i <= 7; i++ {
		if sheet := part(t, data, fmt.Sprintf("xl/worksheets/sheet%d.xml", i)); strings.Contains(sheet, "<f>") {
			t.Errorf("sheet %d holds a formula", i)
		}
	}
}

func TestDoubtsStandOnEverySheet(t *testing.T) {
	o := outcometest.Run(2, 300)
	o.Interrupted, o.Book.Closed = true, false
	f := opened(t, written(t, o))
	for _, sheet := range f.GetSheetList() {
		if sheet == dataSheet {
			continue
		}
		rows, _ := f.GetRows(sheet)
		top := fmt.Sprint(rows[:4])
		if !strings.Contains(top, "NOT CLOSED") || !strings.Contains(top, "interrupted") {
			t.Errorf("%s does not say what is doubtful: %s", sheet, top)
		}
	}
	rows, _ := f.GetRows(summarySheet)
	for _, row := range rows {
		if strings.Contains(fmt.Sprint(row), "book is closed") {
			t.Error("an open book is called closed")
		}
	}
}

func TestTooManyRowsAreRefused(t *testing.T) {
	o := outcometest.Run(2, 2400)
	o.Interval = 0.001
	o.Series = func(float64) *record.Series { t.Error("was sampled"); return nil }
	var out bytes.Buffer
	if err := Write(&out, o); err == nil || out.Len() > 0 {
		t.Errorf("2.4 million rows: error %v, %d bytes", err, out.Len())
	}
}

func TestOddRuns(t *testing.T) {
	empty := &outcome.Run{Series: func(float64) *record.Series { return nil }}
	many := outcometest.Run(45, 700)
	for name, o := range map[string]*outcome.Run{"empty": empty, "one node": outcometest.Run(1, 1e-3), "many": many, "no length": outcometest.Run(2, 0)} {
		if f := opened(t, written(t, o)); len(f.GetSheetList()) != 7 {
			t.Errorf("%s: sheets %q", name, f.GetSheetList())
		}
	}
}

func TestSameRunSameBytes(t *testing.T) {
	a, b := written(t, outcometest.Run(5, 900)), written(t, outcometest.Run(5, 900))
	if !bytes.Equal(a, b) {
		t.Error("two files of one run differ")
	}
}

func BenchmarkWrite(b *testing.B) {
	o := outcometest.Run(12, 1998)
	o.Interval = 1
	for b.Loop() {
		if err := Write(io.Discard, o); err != nil {
			b.Fatal(err)
		}
	}
}

// A wide table has its formats in the cells; one that is too wide for the file format is refused.
func TestWideTables(t *testing.T) {
	at := func(columns int) *outcome.Run {
		return &outcome.Run{End: 1, Series: func(float64) *record.Series {
			s := &record.Series{Time: []float64{0, 1}}
			for i := range columns {
				s.Columns = append(s.Columns, record.Column{Name: fmt.Sprint("n", i), Want: unit.Temperature, Values: []float64{300, 301.25}})
			}
			return s
		}}
	}
	f := opened(t, written(t, at(wide+1)))
	if got, _ := f.GetCellValue(tempSheet, "C4"); got != "28.1" {
		t.Errorf("shown as %q, want 28.1", got)
	}
	var none bytes.Buffer
	if err := Write(&none, at(mostCols)); err == nil || !strings.Contains(err.Error(), ".csv") {
		t.Errorf("got %v, want a refusal", err)
	}
}
