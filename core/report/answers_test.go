package report

import (
	"tailgap/core/ask"
	"tailgap/core/curve"
	"tailgap/core/cutoff"
	"tailgap/core/sample"
	"tailgap/core/verdict"
)

// The answers below are made by hand, with figures as they could be: what is
// tested here is how they are written.

func some[T any](x T) *T { return &x }

func parsed(text string) cutoff.Cutoff {
	c, err := cutoff.Parse(text)
	if err != nil {
		panic(err)
	}
	return c
}

func points(size float64) *verdict.Limit { return &verdict.Limit{Size: size, Unit: verdict.Points} }

func reading(z, share, gap, low, high float64, verdict string) ask.Reading {
	r := ask.Reading{Z: z, CurveShare: share, GapPoints: gap, GapLow: &low, GapHigh: &high}
	if verdict != "" {
		r.Verdict = &verdict
	}
	return r
}

func exact(r ask.Reading) ask.Reading {
	r.GapLow, r.GapHigh = nil, nil
	return r
}

// finding is what was found at a cutoff that counted so many of 398 people
// reached, judged without the half-step.
func finding(at string, counted int, without ask.Reading, with *ask.Reading) ask.Finding {
	f := ask.Finding{
		Cutoff: parsed(at), Reading: without, Counted: counted, CountedShare: float64(counted) / 398,
		Method: "ghost-studentised", WithoutHalfStep: without, HalfStep: with, Notes: []string{},
	}
	if counted > 0 {
		f.Ratio = some(without.CurveShare / f.CountedShare)
		f.RatioLow, f.RatioHigh = some(*f.Ratio*0.75), some(*f.Ratio*1.31)
	}
	return f
}

func heads(f ask.Finding, of float64) ask.Finding {
	f.Heads = &ask.HeadCount{Gap: f.GapPoints / 100 * of}
	if f.GapLow != nil {
		f.Heads.Low, f.Heads.High = some(*f.GapLow/100*of), some(*f.GapHigh/100*of)
	}
	return f
}

func vocabulary() ask.Result {
	return ask.Result{
		Score: "vocabulary",
		Sample: ask.Described{
			N: 412, Used: 398,
			Dropped: []sample.Dropped{{Reason: "blank", Count: 9, First: "line 31"}, {Reason: "coded 99", Count: 5, First: "line 77"}},
			Mean:    24.106532663316582, SD: 8.1873449, Skewness: -0.6134, ExcessKurtosis: -0.2178, Min: 2, Max: 37, Distinct: 34,
			Step: some(1.0), StepSource: "detected", Low: 0, High: 37, RangeSource: "stated",
		},
		Curve:    ask.Curve{Kind: "normal", Mean: 24.106532663316582, SD: 8.1873449, Source: "fitted"},
		Warnings: []string{"14 of 412 scores stand on the highest attainable score, 37."},
		Cutoffs:  []ask.Finding{},
		Sweeps:   []ask.Sweep{},
	}
}

func sweep(side cutoff.Side, trusted ...ask.Stretch) ask.Sweep {
	return ask.Sweep{
		Side:         side,
		Threshold:    []float64{0, 10, 20, 30, 38},
		CurveShare:   []float64{0.998, 0.958, 0.692, 0.236, 0.045},
		CountedShare: []float64{1, 0.915, 0.701, 0.359, 0},
		GapPoints:    []float64{-0.2, 4.3, -0.9, -12.3, 4.5},
		Low:          []float64{-0.5, 2, -3.3, -15, 4}, High: []float64{-0.1, 6.6, 1.5, -9.6, 5},
		BandLow: []float64{-0.7, 1, -4, -16, 3.4}, BandHigh: []float64{0.2, 7.6, 2.2, -8.6, 5.6},
		Trusted: trusted,
	}
}

func question(cutoffs ...string) ask.Question {
	q := ask.NewQuestion()
	q.Scores = []string{"vocabulary"}
	for _, c := range cutoffs {
		q.Cutoffs = append(q.Cutoffs, parsed(c))
	}
	return q
}

func answer(q ask.Question, results ...ask.Result) ask.Answer {
	return ask.Answer{
		Format: ask.AnswerFormat, Program: "tailgap 0.1.0", Question: q,
		Warnings: []string{}, Suppressed: []string{}, Results: results,
	}
}

func fitted() ask.Answer {
	q := question("<=11", ">=30", "20..25")
	q.TooHigh, q.TooLow, q.Heads = points(1), points(2), some(4000.0)
	r := vocabulary()
	low := heads(finding("<=11", 38, reading(-1.6, 0.0548, -4.07, -6.3, -1.7, "unsettled"), some(reading(-1.54, 0.0618, -3.4, -5.5, -1.1, "unsettled"))), 4000)
	low.PeopleToSettle = some(1247)
	high := heads(finding(">=30", 143, reading(0.72, 0.2358, -12.35, -15.5, -9.6, "fails"), some(reading(0.66, 0.2546, -10.5, -13.4, -7.8, "fails"))), 4000)
	between := reading(-0.5, 0.2352, 0.4, -0.3, 0.9, "holds")
	between.ZTo = some(0.11)
	middle := heads(finding("20..25", 92, between, some(reading(-0.56, 0.28, 4.9, 4, 5.7, "fails"))), 4000)
	middle.Notes = []string{"only the half-step decides this verdict"}
	r.Cutoffs = []ask.Finding{low, high, middle}
	r.Sweeps = []ask.Sweep{
		sweep(cutoff.AtLeast, ask.Stretch{From: 14, To: 20}, ask.Stretch{From: 38, To: 38, Trivial: true}),
		sweep(cutoff.AtMost),
	}
	r.Worst = ask.Worst{Side: cutoff.AtLeast, Threshold: 30, GapPoints: -12.35}
	a := answer(q, r)
	a.Demo = true
	return a
}

