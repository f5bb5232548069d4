package main

import (
	"fmt"
	"io"
	"math"
	"strings"

	"github.com/spf13/cobra"

	"workheat/library"
	"workheat/network/diag"
	"workheat/network/element"
	"workheat/network/unit"
)

func newCatalogue(e env) *cobra.Command {
	c := &cobra.Command{
		Use:   "catalogue [KIND or MATERIAL]",
		Short: "what may be written in a netlist: kinds, keys, units, ranges, sources",
		Long: `catalogue lists the kinds of elements and the materials. With a name it shows that one:
its keys with units, ranges and defaults, its law and source; or the property table.

Exit codes: 0 fine; 2 no such kind or material.`,
		Example: "  workheat catalogue convection\n  workheat catalogue \"grey iron\"",
		Args: func(c *cobra.Command, args []string) error {
			if len(args) > 1 {
				return fmt.Errorf("catalogue takes one name; write a name of several words in quotes: %q", strings.Join(args, " "))
			}
			return nil
		},
	}
	c.RunE = func(c *cobra.Command, args []string) error {
		cat := library.Catalogue()
		if len(args) == 0 {
			printCatalogue(e.out, cat)
			return nil
		}
		return printEntry(e.out, cat, args[0])
	}
	return c
}

// printCatalogue prints the list of all kinds and materials.
func printCatalogue(w io.Writer, cat *element.Catalogue) {
	for _, section := range element.Sections {
		fmt.Fprintf(w, "%s\n", section)
		for _, name := range cat.Names(section) {
			fmt.Fprintln(w, wrap("  "+name+": "+cat.Find(section, name).About, 6))
		}
		fmt.Fprintln(w)
	}
	fmt.Fprintln(w, "materials")
	for _, m := range cat.Materials {
		fmt.Fprintln(w, wrap("  "+m.Name+": "+m.About, 6))
	}
	fmt.Fprintln(w, "\nNodes, duty and quantities: see README.md. One entry: workheat catalogue NAME")
}

// printEntry prints one kind or material.
func printEntry(w io.Writer, cat *element.Catalogue, name string) error {
	found := false
	known := cat.MaterialNames()
	for _, k := range cat.Kinds {
		known = append(known, k.Name)
		if k.Name == name {
			printKind(w, k)
			found = true
		}
	}
	if m := cat.Material(name); m != nil {
		printMaterial(w, m)
		found = true
	}
	if found {
		return nil
	}
	text := fmt.Sprintf("the catalogue has no %q", name)
	switch near, with := diag.Nearest(name, known), containing(known, name); {
	case near != "":
		text += fmt.Sprintf(": did you mean %q?", near)
	case len(with) > 0:
		text += "; near to it: " + strings.Join(with, ", ")
	default:
		text += "; workheat catalogue lists all"
	}
	return coded{exitProblem, text}
}

// containing returns the names that contain a word.
func containing(names []string, word string) []string {
	var list []string
	for _, n := range names {
		if strings.Contains(n, strings.ToLower(word)) {
			list = append(list, n)
		}
	}
	return list
}

func printKind(w io.Writer, k *element.Kind) {
	fmt.Fprintf(w, "%s (under %q)\n", k.Name, k.Section)
	fmt.Fprintln(w, wrap("  "+k.About, 2))
	fmt.Fprintln(w, wrap("  law: "+k.Formula, 7))
	fmt.Fprintln(w, wrap("  source: "+k.Source, 10))
	fmt.Fprintln(w, "  keys:")
	rows := [][]string{{"  \"kind\"", fmt.Sprintf("%q", k.Name), "", ""}}
	for _, f := range k.Fields {
		need := ""
		if f.Required {
			need = "required"
		} else if f.Default != "" {
			need = "default " + f.Default
		}
		rows = append(rows, []string{fmt.Sprintf("  %q", f.Key), form(f), need, f.About})
	}
	columns(w, rows, map[int]bool{0: true, 1: true, 2: true, 3: true})
}

// form words what a field's value looks like.
func form(f element.Field) string {
	text := ""
	switch f.Type {
	case element.Quantity:
		text = f.Want.Unit
	case element.Number:
		text = "number"
	case element.NodePair:
		return "[node, node]"
	case element.Shares:
		return "node, or {node: share}"
	case element.Signal:
		text = f.Want.Unit + " or table in time"
	case element.BodyName:
		return "body"
	case element.MaterialOf:
		return "material"
	case element.Text:
		return "text"
	default:
		return "node"
	}
	return text + rangeOf(f)
}

func rangeOf(f element.Field) string {
	if !f.Bounded {
		return ""
	}
	low := fmt.Sprintf("%.4g", f.Want.Show(f.Min))
	switch {
	case f.Max > math.MaxFloat64/2 && f.Open:
		return ", above " + low
	case f.Max > math.MaxFloat64/2:
		return ", from " + low
	}
	return fmt.Sprintf(", %s to %.4g", low, f.Want.Show(f.Max))
}

func printMaterial(w io.Writer, m *element.Material) {
	fmt.Fprintf(w, "%s (material)\n", m.Name)
	fmt.Fprintln(w, wrap("  "+m.About, 2))
	fmt.Fprintln(w, wrap("  source: "+m.Source, 10))
	if m.Doubtful != "" {
		fmt.Fprintln(w, wrap("  caution: "+m.Doubtful, 11))
	}
	fmt.Fprintf(w, "  range: %s to %s", unit.Temperature.Format(m.Low, 4), unit.Temperature.Format(m.High, 4))
	if m.Density > 0 {
		fmt.Fprintf(w, "; density %s", unit.Density.Format(m.Density, 5))
	}
	fmt.Fprintln(w)
	for _, l := range m.Limits {
		fmt.Fprintln(w, wrap(fmt.Sprintf("  limit: %s %s (%s)", unit.Temperature.Format(l.Temperature, 4), l.Name, l.Source), 9))
	}
	rows := [][]string{{"degC", "c J/(kg K)", "k W/(m K)"}}
	for _, t := range tableRows(m.Low, m.High) {
		k := "-"
		if m.Conductivity != nil {
			k = fmt.Sprintf("%.4g", m.Conductivity.At(t))
		}
		c := "-"
		if m.Capacity != nil {
			c = fmt.Sprintf("%.5g", m.Capacity.At(t))
		}
		rows = append(rows, []string{fmt.Sprintf("%.4g", unit.Temperature.Show(t)), c, k})
	}
	columns(w, rows, nil)
}

// tableRows returns temperatures at round steps over a range, both ends included.
func tableRows(low, high float64) []float64 {
	step := 100.0
	if high-low < 300 {
		step = 20
	}
	rows := []float64{low}
	zero := low - unit.Temperature.Show(low)
	for t := zero + step*math.Ceil(unit.Temperature.Show(low)/step); t < high-1e-6; t += step {
		if t > low+1e-6 {
			rows = append(rows, t)
		}
	}
	return append(rows, high)
}

// wrap breaks a text at about 100 columns, further lines indented.
func wrap(text string, indent int) string {
	const width = 100
	var b strings.Builder
	lead := len(text) - len(strings.TrimLeft(text, " "))
	b.WriteString(text[:lead])
	at := lead
	for i, word := range strings.Fields(text) {
		if at+1+len([]rune(word)) > width {
			b.WriteString("\n" + strings.Repeat(" ", indent))
			at = indent
		} else if i > 0 {
			b.WriteByte(' ')
			at++
		}
		b.WriteString(word)
		at += len([]rune(word))
	}
	return b.String()
}
