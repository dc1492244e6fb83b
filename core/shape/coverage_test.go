package shape

import (
	"context"
	"flag"
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"tailgap/core/cutoff"
	"tailgap/core/sample"
)

var study = flag.Bool("study", false, "measure the intervals' coverage anew, into testdata/shape/coverage.md (two minutes)")

// population is a distribution on a scale with a step.
type population struct {
	name string
	step float64
	at   []float64
	p    []float64
}

// onSteps is a continuous distribution rounded to steps, ends included.
func onSteps(name string, step, low, high float64, below func(float64) float64) population {
	q := population{name: name, step: step}
	for i := range int(math.Round((high-low)/step)) + 1 {
		at := low + float64(i)*step
		from, to := below(at-step/2), below(at+step/2)
		if i == 0 {
			from = 0
		}
		if at > high-step/2 {
			to = 1
		}
		q.at, q.p = append(q.at, at), append(q.p, to-from)
	}
	return q
}

// weighed is a distribution given by weights of the whole numbers 0..high.
func weighed(name string, high int, logWeight func(k float64) float64) population {
	q, total := population{name: name, step: 1}, 0.0
	for k := range high + 1 {
		weight := math.Exp(logWeight(float64(k)))
		q.at, q.p, total = append(q.at, float64(k)), append(q.p, weight), total+weight
	}
	for i := range q.p {
		q.p[i] /= total
	}
	return q
}

func logGamma(x float64) float64 { y, _ := math.Lgamma(x); return y }

// heapedOn moves a part of each score's people to the nearest multiple of 5.
func (q population) heapedOn(name string, part float64) population {
	moved := slices.Clone(q.p)
	for i, p := range q.p {
		moved[i] -= part * p
		moved[int(math.Round(float64(i)/5)*5)] += part * p
	}
	return population{name, q.step, q.at, moved}
}

func populations() []population {
	below := func(z float64) float64 { return math.Erfc(-z/math.Sqrt2) / 2 }
	normal := onSteps("normal (50, 10)", 1, 0, 100, func(x float64) float64 { return below((x - 50) / 10) })
	gamma := onSteps("", 1, 0, 100, func(x float64) float64 { y := math.Max(0, x/12); return 1 - math.Exp(-y)*(1+y) })
	betaBinomial := func(name string, a, b float64) population {
		return weighed(name, 30, func(k float64) float64 {
			return logGamma(31) - logGamma(k+1) - logGamma(31-k) + logGamma(k+a) + logGamma(30-k+b)
		})
	}
	return []population{
		normal,
		weighed("Poisson (3)", 40, func(k float64) float64 { return k*math.Log(3) - logGamma(k+1) }),
		weighed("negative binomial (mean 10, variance 40)", 120, func(k float64) float64 { return logGamma(k+10./3) - logGamma(k+1) + k*math.Log(0.75) }),
		betaBinomial("beta-binomial (30; 0.6, 2)", 0.6, 2),
		betaBinomial("beta-binomial (30; 5, 5)", 5, 5),
		onSteps("uniform 7..32", 1, 7, 32, func(x float64) float64 { return math.Max(0, math.Min(1, (x-6.5)/26)) }),
		onSteps("two normals", 1, 0, 60, func(x float64) float64 { return 0.7*below((x-20)/4) + 0.3*below((x-40)/4) }),
		onSteps("lognormal (0.8)", 0.05, 0, 60, func(x float64) float64 { return below(math.Log(math.Max(x, 1e-9)) / 0.8) }),
		onSteps("exponential", 0.05, 0.025, 20.025, func(x float64) float64 { return 1 - math.Exp(-math.Max(0, x)) }),
		onSteps("gamma (2)", 0.1, 0.05, 25.05, func(x float64) float64 { y := math.Max(0, x); return 1 - math.Exp(-y)*(1+y) }),
		normal.heapedOn("normal, half heaped on fives", 0.5),
		gamma.heapedOn("gamma (2), 6 of 10 heaped on fives", 0.6),
		onSteps("normal with three tenths at the floor", 1, 0, 60, func(x float64) float64 {
			return 0.3 + 0.7*math.Max(0, (below((x-20)/8)-below(-2.5))/(1-below(-2.5)))
		}),
		onSteps("normal cut off at a ceiling", 1, 0, 37, func(x float64) float64 { return below((x - 30) / 7) }),
	}
}

// cutoffs of a population at -2 ... 3 SD from its mean.
func (q population) cutoffs() (all []cutoff.Cutoff) {
	mean, variance := 0.0, 0.0
	for i, p := range q.p {
		mean += p * q.at[i]
	}
	for i, p := range q.p {
		variance += p * (q.at[i] - mean) * (q.at[i] - mean)
	}
	for _, z := range []float64{-2, -1, -0.5, 0.5, 1, 1.5, 2, 2.5, 3} {
		steps := math.Round((mean + z*math.Sqrt(variance) - q.at[0]) / q.step)
		all = append(all, atLeast(q.at[0]+steps*q.step)...)
	}
	return all
}

