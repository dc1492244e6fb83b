package main

import (
	"context"
	"errors"
	"fmt"
	"io/fs"
	"strings"

	"tailgap/core/ask"
	"tailgap/core/words"
)

// The exit statuses.
const (
	statusDone      = 0 // every verdict holds, or none was asked for
	statusFailure   = 1 // the program's own
	statusInput     = 2 // the command line or the data can't be used
	statusFails     = 3 // at least one verdict fails
	statusUnsettled = 4 // none fails, at least one is unsettled
)

// ended is an error that knows its exit status. Without a cause the run went
// well and the status is all there is to say.
type ended struct {
	status int
	cause  error
	hint   string // a command line that helps
}

func (e *ended) Error() string {
	if e.cause == nil {
		return fmt.Sprintf("exit status %d", e.status)
	}
	return e.cause.Error()
}

func (e *ended) Unwrap() error { return e.cause }

// misuse is an error on the command line of the named command.
func misuse(command, format string, values ...any) error {
	return &ended{status: statusInput, cause: fmt.Errorf(format, values...), hint: command + " --help"}
}

// failure is the program's own.
func failure(cause error) error { return &ended{status: statusFailure, cause: cause} }

// report says on stderr what went wrong, if anything did, and returns the
// exit status. An error that says nothing of its status is about the input.
func (p *program) report(err error) int {
	if err == nil {
		return statusDone
	}
	if errors.Is(err, context.Canceled) {
		fmt.Fprintln(p.stderr, "tailgap: stopped before the answer was ready; nothing was written")
		return statusFailure
	}
	end := &ended{status: statusInput, cause: err}
	errors.As(err, &end)
	if end.cause != nil {
		for line := range strings.Lines(end.Error()) {
			fmt.Fprintf(p.stderr, "tailgap: %s\n", words.Line(line))
		}
	}
	if end.hint != "" {
		fmt.Fprintf(p.stderr, "tailgap: more help: %s\n", end.hint)
	}
	return end.status
}

// verdicts turns the answer's verdicts into the way the run ends.
func verdicts(answer ask.Answer) error {
	status := statusDone
	for _, result := range answer.Results {
		for _, finding := range result.Cutoffs {
			switch {
			case finding.Verdict == nil:
			case *finding.Verdict == "fails":
				status = statusFails
			case *finding.Verdict == "unsettled" && status == statusDone:
				status = statusUnsettled
			}
		}
	}
	if status == statusDone {
		return nil
	}
	return &ended{status: status}
}

// reason is what the system says about a file, without the path that the
// message names anyway.
func reason(err error) error {
	var path *fs.PathError
	if errors.As(err, &path) {
		return path.Err
	}
	return err
}
