package main

import (
	"os"
	"regexp"

	"tailgap/core/ask"
	"tailgap/core/figure"
	"tailgap/core/report"
)

// formats are the forms of the results, by the name of --format.
var formats = map[string]func(ask.Answer) ([]byte, error){
	"text": func(answer ask.Answer) ([]byte, error) { return []byte(report.Text(answer)), nil },
	"json": report.JSON,
	"csv":  report.CSV,
}

// outputs are what may go to files.
type outputs struct{ results, sheet, worms, question []byte }

// wrap puts what goes to files into parcels.
func (j *judging) wrap(answer ask.Answer, results []byte) ([]parcel, error) {
	d := outputs{results: results}
	var err error
	if j.figure != "" {
		d.sheet = []byte(figure.Sheet(answer))
	}
	if j.worm != "" {
		d.worms = []byte(figure.WormSheet(answer))
	}
	if j.save != "" {
		d.question, err = ask.WriteQuestion(answer.Question)
	}
	return j.parcels(d), err
}

// parcels are the files that the flags name.
func (j *judging) parcels(d outputs) []parcel {
	var named []parcel
	for _, one := range []parcel{
		{"out", j.out, d.results}, {"figure", j.figure, d.sheet}, {"worm", j.worm, d.worms}, {"save-question", j.save, d.question},
	} {
		if one.path != "" && !(one.flag == "out" && one.path == "-") {
			named = append(named, one)
		}
	}
	return named
}

var verdictWord = regexp.MustCompile(`(?m)^(HOLDS|FAILS|UNSETTLED)\b`)

// emphasize sets the verdicts in bold: they are what the eye looks for.
func emphasize(text []byte) []byte {
	return verdictWord.ReplaceAll(text, []byte("\x1b[1m$1\x1b[0m"))
}

// colours is true where the results may carry more than plain letters.
func (p *program) colours() bool {
	return os.Getenv("NO_COLOR") == "" && os.Getenv("TERM") != "dumb" && p.terminal(p.stdout)
}
