// Command workheat computes how hot the parts of a brake, clutch or damper get over a duty, and keeps the
// book of where the energy went.
package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"path/filepath"
	"syscall"

	"github.com/spf13/cobra"

	"workheat/network/diag"
)

// version is the version of the program; a release sets it.
var version = "0.1.0"

// The exit codes.
const (
	exitLimit       = 1   // when asked to be strict: a limit is exceeded, the book does not close, the netlist has warnings
	exitProblem     = 2   // the netlist or the command line has problems
	exitFailed      = 3   // the numbers failed
	exitInterrupted = 130 // interrupted; what was recorded is kept
)

// An env is what a command may touch of the world.
type env struct {
	out, err io.Writer
	terminal bool // err is one
	colour   bool // err may be coloured
}

// A coded error ends the program with a code of its own. An empty text prints nothing: all was said.
type coded struct {
	code int
	text string
}

func (c coded) Error() string { return c.text }

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	e := env{out: os.Stdout, err: os.Stderr, terminal: isTerminal(os.Stderr)}
	e.colour = e.terminal && os.Getenv("NO_COLOR") == ""
	context.AfterFunc(ctx, stop) // a second interruption ends the program at once
	code := execute(ctx, e, os.Args[1:])
	stop()
	os.Exit(code)
}

func isTerminal(f *os.File) bool {
	info, err := f.Stat()
	return err == nil && info.Mode()&os.ModeCharDevice != 0
}

// execute runs the command line and returns the exit code.
func execute(ctx context.Context, e env, args []string) int {
	out := &checkedWriter{to: e.out}
	e.out = out
	code := command(ctx, e, args)
	if out.err != nil {
		fmt.Fprintln(e.err, "workheat: writing the output:", diag.Reason(out.err))
		return max(code, exitProblem)
	}
	return code
}

// command runs the command line and reports its error.
func command(ctx context.Context, e env, args []string) int {
	root := newRoot(e)
	root.SetArgs(args)
	root.SetOut(e.out)
	root.SetErr(e.err)
	err := root.ExecuteContext(ctx)
	if err == nil {
		return 0
	}
	var c coded
	if errors.As(err, &c) {
		if c.text != "" {
			fmt.Fprintln(e.err, "workheat:", printable(c.text))
		}
		return c.code
	}
	fmt.Fprintln(e.err, "workheat:", printable(err.Error()))
	if len(args) > 0 && filepath.Ext(args[0]) == ".json" {
		fmt.Fprintln(e.err, "to run a netlist: workheat run", printable(args[0]))
		return exitProblem
	}
	fmt.Fprintln(e.err, "see workheat --help")
	return exitProblem
}

// commands has one row for each command.
var commands = []func(env) *cobra.Command{newRun, newCheck, newCatalogue}

func newRoot(e env) *cobra.Command {
	root := &cobra.Command{
		Use:   "workheat",
		Short: "how hot the parts of a brake, clutch or damper get, and where the energy goes",
		Long: `workheat computes the temperatures of a brake, clutch or damper over its duty from a
netlist in JSON: masses, the conductances between them, and the parts that turn
work into heat. Each run keeps an energy book: every joule that came in as work or
heat is found again, stored somewhere or gone out.

Exit codes: 0 fine; 1 a limit is exceeded or the book does not close (with --strict);
2 the netlist or the command line has problems; 3 the numbers failed; 130 interrupted.`,
		Example:       "  workheat run examples/car-front-corner/netlist.json",
		Version:       version,
		SilenceErrors: true,
		SilenceUsage:  true,
	}
	root.SetVersionTemplate("workheat {{.Version}}\n")
	for _, c := range commands {
		root.AddCommand(c(e))
	}
	return root
}
