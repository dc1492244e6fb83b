package main

import (
	"context"
	"errors"
	"fmt"
	"math"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/ask"
	"tailgap/core/report"
	"tailgap/core/sample"
	"tailgap/core/verdict"
	"tailgap/web"
)

// file writes a file into a folder of its own and returns its path.
func file(t *testing.T, name, text string) string {
	t.Helper()
	path := filepath.Join(t.TempDir(), name)
	require.NoError(t, os.WriteFile(path, []byte(text), 0o666))
	return path
}

// bell writes n whole-number scores that lie as a normal curve with mean 50
// and SD 10 would have them.
func bell(t *testing.T, n int) string {
	t.Helper()
	var out strings.Builder
	out.WriteString("id,score\n")
	for i := range n {
		z := math.Sqrt2 * math.Erfinv(2*(float64(i)+0.5)/float64(n)-1)
		fmt.Fprintf(&out, "%d,%.0f\n", i, 50+10*z)
	}
	return file(t, "bell.csv", out.String())
}

// answered is the JSON answer of a run, which may end with any verdict.
func answered(t *testing.T, args ...string) ask.Answer {
	t.Helper()
	stdout, stderr, status := tailgap("", append([]string{"judge", "--format", "json", "--replicates", "500"}, args...)...)
	require.Contains(t, []int{statusDone, statusFails, statusUnsettled}, status, stderr)
	answer, err := report.ReadJSON([]byte(stdout))
	require.NoError(t, err)
	return answer
}

func TestStatusFollowsVerdicts(t *testing.T) {
	bell := bell(t, 2000)
	for _, c := range []struct {
		name string
		args []string
		want int
	}{
		// At 50 and above stand 52% of these scores, because 50 itself is in;
		// the curve without the half-step says 50%. The interval of that gap is
		// about 0.7 to 3.3 points too low, with the half-step 1.4 either way.
		{"no tolerance", []string{"--cutoff", ">=50"}, statusDone},
		{"no cutoff", nil, statusDone},
		{"holds", []string{"--cutoff", ">=50", "--tolerance", "5pt"}, statusDone},
		{"fails", []string{"--cutoff", ">=50", "--tolerance", "0.5pt"}, statusFails},
		{"unsettled", []string{"--cutoff", ">=50", "--tolerance", "2.5pt"}, statusUnsettled},
		{"fails and holds", []string{"--cutoff", ">=50", "--cutoff", ">=80", "--tolerance", "0.5pt"}, statusFails},
		{"unsettled and holds", []string{"--cutoff", ">=70", "--cutoff", ">=50", "--tolerance", "2.5pt"}, statusUnsettled},
		{"too low is no matter", []string{"--cutoff", ">=50", "--too-high", "0.5pt"}, statusDone},
		{"the half-step decides", []string{"--cutoff", ">=50", "--tolerance", "2.5pt", "--half-step"}, statusDone},
		{"exact", []string{"--cutoff", ">=50", "--tolerance", "2.5pt", "--everyone"}, statusDone},
	} {
		t.Run(c.name, func(t *testing.T) {
			stdout, stderr, status := tailgap("", append([]string{"judge", bell, "--score", "score", "--replicates", "999"}, c.args...)...)
			assert.Equal(t, c.want, status, stdout+stderr)
			assert.NotEmpty(t, stdout)
			assert.Empty(t, stderr)
		})
	}
}

func TestFailingGoesBeforeUnsettled(t *testing.T) {
	says := func(words ...string) ask.Answer {
		var result ask.Result
		for _, word := range words {
			result.Cutoffs = append(result.Cutoffs, ask.Finding{Reading: ask.Reading{Verdict: &word}})
		}
		return ask.Answer{Results: []ask.Result{result, {Cutoffs: []ask.Finding{{}}}}}
	}
	for _, c := range []struct {
		answer ask.Answer
		want   int
	}{
		{says(), statusDone},
		{says("holds", "holds"), statusDone},
		{says("holds", "unsettled", "holds"), statusUnsettled},
		{says("unsettled", "fails", "holds"), statusFails},
		{says("fails", "unsettled"), statusFails},
	} {
		p := &program{}
		assert.Equal(t, c.want, p.report(verdicts(c.answer)))
	}
}

func TestInputsGiveOneAnswer(t *testing.T) {
	scores := bell(t, 300)
	text, err := os.ReadFile(scores)
	require.NoError(t, err)
	lines := strings.SplitAfter(string(text), "\n")
	first := file(t, "first.csv", strings.Join(lines[:100], ""))
	second := file(t, "second.csv", lines[0]+strings.Join(lines[100:], ""))
	ask := []string{"--cutoff", ">=60", "--format", "json", "--replicates", "500", "--score", "score"}

	want, _, status := tailgap("", append([]string{"judge", scores}, ask...)...)
	require.Equal(t, statusDone, status)
	piped, _, _ := tailgap(string(text), append([]string{"judge", "-"}, ask...)...)
	assert.Equal(t, want, piped)
	pooled, _, _ := tailgap("", append([]string{"judge", first, second}, ask...)...)
	assert.Equal(t, want, pooled)
	mixed, _, _ := tailgap(strings.Join(lines[:100], ""), append([]string{"judge", "-", second}, ask...)...)
	assert.Equal(t, want, mixed)

	ask[len(ask)-1] = "2"
	byNumber, _, _ := tailgap("", append([]string{"judge", scores}, ask...)...)
	named, numbered, err := twoAnswers(want, byNumber)
	require.NoError(t, err)
	assert.Equal(t, named.Results, numbered.Results)
}

func twoAnswers(a, b string) (first, second ask.Answer, err error) {
	first, errFirst := report.ReadJSON([]byte(a))
	second, errSecond := report.ReadJSON([]byte(b))
	return first, second, errors.Join(errFirst, errSecond)
}

