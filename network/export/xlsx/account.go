package xlsx

import (
	"math"

	"workheat/network/energy"
	"workheat/network/unit"
)

// accountColumns is how many columns the energy book takes.
const accountColumns = 8

// account writes the energy book, one section for each of its lists.
func (b *book) account() error {
	widths := []float64{34, 18, 18, 18, 18, 16, 16, 100}
	out := b.open(energySheet, 3+len(b.Doubts()), widths, nil)
	out.line("Energy book", styleTitle, accountColumns, lineChars)
	out.notices(accountColumns, lineChars)
	if b.Book == nil {
		out.line("No energy book was kept of this run.", styleWrapped, accountColumns, lineChars)
		return out.close()
	}
	if b.Book.Closed {
		out.line(b.Verdict(), styleGood, accountColumns, lineChars)
	} else {
		out.add()
	}
	l := ledger{out, b.Book, unit.NewWant("energy", "kJ")}
	l.totals()
	l.nodes()
	l.paths()
	l.dissipators()
	l.vehicle()
	l.checks()
	return out.close()
}

// A ledger writes the sections of a book: energies in kJ, gaps in J.
type ledger struct {
	*sheet
	book *energy.Book
	kilo unit.Want
}

func (l *ledger) section(title string, heads ...string) {
	l.add()
	l.add(l.text(title, styleSection))
	l.heads(heads...)
}

func (l *ledger) energy(joule float64) any { return l.number(l.kilo.Show(joule), formatKilo) }
func (l *ledger) gap(joule float64) any    { return l.number(joule, formatTiny) }
func (l *ledger) plain(text string) any    { return l.text(text, styleNone) }
func (l *ledger) after(text string) any    { return l.text(text, styleIndented) } // of a number

func (l *ledger) totals() {
	l.section("Totals", "Account", "Energy [kJ]", "Gap [J]")
	l.add(l.plain("work turned into heat"), l.energy(l.book.WorkIn))
	l.add(l.plain("heat in"), l.energy(l.book.HeatIn))
	l.add(l.plain("heat out"), l.energy(l.book.HeatOut))
	l.add(l.plain("gain of stored energy"), l.energy(l.book.Stored))
	l.add(l.plain("throughput"), l.energy(l.book.Throughput))
	l.add(l.plain("missing by the ledger"), nil, l.gap(l.book.LedgerGap))
	l.add(l.plain("missing by the recount"), nil, l.gap(l.book.IndependentGap))
}

func (l *ledger) nodes() {
	l.section("Nodes", "Node", "Heat in on balance [kJ]", "Gain of stored energy [kJ]", "Gap by the ledger [J]", "Gap by the recount [J]", "Kind")
	for _, n := range l.book.Nodes {
		kind, stored := "free", l.energy(n.Stored)
		if n.Held {
			kind, stored = "held", nil
		}
		l.add(l.plain(n.Name), l.energy(n.Net), stored, l.gap(n.Gap), l.gap(n.Recount), l.after(kind))
	}
}

func (l *ledger) paths() {
	l.section("Heat paths", "Element", "Path", "Kind", "From", "To", "Heat on balance [kJ]", "Share of throughput")
	for _, p := range l.book.Paths {
		l.add(l.plain(p.Element), l.plain(p.Path), l.plain(p.Kind), l.plain(p.From), l.plain(p.To),
			l.energy(p.Net), l.number(math.Abs(p.Net)/l.book.Throughput, formatShare))
	}
}

func (l *ledger) dissipators() {
	if len(l.book.Dissipators) == 0 {
		return
	}
	l.section("Dissipators", "Dissipator", "Work taken [kJ]", "Heat given [kJ]", "By the vehicle's account [kJ]", "Gap [J]")
	for _, d := range l.book.Dissipators {
		l.add(l.plain(d.Name), l.energy(d.Work), l.energy(d.Heat), l.energy(d.Expected), l.gap(d.Gap))
	}
}

func (l *ledger) vehicle() {
	v := l.book.Vehicle
	if v == nil {
		return
	}
	l.section("Vehicle: "+v.Name, "Account", "Energy [kJ]", "Distance [m]")
	l.add(l.plain("way"), nil, l.number(v.Distance, formatMetres))
	l.add(l.plain("drive"), l.energy(v.Drive))
	l.add(l.plain("gain of kinetic energy"), l.energy(v.Kinetic))
	l.add(l.plain("climb"), l.energy(v.Climb))
	l.add(l.plain("rolling resistance"), l.energy(v.Rolling))
	l.add(l.plain("air resistance"), l.energy(v.Air))
	l.add(l.plain("braking"), l.energy(v.Brake))
	l.add(l.plain("of it by the dissipators"), l.energy(v.Modelled))
}

func (l *ledger) checks() {
	l.section("Checks", "Check", "Layer", "Gap", "Allowed", "Unit", "Verdict", "Where", "What it compares")
	for _, c := range l.book.Checks {
		verdict := l.text("passed", styleGood)
		if !c.Passed {
			verdict = l.text("FAILED", styleAlarm)
		}
		const chars = 95 // of the last column
		height := 0.0
		if lines := 1 + len([]rune(c.About))/chars; lines > 1 {
			height = 14.5 * float64(lines)
		}
		l.addHigh(height, l.plain(c.Name), l.number(float64(c.Layer), formatCount), l.gap(c.Gap), l.gap(c.Allowed),
			l.after(c.Unit), verdict, l.plain(c.Where), l.text(c.About, styleWrapped))
	}
}