// truth is what a hundred million people give.
func (q population) truth(cutoffs []cutoff.Cutoff) Findings {
	var counts sample.Counts
	for i, p := range q.p {
		if people := int(math.Round(p * 1e8)); people > 0 {
			counts.Score, counts.Count, counts.N = append(counts.Score, q.at[i]), append(counts.Count, people), counts.N+people
		}
	}
	p := plannedOf(counts, sample.StepChoice{Size: q.step}, nil, false, cutoffs...)
	f, _ := Run(context.Background(), p, nil)
	return f
}

func (q population) draw(n int, source *rand.Rand) []float64 {
	scores := make([]float64, n)
	for i := range scores {
		u, at := source.Float64(), 0
		for ; at < len(q.p)-1 && u > q.p[at]; at++ {
			u -= q.p[at]
		}
		scores[i] = q.at[at]
	}
	return scores
}

// names of what has an interval.
var names = map[Kind]string{HalfStep: "half-step", Asymmetry: "asymmetry", Rest: "rest", Floor: "floor", Ceiling: "ceiling", Heaps: "heaps"}

// covered is, by what has an interval, in how many of the samples that had one
// it held the population's value; those of effects at each cutoff.
type covered map[string][]float64

func (q population) cover(n, samples, replicates int, seed uint64) covered {
	source := rand.New(rand.NewPCG(seed, uint64(n)))
	cutoffs := q.cutoffs()
	truth := q.truth(cutoffs)
	hits, of := map[string][]float64{}, map[string][]float64{}
	count := func(name string, i int, v, want *Value) {
		if v == nil || want == nil || v.Interval == nil {
			return
		}
		if hits[name] == nil {
			hits[name], of[name] = make([]float64, len(cutoffs)), make([]float64, len(cutoffs))
		}
		of[name][i]++
		if v.Interval.Low <= want.Estimate && want.Estimate <= v.Interval.High {
			hits[name][i]++
		}
	}
	for range samples {
		scores := q.draw(n, source)
		if slices.Min(scores) == slices.Max(scores) {
			continue
		}
		p := planned(scores, sample.StepChoice{Size: q.step}, nil, false, cutoffs...)
		p.Everyone, p.Replicates = false, replicates
		f, _ := Run(context.Background(), p, nil)
		count("skewness", 0, &f.Skewness, &truth.Skewness)
		count("kurtosis", 0, &f.ExcessKurtosis, &truth.ExcessKurtosis)
		for i := range cutoffs {
			for kind, name := range names {
				count(name, i, f.Cutoffs[i][kind], truth.Cutoffs[i][kind])
			}
		}
	}
	out := covered{}
	for name := range hits {
		for i, hit := range hits[name] {
			if of[name][i] >= 0.9*float64(samples) { // a pile found in some samples only is a chosen one
				out[name] = append(out[name], hit/of[name][i])
			}
		}
	}
	return out
}

// A slice of the study, seeded: what is in testdata/shape/coverage.md.
func TestCoverage(t *testing.T) {
	if *study {
		writeStudy(t)
	}
	all := populations()
	for _, c := range []struct {
		population int
		name       string
		least      float64
	}{{0, "asymmetry", 0.94}, {0, "rest", 0.94}, {2, "asymmetry", 0.94}, {2, "half-step", 0.92}, {3, "rest", 0.93}, {10, "heaps", 0.94}, {12, "floor", 0.92}} {
		got := mean(all[c.population].cover(100, 60, 200, 1)[c.name])
		assert.GreaterOrEqual(t, got, c.least, "%s, %s", all[c.population].name, c.name)
	}
}

func mean(values []float64) float64 {
	sum := 0.0
	for _, v := range values {
		sum += v
	}
	return sum / float64(len(values))
}

func writeStudy(t *testing.T) {
	columns := []string{"skewness", "kurtosis", "half-step", "asymmetry", "rest", "floor", "ceiling", "heaps"}
	var text strings.Builder
	text.WriteString("Share of 400 samples whose 95% interval holds the population's value, 400\nreplicates each; over nine cutoffs from -2 to 3 SD: mean (least).\n")
	for _, n := range []int{50, 100, 300, 1000} {
		fmt.Fprintf(&text, "\n## %d people\n\n| population | %s |\n|%s\n", n, strings.Join(columns, " | "), strings.Repeat(" --- |", len(columns)+1))
		over := map[string][]float64{}
		for _, q := range populations() {
			got := q.cover(n, 400, 400, 7)
			fmt.Fprintf(&text, "| %s |", q.name)
			for _, name := range columns {
				text.WriteString(cell(got[name], len(got[name]) > 1))
				over[name] = append(over[name], got[name]...)
			}
			text.WriteString("\n")
		}
		text.WriteString("| all |")
		for _, name := range columns {
			text.WriteString(cell(over[name], true))
		}
		text.WriteString("\n")
	}
	require.NoError(t, os.WriteFile(filepath.Join("..", "..", "testdata", "shape", "coverage.md"), []byte(text.String()), 0o644))
}

func cell(values []float64, least bool) string {
	switch {
	case len(values) == 0:
		return " |"
	case !least:
		return fmt.Sprintf(" %.2f |", values[0])
	}
	return fmt.Sprintf(" %.2f (%.2f) |", mean(values), slices.Min(values))
}
