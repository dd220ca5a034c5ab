// Command loopwright draws, solves and shares control circuits.
package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"syscall"

	"github.com/alecthomas/kong"
)

// The exit codes.
const (
	done     = 0
	unsolved = 1 // a case has no solution
	unusable = 2 // the command or the sheet cannot be used
)

// commands are the sub-commands, each in a file of its own.
type commands struct {
	Serve   serveCommand   `cmd:"" help:"Serve the editor to browsers."`
	Solve   solveCommand   `cmd:"" help:"Solve a sheet and write readings, mesh currents and equations."`
	Version versionCommand `cmd:"" help:"Say which version this is."`
}

// streams are what a command reads from and writes to.
type streams struct {
	in       io.Reader
	out, err io.Writer
}

// exit is an error that says with which code the program ends. Without a message nothing is said.
type exit struct {
	code    int
	message string
}

func (e *exit) Error() string { return e.message }

func main() {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	code := run(ctx, os.Args[1:], streams{os.Stdin, os.Stdout, os.Stderr})
	stop()
	os.Exit(code)
}

// run is the program: it takes the arguments and gives the exit code. Whatever goes wrong is told in one line.
func run(ctx context.Context, arguments []string, s streams) int {
	var chosen commands
	ended := false
	parser, err := kong.New(&chosen, kong.Name("loopwright"), kong.Writers(s.out, s.err),
		kong.Description("Draw a control circuit, see it solved by mesh analysis, share it, take it to the bench."),
		kong.Exit(func(int) { ended = true }), kong.BindTo(ctx, (*context.Context)(nil)), kong.Bind(s))
	if err != nil {
		return s.fail(err)
	}
	parsed, err := parser.Parse(arguments)
	if ended {
		return done // help was asked for and given
	}
	if err != nil {
		return s.fail(fmt.Errorf("%w; see loopwright --help", err))
	}
	return s.fail(parsed.Run())
}

// fail tells what went wrong and gives the exit code for it.
func (s streams) fail(err error) int {
	if err == nil {
		return done
	}
	code := unusable
	var known *exit
	if errors.As(err, &known) {
		code = known.code
	}
	if message := err.Error(); message != "" {
		fmt.Fprintln(s.err, "loopwright: "+message)
	}
	return code
}
