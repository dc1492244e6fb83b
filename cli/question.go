package main

import (
	"fmt"
	"os"
	"strconv"
	"strings"

	"github.com/spf13/cobra"

	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/sample"
	"tailgap/core/verdict"
)

// questionFlags collects what the flags change in a question, so that it can
// be done to whatever question the run starts from.
type questionFlags struct {
	cmd     *cobra.Command
	changes []func(*ask.Question)
	group   string
}

// value declares a flag whose value is read by read and put into the question.
func value[T any](f *questionFlags, name, usage string, read func(string) (T, error), put func(*ask.Question, T)) {
	f.cmd.Flags().Func(name, usage, func(text string) error {
		v, err := read(text)
		if err == nil {
			f.changes = append(f.changes, func(q *ask.Question) { put(q, v) })
		}
		return err
	})
	f.mark(name)
}

// list declares a flag that may be given again for more of the same.
func list[T any](f *questionFlags, name, usage string, read func(string) ([]T, error), put func(*ask.Question, []T)) {
	all := []T{}
	value(f, name, usage, func(text string) ([]T, error) {
		more, err := read(text)
		all = append(all, more...)
		return all, err
	}, put)
}

// yes declares a flag that says yes or no.
func yes(f *questionFlags, name, usage string, put func(*ask.Question, bool)) {
	f.cmd.Flags().BoolFunc(name, usage, func(text string) error {
		v, err := strconv.ParseBool(text)
		if err != nil {
			return fmt.Errorf("--%s=%.40q can't be read; write --%s or --%s=false", name, text, name, name)
		}
		f.changes = append(f.changes, func(q *ask.Question) { put(q, v) })
		return nil
	})
	f.mark(name)
}

func (f *questionFlags) mark(name string) {
	f.cmd.Flags().SetAnnotation(name, groupOf, []string{f.group})
}

// declare declares every flag that changes the question.
func (f *questionFlags) declare() {
	usual := ask.NewQuestion()

	f.group = "What is read"
	list(f, "score", "read the scores in column `COL`, by its name or its number from 1; again for more columns",
		one(text), func(q *ask.Question, v []string) { q.Scores = v })
	list(f, "missing", "take the cells `CODES`, separated by commas as in -9,99, for no score",
		codes, func(q *ask.Question, v []string) { q.Missing = v })
	value(f, "header", "whether the first row names the columns, `auto|yes|no` (default auto)",
		header, func(q *ask.Question, v sample.Header) { q.Header = v })

	f.group = "The scale"
	value(f, "step", "the step between scores, `auto|none|NUMBER` (default auto)",
		sample.ParseStep, func(q *ask.Question, v sample.StepChoice) { q.Step = v })
	value(f, "range", "the ends of the scale, `LOW:HIGH` as in 0:83 (default the lowest and highest score seen)",
		sample.ParseRange, func(q *ask.Question, v sample.Range) { q.Range = &v })

	f.group = "The curve"
	value(f, "mean", "judge the curve with the mean `NUMBER` and the SD of --sd (default fitted to the scores)",
		number("mean", "54.6"), func(q *ask.Question, v float64) { given(q).Mean = v })
	value(f, "sd", "judge the curve with the SD `NUMBER`, above 0, and the mean of --mean",
		number("sd", "13.1"), func(q *ask.Question, v float64) { given(q).SD = v })
	value(f, "norm-n", "add the sampling error of a mean and SD that come from `NUMBER` norm people; none takes them as exact (default none)",
		normPeople, func(q *ask.Question, v *int) { given(q).NormN = v })
	yes(f, "half-step", "judge with the half-step (continuity correction); both are always shown",
		func(q *ask.Question, v bool) { q.HalfStep = v })

	f.group = "What is asked"
	list(f, "cutoff", "judge every score column at `CUTOFF`, in quotes: '>=70', '>70', '<=25', '<25' or '20..30' (both ends in); again for more cutoffs",
		one(cutoff.Parse), func(q *ask.Question, v []cutoff.Cutoff) { q.Cutoffs = v })

	f.group = "What is at stake"
	value(f, "tolerance", "live with a gap up to `LIMIT` either way: 1.5pt (percentage points), 20%count (part of the counted share), 40heads (people) or none",
		limit, func(q *ask.Question, v *verdict.Limit) { q.TooHigh, q.TooLow = v, v })
	value(f, "too-high", "live with a curve up to `LIMIT` too high; a side without a limit is not judged",
		limit, func(q *ask.Question, v *verdict.Limit) { q.TooHigh = v })
	value(f, "too-low", "live with a curve up to `LIMIT` too low; a side without a limit is not judged",
		limit, func(q *ask.Question, v *verdict.Limit) { q.TooLow = v })
	value(f, "heads", "apply the share to `NUMBER` people: gaps are given in people too",
		number("heads", "4000"), func(q *ask.Question, v float64) { q.Heads = &v })
	yes(f, "everyone", "these are all the people there are: the gap is exact and has no interval",
		func(q *ask.Question, v bool) { q.Everyone = v })

	f.group = "How"
	value(f, "level", fmt.Sprintf("make intervals and bands at the level `NUMBER`, between 0 and 1 (default %v)", usual.Level),
		number("level", "0.95"), func(q *ask.Question, v float64) { q.Level = v })
	value(f, "replicates", fmt.Sprintf("draw `NUMBER` bootstrap samples (default %d)", usual.Replicates),
		whole("replicates", "10000"), func(q *ask.Question, v int) { q.Replicates = v })
	value(f, "seed", fmt.Sprintf("start the random draws from `NUMBER`; the same seed gives the same answer (default %d)", usual.Seed),
		seed, func(q *ask.Question, v uint64) { q.Seed = v })
	value(f, "workers", "share the work among `NUMBER` workers, 0 for one for each core; the answer is the same for any (default 0)",
		whole("workers", "2"), func(q *ask.Question, v int) { q.Workers = v })
}

