// Command tailgap finds out how far a normal curve's percentages are from
// the people who were counted: flags in, core/ask, words out.
package main

import (
	"context"
	"errors"
	"fmt"
	"io"
	"os"
	"os/signal"
	"runtime/debug"
	"syscall"

	"tailgap/core/ask"
	"tailgap/core/sample"
	"tailgap/web"
)

// program is one run of the command: the streams it talks to and the work it
// hands on, so that a test can put its own in their place.
type program struct {
	stdin          io.Reader
	stdout, stderr io.Writer
	judge          func(context.Context, ask.Question, sample.Sample, ask.Progress) (ask.Answer, error)
	page           func() ([]byte, error)
	terminal       func(stream any) bool // that a person looks at
	unwritten      error                 // of help, which can't return it
}

func main() { os.Exit(run(os.Args[1:], os.Stdin, os.Stdout, os.Stderr)) }

// run does what the arguments say and returns the exit status. Ctrl-C stops
// the work; a second one ends the process at once.
func run(args []string, stdin io.Reader, stdout, stderr io.Writer) int {
	ctx, stop := signal.NotifyContext(context.Background(), os.Interrupt, syscall.SIGTERM)
	defer stop()
	context.AfterFunc(ctx, stop)
	p := &program{stdin: stdin, stdout: stdout, stderr: stderr, judge: ask.Judge, page: web.Page, terminal: terminal}
	return p.run(ctx, args)
}

func (p *program) run(ctx context.Context, args []string) (status int) {
	defer func() {
		if cause := recover(); cause != nil {
			fmt.Fprintf(p.stderr, "tailgap: a fault in the program stopped it, so there is no answer: %v\n", cause)
			fmt.Fprintf(p.stderr, "tailgap: the fault was met here:\n%s", debug.Stack())
			status = statusFailure
		}
	}()
	root := p.root()
	root.SetArgs(append([]string{}, args...)) // nil would mean the arguments of the process
	err := root.ExecuteContext(ctx)
	return p.report(errors.Join(err, p.unwritten))
}
