package xlsx

import (
	"math"
	"strings"

	"github.com/xuri/excelize/v2"
)

// Named styles; every other name is a number format.
const (
	styleNone       = ""
	styleTitle      = "title"
	styleCaution    = "caution"
	styleAside      = "aside"
	styleAlarm      = "alarm"
	styleAlarmAside = "alarm aside"
	styleGood       = "good"
	styleHead       = "head"
	styleSection    = "section"
	styleIndented   = "indented"
	styleWrapped    = "wrapped"
	styleCode       = "code"
	styleLine       = "line"
	styleExceeded   = "exceeded"
)

// Number formats.
const (
	formatTenth  = "0.0"
	formatKilo   = "#,##0.000"
	formatTiny   = "0.0E+00"
	formatShare  = "0.0%"
	formatCount  = "0"
	formatMetres = "#,##0.0"
)

const (
	face     = "Calibri"
	ink      = "222222"
	pale     = "E8EDF2"
	red      = "B00020"
	palePink = "FCE4E4"
	green    = "1B5E20"
	paleMint = "E3F2E4"
	grey     = "555555"
)

// style returns the number of a style of the file, made when it is first asked for; zero is the plain one.
func (b *book) style(name string) int {
	if name == styleNone {
		return 0
	}
	id, ok := b.styles[name]
	if !ok {
		var err error
		if id, err = b.file.NewStyle(styleOf(name)); err != nil {
			panic("xlsx: style " + name + ": " + err.Error())
		}
		b.styles[name] = id
	}
	return id
}

func styleOf(name string) *excelize.Style {
	fill := func(c string) excelize.Fill {
		return excelize.Fill{Type: "pattern", Pattern: 1, Color: []string{c}}
	}
	wrap := &excelize.Alignment{WrapText: true, Vertical: "top"}
	switch name {
	case styleTitle:
		return &excelize.Style{Font: &excelize.Font{Family: face, Bold: true, Size: 14, Color: ink}}
	case styleCaution:
		return &excelize.Style{Font: &excelize.Font{Family: face, Italic: true, Color: grey}, Alignment: wrap}
	case styleAside:
		return &excelize.Style{Font: &excelize.Font{Family: face, Italic: true, Color: grey}}
	case styleAlarm:
		return &excelize.Style{Font: &excelize.Font{Family: face, Bold: true, Color: red}, Fill: fill(palePink), Alignment: wrap}
	case styleAlarmAside:
		return &excelize.Style{Font: &excelize.Font{Family: face, Bold: true, Color: red}}
	case styleGood:
		return &excelize.Style{Font: &excelize.Font{Family: face, Color: green}, Fill: fill(paleMint), Alignment: wrap}
	case styleHead:
		return &excelize.Style{
			Font: &excelize.Font{Family: face, Bold: true, Color: ink}, Fill: fill(pale),
			Border:    []excelize.Border{{Type: "bottom", Color: grey, Style: 1}},
			Alignment: &excelize.Alignment{WrapText: true, Vertical: "center", Horizontal: "center"},
		}
	case styleSection:
		return &excelize.Style{Font: &excelize.Font{Family: face, Bold: true, Size: 12, Color: ink}}
	case styleIndented:
		return &excelize.Style{Alignment: &excelize.Alignment{Indent: 1, Horizontal: "left"}}
	case styleWrapped:
		return &excelize.Style{Alignment: wrap}
	case styleCode:
		return &excelize.Style{Font: &excelize.Font{Family: "Courier New", Size: 9}, Alignment: wrap}
	case styleLine:
		format := formatCount
		return &excelize.Style{
			Font:      &excelize.Font{Family: face, Size: 9, Color: grey},
			Alignment: &excelize.Alignment{Horizontal: "left", Vertical: "top"}, CustomNumFmt: &format,
		}
	case styleExceeded:
		format := formatTenth
		return &excelize.Style{Font: &excelize.Font{Family: face, Bold: true, Color: red}, Fill: fill(palePink), CustomNumFmt: &format}
	}
	return &excelize.Style{CustomNumFmt: &name}
}

// decimals returns the number format with that many decimals.
func decimals(n int) string {
	if n <= 0 {
		return "0"
	}
	return "0." + strings.Repeat("0", n)
}

// formatFor returns a number format that shows the largest of some values with about four digits.
func formatFor(values []float64) string {
	most := 0.0
	for _, v := range values {
		if a := math.Abs(v); a > most && !math.IsInf(a, 0) {
			most = a
		}
	}
	if most == 0 {
		return "0"
	}
	return decimals(min(6, max(0, 3-int(math.Floor(math.Log10(most))))))
}