// apply makes the flags' changes to the question and checks what came out.
func (f *questionFlags) apply(question ask.Question) (ask.Question, error) {
	command, changed := f.cmd.CommandPath(), f.cmd.Flags().Changed
	if changed("tolerance") && (changed("too-high") || changed("too-low")) {
		return question, misuse(command, "--tolerance sets both sides; leave out --too-high and --too-low, or --tolerance")
	}
	if question.Curve == nil && changed("mean") != changed("sd") {
		return question, misuse(command, "a given curve needs both --mean and --sd; without either it is fitted to the scores")
	}
	if question.Curve == nil && changed("norm-n") && !changed("mean") {
		return question, misuse(command, "--norm-n says how many people a given mean and SD come from; give them with --mean and --sd")
	}
	for _, change := range f.changes {
		change(&question)
	}
	if err := question.Check(); err != nil {
		return question, misuse(command, "%w", err)
	}
	return question, nil
}

// readQuestion reads a question file.
func readQuestion(path string) (ask.Question, error) {
	text, err := os.ReadFile(path)
	if err != nil {
		return ask.Question{}, fmt.Errorf("the question %s can't be read: %w", path, reason(err))
	}
	question, err := ask.ReadQuestion(text)
	if err != nil {
		return ask.Question{}, fmt.Errorf("%s: %w", path, err)
	}
	return question, nil
}

// given is the question's given curve, put there if there is none; the
// question's own is not shared.
func given(q *ask.Question) *curve.Given {
	own := curve.Given{}
	if q.Curve != nil {
		own = *q.Curve
	}
	q.Curve = &own
	return q.Curve
}

func text(s string) (string, error) { return s, nil }

// limit reads a limit; none takes away the one that a question file or the
// demo's question has.
func limit(s string) (*verdict.Limit, error) {
	if strings.TrimSpace(s) == "none" {
		return nil, nil
	}
	v, err := verdict.ParseLimit(s)
	return &v, err
}

// normPeople reads a number of people; none takes away the one that a question
// file has.
func normPeople(s string) (*int, error) {
	if strings.TrimSpace(s) == "none" {
		return nil, nil
	}
	v, err := whole("norm-n", "870")(s)
	return &v, err
}

func header(s string) (h sample.Header, err error) {
	return h, h.UnmarshalText([]byte(s))
}

// one makes a reader of single values one of lists.
func one[T any](read func(string) (T, error)) func(string) ([]T, error) {
	return func(s string) ([]T, error) {
		v, err := read(s)
		return []T{v}, err
	}
}

// codes splits missing codes at commas; blank cells are missing anyway.
func codes(s string) ([]string, error) {
	all := []string{}
	for code := range strings.SplitSeq(s, ",") {
		if code = strings.TrimSpace(code); code != "" {
			all = append(all, code)
		}
	}
	return all, nil
}

func number(name, example string) func(string) (float64, error) {
	return func(s string) (float64, error) {
		v, err := strconv.ParseFloat(strings.TrimSpace(s), 64)
		if err != nil {
			return 0, fmt.Errorf("--%s %.40q is not a number; write it as in --%s %s", name, s, name, example)
		}
		return v, nil
	}
}

func whole(name, example string) func(string) (int, error) {
	return func(s string) (int, error) {
		v, err := strconv.Atoi(strings.TrimSpace(s))
		if err != nil {
			return 0, fmt.Errorf("--%s %.40q is not a whole number; write it as in --%s %s", name, s, name, example)
		}
		return v, nil
	}
}

func seed(s string) (uint64, error) {
	v, err := strconv.ParseUint(strings.TrimSpace(s), 10, 64)
	if err != nil {
		return 0, fmt.Errorf("--seed %.40q is not a whole number from 0 up; write it as in --seed 1", s)
	}
	return v, nil
}
