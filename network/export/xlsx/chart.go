package xlsx

import (
	"bytes"
	"fmt"
	"strings"

	"github.com/xuri/excelize/v2"

	"workheat/network/export/outcome"
	"workheat/network/unit"
)

const (
	chartBuckets = 500 // twice as many points a curve at the most
	chartCurves  = 30
	dataHead     = 3 // rows above the numbers of the chart
)

// Line colours of the curves; red is kept for limits, grey for held nodes. Dashes tell them apart without colour.
var (
	inks   = []string{"1F5FA8", "D98200", "1A8F6B", "8A4FA3", "4AA3D9", "7A4A2B", "222222", "8A8A00"}
	dashes = []excelize.LineDashType{
		excelize.LineDashSolid, excelize.LineDashDash, excelize.LineDashSysDot,
		excelize.LineDashSashDot, excelize.LineDashLgDash, excelize.LineDashLgDashDotDot,
	}
)

// A drawing is the data of the chart: a pair of columns, time and temperature, for each curve and limit.
type drawing struct {
	curves    []outcome.Curve
	near, far []outcome.Line
	left      int
	low, high float64 // K
	time      unit.Want
	level     unit.Want
}

func (b *book) drawing() *drawing {
	d := &drawing{time: outcome.TimeWant(b.End), level: unit.Temperature}
	d.curves, d.left = b.Curves(chartBuckets, chartCurves)
	d.low, d.high, d.near, d.far = outcome.Range(d.curves, outcome.Lines(d.curves))
	if len(d.curves) > 0 {
		d.level = d.curves[0].Want
	}
	return d
}

// chart writes the sheet with the picture.
func (b *book) chart() error {
	if _, err := b.file.NewSheet(chartSheet); err != nil {
		return err
	}
	if err := b.layOut(chartSheet, 0); err != nil {
		return err
	}
	d := b.drawn
	row := 0
	put := func(text, style string) error {
		row++
		at := fmt.Sprintf("A%d", row)
		if err := b.file.SetCellStr(chartSheet, at, cell(text)); err != nil {
			return err
		}
		return b.file.SetCellStyle(chartSheet, at, at, b.style(style))
	}
	if err := put(b.Title, styleTitle); err != nil {
		return err
	}
	if err := put(b.Caution, styleAside); err != nil {
		return err
	}
	for _, text := range b.Doubts() {
		if err := put(text, styleAlarmAside); err != nil {
			return err
		}
	}
	if text := d.remark(); text != "" {
		if err := put(text, styleAside); err != nil {
			return err
		}
	}
	if len(d.curves) == 0 {
		return nil
	}
	if err := b.file.AddChart(chartSheet, fmt.Sprintf("A%d", row+2), b.picture(d)); err != nil {
		return err
	}
	b.straighten()
	return nil
}

// straighten takes an empty text property out of the axis titles of the chart: some readers take its angle,
// zero, for that of the title, and lay the one of the upright axis flat.
func (b *book) straighten() {
	const part = "xl/charts/chart1.xml"
	const empty = `<txPr><a:bodyPr anchorCtr="false" rot="0" spcFirstLastPara="false"></a:bodyPr><a:p></a:p></txPr></title>`
	if xml, ok := b.file.Pkg.Load(part); ok {
		b.file.Pkg.Store(part, bytes.ReplaceAll(xml.([]byte), []byte(empty), []byte("</title>")))
	}
}

// remark says what the picture leaves out.
func (d *drawing) remark() string {
	var parts []string
	if len(d.curves) == 0 {
		parts = append(parts, "Nothing was recorded.")
	}
	if d.left > 0 {
		parts = append(parts, fmt.Sprintf("The %d hottest nodes are drawn, %d more are on the sheet %s.", len(d.curves), d.left, tempSheet))
	}
	for i := range d.far {
		parts = append(parts, fmt.Sprintf("Limit above the scale: %s, %s (%s).", d.far[i].Name, d.level.Format(d.far[i].Temperature, 6), d.far[i].Of()))
	}
	return strings.Join(parts, " ")
}

