package main

import (
	"bytes"
	"context"
	"fmt"
	"path/filepath"
	"slices"
	"strings"

	"github.com/spf13/cobra"

	"tailgap/core/ask"
	"tailgap/core/demo"
	"tailgap/core/intake"
	"tailgap/core/sample"
	"tailgap/core/words"
)

const judgeName = "tailgap judge"

// judging is one run of tailgap judge: what its flags say.
type judging struct {
	*program
	question questionFlags
	demo     bool
	from     string // question file
	format   string
	out      string
	figure   string
	worm     string
	save     string
}

func (p *program) judgeCommand() *cobra.Command {
	j := &judging{program: p}
	cmd := &cobra.Command{
		Use:   "judge FILE...|-|--demo",
		Short: "Judge the normal curve at cutoffs",
		Long: `Reads scores, one row for each person, and says for each cutoff how far the
normal curve's share is from the counted share, how sure that is with this many
people and, given a tolerance, whether the curve holds, fails or is unsettled.

FILE is delimited text (comma, semicolon or tab); - is standard input; rows of
several files are pooled. Results go to standard output.

Exit status: 0 done, and every verdict holds or none was asked for; 1 the
program's own failure, or stopped before it was done (Ctrl-C); 2 the command
line or the data can't be used; 3 at least one verdict fails; 4 none fails and
at least one is unsettled.`,
		Example: `  tailgap judge --demo
  tailgap judge scores.csv --score vocabulary --cutoff '<=11' --cutoff '>=30'
  tailgap judge scores.csv --score vocabulary --cutoff '<=11' --too-high 1pt --too-low 2pt --heads 4000
  tailgap judge north.csv south.csv --score 3 --missing -9,99 --cutoff '>=45' --format json --out answer.json
  tailgap judge scores.csv --question plan.json --figure sweep.svg
  cut -d, -f2 scores.csv | tailgap judge - --cutoff '20..30' --mean 21.3 --sd 6`,
		Args: cobra.ArbitraryArgs,
		RunE: func(cmd *cobra.Command, args []string) error { return j.run(cmd.Context(), args) },
	}
	j.declare(cmd)
	completeJudge(cmd)
	return cmd
}

func (j *judging) declare(cmd *cobra.Command) {
	flags := cmd.Flags()
	flags.SortFlags = false
	j.question = questionFlags{cmd: cmd}
	j.question.declare()
	flags.BoolVar(&j.demo, "demo", false, "read the made-up demo data; without --score and --cutoff, ask the demo's question")
	flags.SetAnnotation("demo", groupOf, []string{"What is read"})
	flags.StringVar(&j.format, "format", "text", "the form of the results, `text|json|csv`")
	fileFlag(flags, &j.out, "out", "write the results to `FILE`, whole or not at all", true)
	fileFlag(flags, &j.figure, "figure", "write a figure to `FILE.svg`", false)
	fileFlag(flags, &j.worm, "worm", "write worm plots, and what the shape of the scores does to the gaps, to `FILE.svg`", false)
	fileFlag(flags, &j.from, "question", "start from the question in `FILE`; flags that are given override its parts", false)
	fileFlag(flags, &j.save, "save-question", "write the question to `FILE`: everything that was asked, and none of the data", false)
	for _, name := range []string{"format", "out", "figure", "worm", "question", "save-question"} {
		flags.SetAnnotation(name, groupOf, []string{"What comes out"})
	}
}

// run reads, judges and writes, in this order: a run that goes wrong has
// written nothing.
func (j *judging) run(ctx context.Context, paths []string) error {
	if err := j.checkUsage(paths); err != nil {
		return err
	}
	question, err := j.ask()
	if err != nil {
		return err
	}
	progress := j.newBar()
	defer progress.clear()
	scores, err := j.read(ctx, paths, question, progress)
	if err != nil {
		return err
	}
	answer, err := j.judge(ctx, question, scores, func(done, total int) {
		progress.show("judging", int64(done), int64(total))
	})
	if err != nil {
		return err
	}
	progress.clear()
	if ctx.Err() != nil {
		return ctx.Err()
	}
	return j.write(answer)
}

