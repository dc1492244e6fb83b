package intake

import (
	"bytes"
	"context"
	"errors"
	"fmt"
	"io"
	"strings"
)

// longestRow is far beyond any row of scores, and little enough to hold in
// memory a few times over: a quote that is never closed must not load the
// rest of a large file.
const longestRow = 16 << 20

const byteOrderMark = "\xef\xbb\xbf"

// foreign are the first bytes of what people take for text, and what to do.
var foreign = [...]struct{ mark, message string }{
	{"PK\x03\x04", "this is a spreadsheet workbook or another packed file, not text; save the sheet as CSV (UTF-8) and use that"},
	{"\xd0\xcf\x11\xe0", "this is a spreadsheet workbook, not text; save the sheet as CSV (UTF-8) and use that"},
	{"\x1f\x8b", "this is a compressed file; unpack it and use what is inside"},
	{"\xff\xfe", "this is text in UTF-16; save it as CSV (UTF-8) and use that"},
	{"\xfe\xff", "this is text in UTF-16; save it as CSV (UTF-8) and use that"},
}

// plainText hands a source on as clean text: no byte order mark, line ends LF
// or CR LF. It fails, and keeps failing, at a zero byte, at a row that has no
// end, where the source fails, and when the context has ended.
type plainText struct {
	ctx     context.Context
	source  io.Reader
	err     error
	afterCR bool
	lines   int   // line ends handed on so far
	handed  int64 // bytes handed on so far

	// Kept by the reader of rows, to know how long the present row is.
	rowStart int64
	rowAfter int // the last line before it
}

// newPlainText looks at the first bytes. Its error is a sentence for the user.
func newPlainText(ctx context.Context, source io.Reader) (*plainText, error) {
	head := make([]byte, 4)
	n, err := io.ReadFull(source, head)
	if err != nil && err != io.EOF && err != io.ErrUnexpectedEOF {
		return nil, stopped(0, err)
	}
	head = head[:n]
	for _, f := range foreign {
		if strings.HasPrefix(string(head), f.mark) {
			return nil, errors.New(f.message)
		}
	}
	head = bytes.TrimPrefix(head, []byte(byteOrderMark))
	return &plainText{ctx: ctx, source: io.MultiReader(bytes.NewReader(head), source)}, nil
}

// Read implements io.Reader.
func (t *plainText) Read(p []byte) (int, error) {
	if t.err == nil && t.handed-t.rowStart > longestRow {
		where := "the first row"
		if t.rowAfter > 0 {
			where = fmt.Sprintf("the row below line %d", t.rowAfter)
		}
		t.err = fmt.Errorf("%s is longer than %d million bytes; close the quote that is open there, or check that this is a file of scores", where, longestRow>>20)
	}
	if err := t.ctx.Err(); err != nil && t.err == nil {
		t.err = stopped(t.lines, err)
	}
	if t.err != nil {
		return 0, t.err
	}
	n, err := t.source.Read(p)
	zero := bytes.IndexByte(p[:n], 0)
	if zero >= 0 {
		n = zero
	}
	n = t.unifyLineEnds(p[:n])
	t.lines += bytes.Count(p[:n], []byte{'\n'})
	t.handed += int64(n)
	switch {
	case zero >= 0:
		t.err = fmt.Errorf("line %d holds a zero byte, so this isn't plain text; save it as CSV (UTF-8) and use that", t.lines+1)
	case err != nil && err != io.EOF:
		t.err = stopped(t.lines, err)
	default:
		t.err = err
	}
	if n > 0 {
		return n, nil
	}
	return 0, t.err
}

// unifyLineEnds rewrites p in place and returns its new length. A CR alone
// becomes LF; CR LF stays, since the csv reader takes it for one line end. A
// CR at the end of p is a line end at once, and the LF that may follow it in
// the next chunk is left out.
func (t *plainText) unifyLineEnds(p []byte) int {
	if len(p) == 0 {
		return 0
	}
	if t.afterCR && p[0] == '\n' {
		p = p[:copy(p, p[1:])]
	}
	t.afterCR = len(p) > 0 && p[len(p)-1] == '\r'
	for rest := p; ; {
		i := bytes.IndexByte(rest, '\r')
		if i < 0 {
			return len(p)
		}
		if i+1 == len(rest) || rest[i+1] != '\n' {
			rest[i] = '\n'
		}
		rest = rest[i+1:]
	}
}

func stopped(lines int, err error) error {
	if lines == 0 {
		return fmt.Errorf("reading stopped before the first line ended: %w", err)
	}
	return fmt.Errorf("reading stopped after line %d: %w", lines, err)
}