func TestSeveralScores(t *testing.T) {
	both := answered(t, "--demo", "--score", "vocabulary", "--score", "form_minutes", "--cutoff", ">=30")
	alone := answered(t, "--demo", "--score", "form_minutes", "--cutoff", ">=30")
	require.Len(t, both.Results, 2)
	assert.Equal(t, "vocabulary", both.Results[0].Score)
	assert.Equal(t, alone.Results[0].Sample, both.Results[1].Sample)
}

func TestWorkersDoNotChangeTheAnswer(t *testing.T) {
	scores := bell(t, 300)
	one := answered(t, scores, "--score", "score", "--cutoff", "<40", "--workers", "1")
	five := answered(t, scores, "--score", "score", "--cutoff", "<40", "--workers", "5")
	assert.Equal(t, one, five)
}

// A panic anywhere below is the program's own failure, and no answer.
func TestPanicIsAFailure(t *testing.T) {
	var stdout, stderr strings.Builder
	p := &program{
		stdout: &stdout, stderr: &stderr, terminal: terminal, page: web.Page,
		judge: func(context.Context, ask.Question, sample.Sample, ask.Progress) (ask.Answer, error) {
			panic("lost the thread")
		},
	}
	assert.Equal(t, statusFailure, p.run(context.Background(), []string{"judge", "--demo"}))
	assert.Empty(t, stdout.String())
	assert.True(t, strings.HasPrefix(stderr.String(), "tailgap: a fault in the program stopped it, so there is no answer: lost the thread\n"), stderr.String())
}

// Whatever is cancelled in the middle ends with status 1, one sentence and
// nothing written.
func TestCancelled(t *testing.T) {
	folder := t.TempDir()
	out := filepath.Join(folder, "out.txt")
	var stdout, stderr strings.Builder
	ctx, cancel := context.WithCancel(context.Background())
	p := &program{
		stdout: &stdout, stderr: &stderr, terminal: terminal,
		judge: func(ctx context.Context, q ask.Question, s sample.Sample, _ ask.Progress) (ask.Answer, error) {
			cancel()
			return ask.Judge(ctx, q, s, nil)
		},
	}
	assert.Equal(t, statusFailure, p.run(ctx, []string{"judge", "--demo", "--out", out, "--figure", out + ".svg"}))
	assert.Empty(t, stdout.String())
	assert.Equal(t, "tailgap: stopped before the answer was ready; nothing was written\n", stderr.String())
	left, err := os.ReadDir(folder)
	require.NoError(t, err)
	assert.Empty(t, left)
}

func TestErrorsFromTheCoreAreAboutTheInput(t *testing.T) {
	var stdout, stderr strings.Builder
	p := &program{
		stdout: &stdout, stderr: &stderr, terminal: terminal,
		judge: func(context.Context, ask.Question, sample.Sample, ask.Progress) (ask.Answer, error) {
			return ask.Answer{}, errors.New("these scores say nothing\x1b[2J")
		},
	}
	assert.Equal(t, statusInput, p.run(context.Background(), []string{"judge", "--demo"}))
	assert.Empty(t, stdout.String())
	assert.Equal(t, "tailgap: these scores say nothing\uFFFD[2J\n", stderr.String())
}

func TestVerdictsAreBoldOnATerminalOnly(t *testing.T) {
	judge := func(onTerminal bool, args ...string) string {
		var stdout, stderr strings.Builder
		p := &program{stdout: &stdout, stderr: &stderr, judge: ask.Judge, terminal: func(stream any) bool { return onTerminal && stream == any(&stdout) }}
		assert.Equal(t, statusFails, p.run(context.Background(), append([]string{"judge", "--demo", "--replicates", "500"}, args...)), stderr.String())
		return stdout.String()
	}
	t.Setenv("TERM", "xterm")
	t.Setenv("NO_COLOR", "")
	plain := judge(false)
	assert.NotContains(t, plain, "\x1b")
	bold := judge(true)
	assert.Contains(t, bold, "\n\x1b[1mFAILS\x1b[0m: ")
	assert.Equal(t, plain, strings.NewReplacer("\x1b[1m", "", "\x1b[0m", "").Replace(bold))
	assert.NotContains(t, judge(true, "--format", "json"), "\x1b")
	assert.NotContains(t, judge(true, "--format", "csv"), "\x1b")

	t.Setenv("NO_COLOR", "1")
	assert.Equal(t, plain, judge(true))
	t.Setenv("NO_COLOR", "")
	t.Setenv("TERM", "dumb")
	assert.Equal(t, plain, judge(true))
}

func TestTheDemoAsksItsOwnQuestion(t *testing.T) {
	whole := answered(t, "--demo")
	assert.True(t, whole.Demo)
	assert.Equal(t, []string{"vocabulary"}, whole.Question.Scores)
	assert.Len(t, whole.Question.Cutoffs, 2)

	changed := answered(t, "--demo", "--tolerance", "3pt")
	assert.Equal(t, whole.Question.Cutoffs, changed.Question.Cutoffs)
	assert.Equal(t, &verdict.Limit{Size: 3}, changed.Question.TooHigh)

	// Another cutoff is another question: nothing of the demo's is at stake,
	// but its codes still stand for no score.
	other := answered(t, "--demo", "--cutoff", "<=5")
	assert.Equal(t, whole.Question.Scores, other.Question.Scores)
	assert.Equal(t, whole.Question.Missing, other.Question.Missing)
	assert.Len(t, other.Question.Cutoffs, 1)
	assert.Nil(t, other.Question.TooHigh)
	assert.Equal(t, whole.Results[0].Sample, other.Results[0].Sample)
}
