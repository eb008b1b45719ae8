package dataset

import (
	"bufio"
	"compress/gzip"
	"errors"
	"io"
	"strings"

	"golang.org/x/text/encoding"
	"golang.org/x/text/encoding/charmap"
	"golang.org/x/text/encoding/unicode"
	"golang.org/x/text/transform"

	"lagwise/lint/request"
)

// decoderOf returns the decoder of a declared encoding, nil for UTF-8.
func decoderOf(name string) (encoding.Encoding, *Trouble) {
	switch strings.ToLower(name) {
	case "", "utf-8", "utf8":
		return nil, nil
	case "utf-16":
		return unicode.UTF16(unicode.LittleEndian, unicode.UseBOM), nil
	case "latin-1", "iso-8859-1":
		return charmap.ISO8859_1, nil
	case "windows-1252":
		return charmap.Windows1252, nil
	}
	return nil, unreadable("encoding = %q is not known; write utf-8, utf-16, latin-1 or windows-1252", name)
}

// openText lays decompression and decoding over a file: what it returns is
// UTF-8 without a byte order mark, if the file is what it is said to be.
func openText(f io.Reader, rec *request.Record, limits Limits) (io.Reader, *Trouble) {
	decoder, trouble := decoderOf(rec.Encoding)
	if trouble != nil {
		return nil, trouble
	}
	var text io.Reader = f
	if strings.HasSuffix(strings.ToLower(rec.File), ".gz") {
		counted := &counter{r: f}
		unzipped, err := gzip.NewReader(bufio.NewReader(counted))
		if err != nil {
			return nil, unreadable("%q is not a gzip file, although its name ends in .gz", rec.File)
		}
		text = &bounded{r: unzipped, compressed: counted, limits: limits}
	}
	peeked := bufio.NewReaderSize(text, 16)
	mark, _ := peeked.Peek(3)
	switch {
	case decoder != nil:
	case len(mark) >= 2 && (mark[0] == 0xFF && mark[1] == 0xFE || mark[0] == 0xFE && mark[1] == 0xFF):
		decoder = unicode.UTF16(unicode.LittleEndian, unicode.UseBOM)
	case string(mark) == "\xEF\xBB\xBF":
		peeked.Discard(3)
	}
	if decoder != nil {
		return transform.NewReader(peeked, decoder.NewDecoder()), nil
	}
	return peeked, nil
}

// counter counts the bytes read through it.
type counter struct {
	r    io.Reader
	read int64
}

func (c *counter) Read(p []byte) (int, error) {
	n, err := c.r.Read(p)
	c.read += int64(n)
	return n, err
}

var errRatio = errors.New("the compression ratio is beyond the limit")

// bounded stops a compressed file that grows beyond the ratio limit.
type bounded struct {
	r          io.Reader
	compressed *counter
	limits     Limits
	out        int64
}

func (b *bounded) Read(p []byte) (int, error) {
	n, err := b.r.Read(p)
	b.out += int64(n)
	if b.out > b.limits.RatioAfter && b.out > b.limits.Ratio*max(1, b.compressed.read) {
		return 0, errRatio
	}
	return n, err
}

// blocks hands out a text in stretches that are refilled in place.
type blocks struct {
	r     io.Reader
	buf   []byte
	start int // first byte not consumed
	end   int
	done  bool // everything was read; the text ends with a line end
	most  int64
}

const blockBytes = 512 << 10

func newBlocks(r io.Reader, limits Limits) *blocks {
	return &blocks{r: r, buf: make([]byte, blockBytes), most: limits.LineBytes}
}

// text returns what was read and not consumed.
func (b *blocks) text() []byte { return b.buf[b.start:b.end] }

// fill reads more behind what is not consumed yet. A text whose last line has
// no line end gets one.
func (b *blocks) fill() error {
	copy(b.buf, b.buf[b.start:b.end])
	b.start, b.end = 0, b.end-b.start
	if b.end > len(b.buf)/2 {
		b.buf = append(b.buf, make([]byte, len(b.buf))...)
	}
	for b.end < len(b.buf)-1 {
		n, err := b.r.Read(b.buf[b.end : len(b.buf)-1])
		b.end += n
		if err == io.EOF {
			b.done = true
			if b.end > 0 && b.buf[b.end-1] != '\n' {
				b.buf[b.end] = '\n'
				b.end++
			}
			return nil
		}
		if err != nil {
			return err
		}
	}
	return nil
}
