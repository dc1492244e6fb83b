package intake_test

import (
	"bytes"
	"context"
	"fmt"
	"math/rand/v2"
	"testing"

	"tailgap/core/intake"
	"tailgap/core/sample"
)

// The main job's large file is a million rows of ids and whole-number scores.
func BenchmarkRead(b *testing.B) {
	const rows = 1_000_000
	tables := []struct{ name, header, row, end string }{
		{"ids and whole numbers", "id,score", "%d,%d", "\n"},
		{"CRLF", "id,score", "%d,%d", "\r\n"},
		{"quoted", "id,score", `"%d","%d"`, "\n"},
		{"decimal commas", "id;score", "%d;%d,25", "\n"},
		{"many digits", "id\tscore", "%d\t%d.25341234567890123", "\n"},
		{"seven columns", "id,a,b,c,score,d,e", "%d,12.5,North,x3,%d,,0.75", "\n"},
	}
	for _, table := range tables {
		draw := rand.New(rand.NewPCG(1, 2))
		var text bytes.Buffer
		text.WriteString(table.header + table.end)
		for i := range rows {
			fmt.Fprintf(&text, table.row+table.end, i+1, draw.IntN(84))
		}
		b.Run(table.name, func(b *testing.B) {
			b.SetBytes(int64(text.Len()))
			b.ReportAllocs()
			for b.Loop() {
				s := read(b, text.Bytes(), intake.Options{Scores: []string{"score"}, Missing: []string{"-9", "99"}})
				if len(s.Columns[0].Scores) != rows {
					b.Fatal("rows were lost")
				}
			}
		})
	}
}

func BenchmarkReadOneColumn(b *testing.B) {
	text := bytes.Repeat([]byte("54\n12\n-9\n"), 333_333)
	b.ReportAllocs()
	for b.Loop() {
		read(b, text, intake.Options{Missing: []string{"-9"}})
	}
}

func read(b *testing.B, text []byte, options intake.Options) sample.Sample {
	b.Helper()
	s, err := intake.Read(context.Background(), []intake.Source{{Reader: bytes.NewReader(text)}}, options)
	if err != nil {
		b.Fatal(err)
	}
	return s
}
