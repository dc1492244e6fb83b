package main

import (
	"fmt"
	"io"
	"os"
	"strings"
	"time"
)

const (
	barWidth = 30
	barDelay = 300 * time.Millisecond // a bar that flashes up tells nothing
	barEvery = 100 * time.Millisecond
)

// bar shows how far the work is, on one line of a terminal. Its zero value
// shows nothing.
type bar struct {
	to           io.Writer
	now          func() time.Time
	label        string
	begun, drawn time.Time
	shown        int // width of the line on the screen
}

// newBar makes a bar on stderr when that is a terminal.
func (p *program) newBar() *bar {
	if !p.terminal(p.stderr) {
		return &bar{}
	}
	return &bar{to: p.stderr, now: time.Now}
}

// show draws what share of the work named by label is done.
func (b *bar) show(label string, done, total int64) {
	if b.to == nil || total <= 0 {
		return
	}
	now := b.now()
	if b.label != label {
		b.label, b.begun, b.drawn = label, now, now.Add(barDelay-barEvery)
	}
	if now.Sub(b.drawn) < barEvery {
		return
	}
	b.drawn = now
	b.draw(barLine(label, min(1, float64(done)/float64(total)), now.Sub(b.begun)))
}

// barLine words the bar; the time left supposes that the rest takes its share
// of the time the part done took.
func barLine(label string, share float64, spent time.Duration) string {
	filled := int(share * barWidth)
	line := fmt.Sprintf("%s [%s%s] %3.0f%%", label, strings.Repeat("#", filled), strings.Repeat(" ", barWidth-filled), 100*share)
	if share > 0 {
		left := time.Duration(float64(spent) * (1 - share) / share)
		line += fmt.Sprintf(", %s left", left.Round(time.Second))
	}
	return line
}

func (b *bar) draw(line string) {
	fmt.Fprintf(b.to, "\r%-*s", b.shown, line)
	b.shown = len(line)
}

// clear takes the bar off the screen.
func (b *bar) clear() {
	if b.shown > 0 {
		b.draw("")
		fmt.Fprint(b.to, "\r")
		b.shown = 0
	}
}

// terminal is true for a stream that a person looks at.
func terminal(stream any) bool {
	file, ok := stream.(*os.File)
	if !ok {
		return false
	}
	info, err := file.Stat()
	return err == nil && info.Mode()&os.ModeCharDevice != 0
}
