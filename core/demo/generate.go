package demo

import (
	"bytes"
	"fmt"
	"math/rand/v2"
	"strconv"
)

const (
	seed     = 10 // fixed: the demo never changes
	stream   = 37
	learners = 412
	header   = "words_per_minute,vocabulary,form_minutes,years_away,site,class_id,weight\n"
)

// Weights are in hundredths: the smaller the part of a site's learners that
// was tested, the more each of them stands for.
var sites = [...]struct {
	name   string
	weight int
}{{"North", 80}, {"Harbour", 100}, {"Mill", 140}}

// CSV writes the demo: a header and 412 learners, class by class. Every draw
// is a whole number, so that no rounding can differ between machines.
func CSV() []byte {
	draw := rand.New(rand.NewPCG(seed, stream))
	var out bytes.Buffer
	out.WriteString(header)
	for class, rows := 1, 0; rows < learners; class++ {
		site := sites[draw.IntN(len(sites))]
		pace := draw.IntN(9) - 4 // classes differ a little in reading speed
		size := 9 + draw.IntN(8)
		for ; size > 0 && rows < learners; size-- {
			weight := site.weight + draw.IntN(21) - 10
			fmt.Fprintf(&out, "%s,%s,%s,%s,%s,%s%02d,%d.%02d\n",
				missing(draw, 1, "", wordsPerMinute(draw, pace)),
				missing(draw, 2, "99", vocabulary(draw)),
				missing(draw, 2, "-9", formMinutes(draw)),
				missing(draw, 1, "", yearsAway(draw)),
				site.name, site.name[:1], class, weight/100, weight%100)
			rows++
		}
	}
	return out.Bytes()
}

// missing leaves a cell blank in about percent of the rows, and puts the code
// in as many others.
func missing(draw *rand.Rand, percent int, code string, value int) string {
	switch lot := draw.IntN(100); {
	case lot < percent:
		return ""
	case lot < 2*percent && code != "":
		return code
	}
	return strconv.Itoa(value)
}

// wordsPerMinute is near normal: a sum of twelve even draws, mean 60, SD 12.
func wordsPerMinute(draw *rand.Rand, pace int) int {
	words := -6 + pace
	for range 12 {
		words += draw.IntN(12)
	}
	return words
}

// vocabulary counts the words known of 37. Most learners know most of them;
// one in fifteen has hardly begun.
func vocabulary(draw *rand.Rand) int {
	chance := max(draw.IntN(1000), draw.IntN(1000), draw.IntN(1000))
	if draw.IntN(15) == 0 {
		chance = draw.IntN(350)
	}
	known := 0
	for range 37 {
		if draw.IntN(1000) < chance {
			known++
		}
	}
	return known
}

// formMinutes is the time a form took: long waits on the right, and three in
// five were noted to the nearest five minutes.
func formMinutes(draw *rand.Rand) int {
	minutes := 8 + wait(draw, 8) + wait(draw, 8) + wait(draw, 8)
	if draw.IntN(5) < 3 {
		return (minutes + 2) / 5 * 5
	}
	return minutes
}

// yearsAway is how long ago school ended before its time: for many, never.
func yearsAway(draw *rand.Rand) int {
	if draw.IntN(100) < 42 {
		return 0
	}
	return min(1+wait(draw, 8), 40)
}

// wait counts the failures before a success of chance 1 in n: geometric, mean
// n-1.
func wait(draw *rand.Rand, n int) int {
	failures := 0
	for draw.IntN(n) != 0 {
		failures++
	}
	return failures
}