func (j *judging) checkUsage(paths []string) error {
	switch {
	case len(paths) == 0 && !j.demo:
		return misuse(judgeName, "say what to read: a FILE, - for standard input, or --demo")
	case len(paths) > 0 && j.demo:
		return misuse(judgeName, "--demo reads the demo data; leave out %.60q, or --demo", paths[0])
	case formats[j.format] == nil:
		return misuse(judgeName, "the format %.40q isn't one; write text, json or csv", j.format)
	}
	for _, drawing := range []struct{ flag, path string }{{"figure", j.figure}, {"worm", j.worm}} {
		if drawing.path != "" && !strings.EqualFold(filepath.Ext(drawing.path), ".svg") {
			return misuse(judgeName, "a figure is an SVG; give --%s a name that ends in .svg, not %.60q", drawing.flag, drawing.path)
		}
	}
	read := slices.Clone(paths)
	if j.from != "" {
		read = append(read, j.from)
	}
	return checkParcels(judgeName, j.parcels(outputs{}), read)
}

// ask is the question: the file's, the demo's or the usual one, with what
// the flags change.
func (j *judging) ask() (ask.Question, error) {
	changed := j.question.cmd.Flags().Changed
	question := ask.NewQuestion()
	var err error
	switch {
	case j.from != "":
		question, err = readQuestion(j.from)
	case j.demo && !changed("score") && !changed("cutoff"):
		question = demo.Question()
	case j.demo: // another question, but still about the demo
		question.Scores, question.Missing = demo.Scores(), demo.Missing()
	}
	if err != nil {
		return question, err
	}
	return j.question.apply(question)
}

// read reads the scores that the question asks for.
func (j *judging) read(ctx context.Context, paths []string, question ask.Question, progress *bar) (sample.Sample, error) {
	options := intake.Options{Scores: question.Scores, Missing: question.Missing, Header: question.Header}
	if j.demo {
		source := intake.Source{Name: demo.Name, Reader: bytes.NewReader(demo.CSV())}
		scores, err := intake.Read(ctx, []intake.Source{source}, options)
		scores.Demo = true
		return scores, err
	}
	var in *input
	in, err := j.open(ctx, paths, func(read int64) { progress.show("reading", read, in.size) })
	defer in.close()
	if err != nil {
		return sample.Sample{}, err
	}
	return intake.Read(ctx, in.sources, options)
}

// write writes everything that comes out and ends the run by its verdicts.
func (j *judging) write(answer ask.Answer) error {
	results, err := formats[j.format](answer)
	if err != nil {
		return failure(err)
	}
	parcels, err := j.wrap(answer, results)
	if err != nil {
		return failure(err)
	}
	if err := deliver(parcels); err != nil {
		return err
	}
	if j.out == "" || j.out == "-" {
		if j.format == "text" && j.colours() {
			results = emphasize(results)
		}
		if err := j.print(results); err != nil {
			return err
		}
	}
	if j.format != "text" {
		j.warn(answer)
	}
	return verdicts(answer)
}

// warn repeats the warnings on stderr: text has them in it, but nobody reads
// the other formats as they go by.
func (j *judging) warn(answer ask.Answer) {
	say := func(about, warning string) {
		fmt.Fprintf(j.stderr, "tailgap: warning: %s%s\n", about, words.Line(warning))
	}
	for _, warning := range answer.Warnings { // those about one score are among them
		say("", warning)
	}
	for _, result := range answer.Results {
		for _, finding := range result.Cutoffs {
			for _, note := range finding.Notes {
				say(words.Name(result.Score)+", "+finding.Cutoff.String()+": ", note)
			}
		}
	}
}