// picture describes the chart.
func (b *book) picture(d *drawing) *excelize.Chart {
	first, last, step := outcome.Axis(d.level.Show(d.low), d.level.Show(d.high), 10)
	zero, end := 0.0, d.time.Show(b.End)
	chart := &excelize.Chart{
		Type:         excelize.Scatter,
		Dimension:    excelize.ChartDimension{Width: 1120, Height: 560},
		Legend:       excelize.ChartLegend{Position: "right", Font: &excelize.Font{Size: 9, Color: ink}},
		ShowBlanksAs: "gap",
		XAxis:        axis(outcome.Head("time", d.time), outcome.Step(end, 10)),
		YAxis:        axis(outcome.Head("temperature", d.level), step),
	}
	chart.XAxis.Minimum = &zero
	if end > 0 {
		chart.XAxis.Maximum = &end
	}
	chart.YAxis.Minimum, chart.YAxis.Maximum = &first, &last
	for i := range d.curves {
		c := &d.curves[i]
		line := excelize.LineOptions{Type: excelize.LineSolid, Width: 1.5, Dash: dashes[i%len(dashes)]}
		colour := inks[i%len(inks)]
		if c.Held {
			line.Width, line.Dash, colour = 0.75, excelize.LineDashSolid, "9A9A9A"
		}
		chart.Series = append(chart.Series, series(i, len(c.Time), line, colour))
	}
	for i := range d.near {
		line := excelize.LineOptions{Type: excelize.LineSolid, Width: 1.25, Dash: excelize.LineDashSysDash}
		chart.Series = append(chart.Series, series(len(d.curves)+i, 2, line, "C00000"))
	}
	return chart
}

func axis(title string, step float64) excelize.ChartAxis {
	return excelize.ChartAxis{
		MajorGridLines:    true,
		MajorUnit:         step,
		TickLabelPosition: excelize.ChartTickLabelLow,
		Font:              excelize.Font{Color: ink, Size: 10},
		NumFmt:            excelize.ChartNumFmt{CustomNumFmt: decimals(outcome.Decimals(step))},
		Title:             excelize.ChartTitle{Paragraph: []excelize.RichTextRun{{Text: title, Font: &excelize.Font{Bold: true, Size: 11, Color: ink}}}},
	}
}

// series describes the curve of the k-th pair of columns, n points long.
func series(k, n int, line excelize.LineOptions, colour string) excelize.ChartSeries {
	x, y := columnName(2*k+1), columnName(2*k+2)
	last := dataHead + n
	return excelize.ChartSeries{
		Name:       fmt.Sprintf("'%s'!$%s$%d", dataSheet, y, dataHead-1),
		Categories: fmt.Sprintf("'%s'!$%s$%d:$%s$%d", dataSheet, x, dataHead+1, x, last),
		Values:     fmt.Sprintf("'%s'!$%s$%d:$%s$%d", dataSheet, y, dataHead+1, y, last),
		Line:       line,
		Fill:       excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{colour}},
		Marker:     excelize.ChartMarker{Symbol: "none"},
	}
}

func columnName(n int) string {
	name, err := excelize.ColumnNumberToName(n)
	if err != nil {
		panic("xlsx: more columns than a sheet has")
	}
	return name
}

// chartData writes the sheet that the chart draws from.
func (b *book) chartData() error {
	d := b.drawn
	pairs := len(d.curves) + len(d.near)
	names, units := make([]any, 2*pairs), make([]any, 2*pairs)
	styles, widths := make([]string, 2*pairs), make([]float64, 2*pairs)
	rows := 0
	column := make([][]float64, 0, 2*pairs)
	pair := func(name string, time, value []float64) {
		k := len(column)
		names[k], names[k+1] = b.text("", styleHead), b.text(name, styleHead)
		units[k], units[k+1] = b.text(outcome.Head("time", d.time), styleHead), b.text("["+d.level.Unit+"]", styleHead)
		styles[k], styles[k+1] = "0.000", "0.00"
		widths[k], widths[k+1] = 11, 16
		column = append(column, shown(d.time.Shown(), time), shown(d.level.Shown(), value))
		rows = max(rows, len(time))
	}
	for i := range d.curves {
		pair(d.curves[i].Name, d.curves[i].Time, d.curves[i].Value)
	}
	for i := range d.near {
		l := &d.near[i]
		pair(l.Name+" "+d.level.Format(l.Temperature, 6)+" ("+l.Of()+")", []float64{0, b.End}, []float64{l.Temperature, l.Temperature})
	}
	out := b.open(dataSheet, dataHead, widths, styles)
	text := "Thinned for the chart: lowest and highest of each short stretch of time. All samples are on the sheet " + tempSheet + ". "
	out.add(b.text(text+b.Caution, styleAside))
	out.addHigh(44, names...)
	out.add(units...)
	cells := make([]any, len(column))
	for i := range rows {
		for k, values := range column {
			cells[k] = nil
			if i < len(values) {
				cells[k] = values[i]
			}
		}
		out.add(cells...)
	}
	return out.close()
}
