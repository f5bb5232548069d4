package plot

import (
	"image/color"
	"strings"

	gplot "gonum.org/v1/plot"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/text"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
)

// Colours. Red is for limits alone and grey for what stands back; curves take neither.
var (
	ink     = color.RGBA{0x22, 0x22, 0x22, 0xff}
	quiet   = color.RGBA{0x66, 0x66, 0x66, 0xff}
	heldInk = color.RGBA{0x9a, 0x9a, 0x9a, 0xff}
	grid    = color.RGBA{0xe3, 0xe3, 0xe3, 0xff}
	band    = color.RGBA{0xf3, 0xf5, 0xf8, 0xff}
	edge    = color.RGBA{0xb8, 0xc0, 0xca, 0xff}
	red     = color.RGBA{0xc0, 0x00, 0x00, 0xff}
	veil    = color.NRGBA{0xff, 0xff, 0xff, 0xd8}

	inks = []color.Color{
		color.RGBA{0x1f, 0x5f, 0xa8, 0xff},
		color.RGBA{0xd9, 0x82, 0x00, 0xff},
		color.RGBA{0x1a, 0x8f, 0x6b, 0xff},
		color.RGBA{0x8a, 0x4f, 0xa3, 0xff},
		color.RGBA{0x4a, 0xa3, 0xd9, 0xff},
		color.RGBA{0x7a, 0x4a, 0x2b, 0xff},
		color.RGBA{0x22, 0x22, 0x22, 0xff},
		color.RGBA{0x8a, 0x8a, 0x00, 0xff},
	}
	dashes = [][]vg.Length{
		nil, {6, 2.5}, {1.6, 1.6}, {7, 2, 1.5, 2}, {11, 3}, {9, 2, 1.5, 2, 1.5, 2},
	}
	limitDash = []vg.Length{4, 2.5}
)

// lineStyle returns how the k-th curve that is not held is drawn. Colour and dash together repeat after 24,
// so the dash moves on by one there.
func lineStyle(k int) draw.LineStyle {
	return draw.LineStyle{
		Color:  inks[k%len(inks)],
		Width:  1.3,
		Dashes: dashes[(k+k/(3*len(inks)))%len(dashes)],
	}
}

// write returns a text style in the sans font.
func write(size vg.Length, c color.Color, x text.XAlignment, y text.YAlignment) text.Style {
	return text.Style{
		Color: c, XAlign: x, YAlign: y, Handler: gplot.DefaultTextHandler,
		Font: font.Font{Typeface: "Liberation", Variant: "Sans", Size: size},
	}
}

// boldWeight is bold on the scale of the font library, where zero is normal.
const boldWeight = 3

func bold(s text.Style) text.Style {
	s.Font.Weight = boldWeight
	return s
}

// clip shortens a line of text so that it is no wider than width.
func clip(s text.Style, line string, width vg.Length) string {
	if s.Width(line) <= width {
		return line
	}
	runes := []rune(line)
	low, high := 0, len(runes) // runes[:low] fits with the mark, runes[:high] does not
	for high-low > 1 {
		if m := (low + high) / 2; s.Width(string(runes[:m])+"…") <= width {
			low = m
		} else {
			high = m
		}
	}
	if low == 0 {
		return ""
	}
	return strings.TrimRight(string(runes[:low]), " ") + "…"
}
