package curve_test

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"gonum.org/v1/gonum/floats/scalar"

	"tailgap/core/curve"
)

// Abramowitz & Stegun (1964), Table 26.1, P(x), as quoted in public check
// files; the far tails are R 4.2.2's pnorm(z, lower.tail = FALSE).
func TestUpperTail(t *testing.T) {
	for _, want := range []struct{ z, share float64 }{
		{0, 0.5},
		{0.1, 1 - 0.539827837277029},
		{0.5, 1 - 0.691462461274013},
		{1, 1 - 0.841344746068543},
		{2, 1 - 0.977249868051821},
		{-1, 0.841344746068543},
		{6, 9.865876450376946e-10},
		{9, 1.1285884059538324e-19},
		{20, 2.7536241186062337e-89},
		{37, 5.725571222524576e-300},
	} {
		assert.InDelta(t, want.share, curve.UpperTail(want.z), 2e-15, want.z)
		assert.InEpsilon(t, want.share, curve.UpperTail(want.z), 1e-13, want.z)
		share, _ := curve.Tail(want.z)
		assert.InEpsilon(t, want.share, share, 1e-12, want.z)
	}
}

// Wichura (1988), Algorithm AS 241, test values in its text; 0.975 is in any
// table; the last two are R 4.2.2's qnorm(share, lower.tail = FALSE).
func TestQuantile(t *testing.T) {
	for _, want := range []struct{ share, z float64 }{
		{0.25, 0.6744897501960817},
		{0.001, 3.090232306167814},
		{1e-20, 9.262340089798408},
		{0.975, -1.959963984540054},
		{1e-100, 21.273453560965319},
		{1e-300, 37.047096299361201},
	} {
		assert.InEpsilon(t, want.z, curve.Quantile(want.share), 1e-14, want.share)
		assert.InEpsilon(t, want.share, curve.UpperTail(curve.Quantile(want.share)), 1e-12, want.share)
	}
	assert.Zero(t, curve.Quantile(0.5))
	for share := 0.001; share < 0.5; share += 0.001 {
		assert.InDelta(t, share, curve.UpperTail(curve.Quantile(share)), 1e-15)
		assert.InDelta(t, 1-share, curve.UpperTail(curve.Quantile(1-share)), 1e-15)
	}
}

func TestTailAgreesWithErfc(t *testing.T) {
	for z := -36.0; z <= 36; z += 1.0 / 1024 {
		share, density := curve.Tail(z)
		tolerance := 1e-14
		if math.Abs(z) >= 8 {
			tolerance = 1e-12
		}
		want := curve.UpperTail(z)
		if !scalar.EqualWithinRel(want, share, tolerance) {
			t.Fatalf("share beyond %v: want %.17g, got %.17g", z, want, share)
		}
		if !scalar.EqualWithinRel(curve.Density(z), density, 1e-14) {
			t.Fatalf("density at %v: want %.17g, got %.17g", z, curve.Density(z), density)
		}
	}
	for _, z := range []float64{39, 1e10, math.Inf(1)} {
		share, density := curve.Tail(z)
		assert.Less(t, share, 1e-300)
		assert.Zero(t, density)
		share, _ = curve.Tail(-z)
		assert.Equal(t, 1.0, share)
	}
}

func BenchmarkTail(b *testing.B) {
	z, sink := 0.0, 0.0
	for b.Loop() {
		z += 0.01
		if z > 4 {
			z = -4
		}
		share, density := curve.Tail(z)
		sink += share + density
	}
	_ = sink
}

func BenchmarkErfcAndExp(b *testing.B) {
	z, sink := 0.0, 0.0
	for b.Loop() {
		z += 0.01
		if z > 4 {
			z = -4
		}
		sink += curve.UpperTail(z) + curve.Density(z)
	}
	_ = sink
}