func given() ask.Answer {
	q := question(">=30")
	q.Curve = &curve.Given{Mean: 25, SD: 7.5}
	r := vocabulary()
	r.Curve = ask.Curve{Kind: "normal", Mean: 25, SD: 7.5, Source: "given"}
	r.Cutoffs = []ask.Finding{finding(">=30", 143, reading(0.67, 0.2525, -10.7, -15.5, -6.1, ""), some(reading(0.6, 0.2743, -8.5, -13.4, -3.8, "")))}
	r.Sweeps = []ask.Sweep{sweep(cutoff.AtLeast)}
	r.Sweeps[0].Trusted = nil
	r.Worst = ask.Worst{Side: cutoff.AtLeast, Threshold: 30, GapPoints: -12.35}
	return answer(q, r)
}

func everyone() ask.Answer {
	q := question(">=30", "<=11")
	q.Everyone = true
	q.TooHigh, q.Heads = points(1), some(4000.0)
	r := vocabulary()
	high := heads(finding(">=30", 143, exact(reading(0.72, 0.2358, -12.35, 0, 0, "holds")), nil), 4000)
	low := heads(finding("<=11", 38, exact(reading(-1.6, 0.1057, 1.02, 0, 0, "fails")), nil), 4000)
	high.RatioLow, high.RatioHigh, low.RatioLow, low.RatioHigh = nil, nil, nil, nil
	r.Cutoffs = []ask.Finding{high, low}
	s := sweep(cutoff.AtLeast, ask.Stretch{From: 0, To: 37})
	s.Low, s.High, s.BandLow, s.BandHigh = nil, nil, nil, nil
	r.Sweeps = []ask.Sweep{s}
	r.Worst = ask.Worst{Side: cutoff.AtLeast, Threshold: 30, GapPoints: -12.35}
	return answer(q, r)
}

func halfStep() ask.Answer {
	q := question("<=11")
	q.HalfStep = true
	q.TooHigh, q.TooLow = points(2), points(2)
	r := vocabulary()
	f := finding("<=11", 38, reading(-1.6, 0.0548, -4.07, -6.3, -1.7, "unsettled"), some(reading(-1.54, 0.0618, -3.4, -5.5, -2.1, "fails")))
	f.Reading = *f.HalfStep
	f.Ratio = some(f.CurveShare / f.CountedShare)
	r.Cutoffs = []ask.Finding{f}
	r.Sweeps = []ask.Sweep{sweep(cutoff.AtMost, ask.Stretch{From: 0, To: 10, Trivial: true})}
	r.Worst = ask.Worst{Side: cutoff.AtMost, Threshold: 30, GapPoints: -12.35}
	return answer(q, r)
}

// partOfCount is a tolerance in percent of the count on a score without a
// step, where nobody is beyond one of the cutoffs.
func partOfCount() ask.Answer {
	q := question(">=60.5", "<=4", ">45", "<=-5", "-10..-5")
	q.Scores = []string{"form_minutes"}
	q.TooHigh = &verdict.Limit{Size: 20, Unit: verdict.OfCount}
	q.TooLow = q.TooHigh
	r := vocabulary()
	r.Score = "form_minutes"
	r.Sample.Dropped, r.Sample.N = []sample.Dropped{}, 398
	r.Sample.Step, r.Sample.RangeSource, r.Sample.Low, r.Sample.High = nil, "observed", 2, 37
	r.Warnings = []string{}
	none := finding(">=60.5", 0, reading(4.4, 0.0000054, 0.00054, -0.31, 0.98, "unsettled"), nil)
	none.Notes = []string{"Fewer than 10 people are at 60.5 or above."}
	far := finding("<=4", 3, reading(-5.5, 0.00000002, -0.7537, -1.9, -0.01, "fails"), nil)
	r.Cutoffs = []ask.Finding{
		none, far,
		finding(">45", 4, reading(2.6, 0.0013, -0.87, -2.1, 0.02, "unsettled"), nil),
		finding("<=-5", 398, reading(3.1, 0.9987, -0.13, -0.9, -0.01, "holds"), nil),
		finding("-10..-5", 30, reading(3.1, 0.075, -0.04, -0.9, 0.8, "holds"), nil),
	}
	r.Sweeps = []ask.Sweep{sweep(cutoff.AtLeast), sweep(cutoff.Above), sweep(cutoff.AtMost)}
	r.Worst = ask.Worst{Side: cutoff.Above, Threshold: 12.125, GapPoints: 7.7}
	return answer(q, r)
}

// hostile has several columns with names that no terminal or spreadsheet
// should act on, and no cutoff.
func hostile() ask.Answer {
	q := question()
	q.Scores = []string{"=HYPERLINK(\"http://x\")", "\x1b[31mred\x1b[0m\r\nFAKE: holds"}
	first, second, third := vocabulary(), vocabulary(), vocabulary()
	first.Score, second.Score = q.Scores[0], q.Scores[1]
	third.Score = "a very long name of a column that goes on and on and on, \u202eback to front"
	third.Warnings = []string{"In the column \x1b]0;title\x07 no score is usable."}
	a := answer(q, first, second, third)
	a.Warnings = []string{"The columns have\nodd names.", third.Score + ": " + third.Warnings[0]} // the second is the third column's
	a.Suppressed = []string{"nothing"}
	return a
}
