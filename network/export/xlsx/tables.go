package xlsx

import (
	"fmt"
	"math"

	"github.com/xuri/excelize/v2"

	"workheat/network/export/outcome"
	"workheat/network/record"
	"workheat/network/unit"
)

// temperatures writes the samples of all nodes.
func (b *book) temperatures(s *record.Series) error {
	return b.table(tempSheet, s, func(g record.Group) bool { return g == record.Temperatures })
}

// flows writes the samples of all paths, then those of the vehicle.
func (b *book) flows(s *record.Series) error {
	return b.table(flowSheet, s, func(g record.Group) bool { return g != record.Temperatures })
}

// wide is the number of columns from which on the cells carry their formats themselves: the writer seeks the column of
// each cell among those that have a format or a width, and its time would grow with the square of their number.
const wide = 200

// table writes time and the columns of the groups that are taken.
func (b *book) table(name string, s *record.Series, take func(record.Group) bool) error {
	heads := []string{outcome.Head("time", unit.Time)}
	styles := []string{decimals(b.timeDecimals(s.Time))}
	columns := [][]float64{s.Time}
	scales := []unit.Scale{unit.Time.Shown()}
	for i := range s.Columns {
		c := &s.Columns[i]
		if !take(c.Group) {
			continue
		}
		scale := c.Want.Shown()
		format := formatTenth
		if c.Group != record.Temperatures {
			format = formatFor(shown(scale, c.Values))
		}
		heads, styles = append(heads, outcome.Head(c.Name, c.Want)), append(styles, format)
		columns, scales = append(columns, c.Values), append(scales, scale)
	}
	if len(heads) > mostCols {
		return fmt.Errorf("the sheet %q would need %d columns, and the most is %d: write .csv instead", name, len(heads), mostCols)
	}
	var ids []int // of the cells; nil: the columns have the formats
	widths := widthsFor(heads)
	if len(heads) > wide {
		for _, format := range styles {
			ids = append(ids, b.style(format))
		}
		widths, styles = nil, nil
	}
	out := b.open(name, headRows, widths, styles)
	out.notice()
	out.heads(heads...)
	cells := make([]any, len(columns))
	for i := range s.Time {
		for k, values := range columns {
			cells[k] = nil
			if v := scales[k].Show(values[i]); !math.IsNaN(v) && !math.IsInf(v, 0) {
				cells[k] = v
				if ids != nil {
					cells[k] = excelize.Cell{StyleID: ids[k], Value: v}
				}
			}
		}
		out.add(cells...)
	}
	return out.close()
}

func shown(scale unit.Scale, values []float64) []float64 {
	out := make([]float64, len(values))
	for i, v := range values {
		out[i] = scale.Show(v)
	}
	return out
}

// timeDecimals returns how many decimals the times need; the last step may be a shorter one.
func (b *book) timeDecimals(t []float64) int {
	if len(t) < 3 {
		return 3
	}
	return outcome.Decimals(t[1] - t[0])
}

// widthsFor returns column widths under which a header wraps to two lines, within reason.
func widthsFor(heads []string) []float64 {
	widths := make([]float64, len(heads))
	for i, h := range heads {
		widths[i] = math.Min(24, math.Max(10, 3+0.62*float64(len([]rune(h)))))
	}
	return widths
}
