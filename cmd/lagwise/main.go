// Command lagwise judges requests for correlations and regressions of measured
// series on the data that they name: as a language server in an editor, and
// in batch.
package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"syscall"
)

// version is the version of the program; a release build sets it.
var version = "0.1.0"

// The exit statuses.
const (
	exitFine        = 0
	exitHeld        = 1 // something at or above hold-at, or something not computed
	exitFailed      = 2 // what was asked could not be done
	exitInterrupted = 130
)

// streams are the standard streams of the process.
type streams struct {
	in       io.Reader
	out, err io.Writer
}

// command is one word after lagwise.
type command struct {
	name, usage, does string
	run               func(context.Context, streams, []string) (int, error)
}

func commands() []command {
	return []command{
		{"attend", "attend", "the language server, on standard input and output", attend},
		{"review", "review [PATH…]", "every finding in the documents", review},
		{"amend", "amend PATH…", "applies the preferred rewrites; with --show, prints the difference and writes nothing", amend},
		{"compute", "compute [PATH…]", "each request's result on levels, as written, and as recommended", compute},
		{"screen", "screen [PATH…]", "each series: spacing, tests, verdict; takes manifests and bare data files", screen},
		{"grounds", "grounds [WORD]", "the catalogue of rules; one rule's page; one term", grounds},
	}
}

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	os.Exit(run(ctx, streams{os.Stdin, os.Stdout, os.Stderr}, os.Args[1:]))
}

// usageError is an error in the words of the command line; help follows it.
type usageError struct{ message string }

func (u *usageError) Error() string { return u.message }

func run(ctx context.Context, s streams, args []string) int {
	if len(args) == 0 || args[0] == "--help" || args[0] == "-h" || args[0] == "help" {
		help(s.out)
		return exitFine
	}
	if args[0] == "--version" {
		fmt.Fprintln(s.out, "lagwise", version)
		return exitFine
	}
	for _, c := range commands() {
		if c.name == args[0] {
			return c.execute(ctx, s, args[1:])
		}
	}
	fmt.Fprintf(s.err, "lagwise: there is no command %q; lagwise --help lists them\n", args[0])
	return exitFailed
}

func (c command) execute(ctx context.Context, s streams, args []string) int {
	status, err := c.run(ctx, s, args)
	switch {
	case ctx.Err() != nil:
		return exitInterrupted
	case errors.Is(err, errHelp):
		return exitFine
	case err != nil:
		fmt.Fprintf(s.err, "lagwise %s: %v\n", c.name, err)
		var usage *usageError
		if errors.As(err, &usage) {
			fmt.Fprintf(s.err, "use: lagwise %s; lagwise %s --help lists the options\n", c.usage, c.name)
		}
		return exitFailed
	}
	return status
}

func help(w io.Writer) {
	fmt.Fprintln(w, "lagwise judges requests for correlations and regressions of measured series on the data that they name.")
	fmt.Fprintln(w)
	for _, c := range commands() {
		fmt.Fprintf(w, "  lagwise %-18s %s\n", c.usage, c.does)
	}
	fmt.Fprintln(w)
	fmt.Fprintln(w, "PATHs are documents or folders; none: the current folder. lagwise COMMAND --help lists its options.")
	fmt.Fprintln(w, "What it says supports, and does not replace, a qualified review and the rules in force.")
}
