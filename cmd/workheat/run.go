package main

import (
	"context"
	"fmt"
	"path/filepath"
	"strings"
	"time"

	"github.com/spf13/cobra"

	"workheat/cmd/cpu"
	"workheat/network"
	"workheat/network/diag"
	"workheat/network/export"
	"workheat/network/unit"
)

type runOptions struct {
	files     []string
	every     string
	rel       float64
	json      bool
	tolerance bool
	strict    bool
	quiet     bool
	book      bool
}

func newRun(e env) *cobra.Command {
	var opt runOptions
	c := &cobra.Command{
		Use:   "run NETLIST",
		Short: "run the duty: temperatures, margins, where the heat goes, the energy book",
		Long: `run goes through the duty of a netlist and prints, for every node, where it starts, its
highest temperature and when, its lowest after the first peak, its end, and how it
stands to its limits; then the top heat paths and the energy book.

Exit codes: 0 fine; 1 with --strict: a limit is exceeded or the book does not close;
2 the netlist or the command line has problems; 3 the numbers failed; 130 interrupted
(what was recorded is printed and written).`,
		Example: `  workheat run examples/car-front-corner/netlist.json
  workheat run netlist.json -o run.csv -o run.xlsx -o run.png --every 0.5s`,
		Args: oneNetlist,
	}
	f := c.Flags()
	f.StringArrayVarP(&opt.files, "output", "o", nil, "write a file, by the end of its name "+export.Suffixes()+"; may be given again")
	f.StringVar(&opt.every, "every", "", "interval of the samples in files, such as 0.5s")
	f.Float64Var(&opt.rel, "relative", 0, "relative tolerance, in place of the netlist's")
	f.BoolVar(&opt.json, "json", false, "print one JSON object instead of tables")
	f.BoolVar(&opt.book, "book", false, "print the whole energy book, line by line")
	f.BoolVar(&opt.tolerance, "tolerance-check", false, "run again at a tenth of the tolerance and tell how far the peaks move")
	f.BoolVar(&opt.strict, "strict", false, "exit with 1 if a limit is exceeded or the book does not close")
	f.BoolVarP(&opt.quiet, "quiet", "q", false, "no progress, no notes on standard error")
	c.RunE = func(c *cobra.Command, args []string) error { return run(c.Context(), e, args[0], opt) }
	return c
}

// run loads, runs, prints and writes.
func run(ctx context.Context, e env, name string, opt runOptions) error {
	every, err := opt.check()
	if err != nil {
		return err
	}
	model, src, err := load(ctx, e, name)
	if err != nil {
		return err
	}
	if err := src.checkOutputs(opt.files); err != nil {
		return err
	}
	before := cpu.Seconds()
	progress, end := progressTo(e, opt.quiet)
	res := model.Run(ctx, network.Options{Rel: opt.rel, Audit: true, Tolerance: opt.tolerance, Progress: progress})
	end()
	used := cpu.Seconds() - before
	if every == 0 {
		every = model.Net.Every
	}
	if err := opt.print(e, name, res, used); err != nil {
		return err
	}
	if err := writeFiles(e, src, opt, res, every); err != nil {
		return err
	}
	return verdict(res, opt.strict)
}

// check looks at the options before anything is read.
func (o *runOptions) check() (every float64, err error) {
	if o.every != "" {
		x, fault := unit.Time.Read(o.every, nil)
		if fault != nil || !(x > 0) {
			return 0, coded{exitProblem, fmt.Sprintf("--every %q is no interval: write a time above zero, such as 0.5s", o.every)}
		}
		every = x
	}
	if o.rel != 0 && !(o.rel >= network.LeastRel && o.rel <= network.MostRel) {
		return 0, coded{exitProblem, fmt.Sprintf("--relative must lie between %g and %g", network.LeastRel, network.MostRel)}
	}
	for _, f := range o.files {
		if _, err := export.ForFile(f); err != nil {
			return 0, coded{exitProblem, err.Error()}
		}
	}
	if o.json && o.book {
		return 0, coded{exitProblem, "--json and --book exclude each other: the JSON object has the whole book"}
	}
	return every, nil
}

