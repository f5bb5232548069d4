package xlsx

import (
	"bytes"
	"fmt"
	"math"
	"strings"
)

// inputs writes the settings and the netlist, line by line.
func (b *book) inputs() error {
	const columns, chars = 2, 125
	out := b.open(inputSheet, 2+len(b.Doubts()), []float64{26, 130}, nil)
	out.line("Inputs: "+b.Source, styleTitle, columns, chars)
	out.notices(columns, chars)
	out.add()
	out.heads("Setting", "Value")
	out.add(b.text("program", styleNone), b.text(b.Program, styleNone))
	for _, s := range b.Settings {
		out.add(b.text(s[0], styleNone), b.text(s[1], styleNone))
	}
	out.add()
	out.heads("Line", "Netlist")
	lines := bytes.Split(bytes.TrimSuffix(b.Netlist, []byte("\n")), []byte("\n"))
	if left := mostRows - out.row; len(lines) > left {
		return fmt.Errorf("the netlist has %d lines, and the sheet has room for %d", len(lines), left)
	}
	for i, line := range lines {
		text := strings.ReplaceAll(strings.TrimSuffix(string(line), "\r"), "\t", "    ")
		rows := (len([]rune(text)) + chars - 1) / chars
		height := 0.0
		if rows > 1 {
			height = math.Min(409, 13*float64(rows))
		}
		out.addHigh(height, b.number(float64(i+1), styleLine), b.text(text, styleCode))
	}
	return out.close()
}