func (o *runOptions) print(e env, name string, res *network.Result, used float64) error {
	if o.json {
		return printJSON(e.out, name, res, used)
	}
	printRun(e.out, name, res, o.book)
	return nil
}

// progressTo shows the phase on a terminal once a run takes longer than a moment.
func progressTo(e env, quiet bool) (progress func(t float64, label string), end func()) {
	if quiet || !e.terminal {
		return nil, func() {}
	}
	begin, shown := time.Now(), time.Time{}
	progress = func(t float64, label string) {
		if now := time.Now(); now.Sub(begin) > time.Second && now.Sub(shown) > 200*time.Millisecond {
			shown = now
			fmt.Fprintf(e.err, "\r\x1b[K%s after %.4g s: %s", unit.Time.Format(t, 5), now.Sub(begin).Seconds(), label)
		}
	}
	return progress, func() {
		if !shown.IsZero() {
			fmt.Fprint(e.err, "\r\x1b[K")
		}
	}
}

// writeFiles writes every file that was asked for, also when one of them cannot be written.
func writeFiles(e env, src *source, opt runOptions, res *network.Result, every float64) error {
	if len(opt.files) == 0 {
		return nil
	}
	o := &export.Outcome{
		Title: title(res, src.name), Source: filepath.Base(src.name), Netlist: src.text, Program: "workheat " + version,
		Summary: res.Summary, Interval: every, End: res.End, Book: res.Book, Warnings: allWarnings(res),
		Caution: network.Caution, Interrupted: res.Interrupted,
		Settings: [][2]string{
			{"method", res.Method},
			{"relative tolerance", fmt.Sprintf("%g", res.Rel)},
			{"absolute tolerance", unit.TemperatureDifference.Format(res.Abs, 3)},
			{"steps", fmt.Sprint(res.Stats.Steps)},
		},
		Series: res.Series,
	}
	if res.Failure != nil {
		o.Failure = res.Failure.Error()
	}
	var faults []string
	for _, f := range opt.files {
		if err := export.ToFile(f, o); err != nil {
			faults = append(faults, fmt.Sprintf("writing %s: %s", f, diag.Reason(err)))
			continue
		}
		if !opt.quiet {
			fmt.Fprintf(e.err, "wrote %s\n", printable(f))
		}
	}
	if faults != nil {
		return coded{exitProblem, strings.Join(faults, "\nworkheat: ")}
	}
	return nil
}

// title is the netlist's title, or its file's name.
func title(res *network.Result, name string) string {
	if t := res.Model.Net.Title; t != "" {
		return t
	}
	return printable(filepath.Base(name))
}

// allWarnings joins the netlist's warnings and the run's.
func allWarnings(res *network.Result) []string {
	var all []string
	for _, p := range res.Model.Warnings {
		all = append(all, p.Text)
	}
	return append(all, res.Warnings...)
}

// verdict turns the result into an exit code.
func verdict(res *network.Result, strict bool) error {
	switch {
	case res.Interrupted:
		return coded{exitInterrupted, "interrupted; what was recorded until then is above"}
	case res.Failure != nil:
		return coded{exitFailed, "the numbers failed: " + res.Failure.Error()}
	case strict && res.Book != nil && !res.Book.Closed:
		return coded{exitLimit, "the energy book does not close"}
	case strict && exceeded(res) > 0:
		return coded{exitLimit, fmt.Sprintf("limits exceeded: %d", exceeded(res))}
	}
	return nil
}

// exceeded counts the limits that were passed.
func exceeded(res *network.Result) int {
	n := 0
	for _, s := range res.Summary {
		for _, l := range s.Limits {
			if l.Margin < 0 {
				n++
			}
		}
	}
	return n
}
