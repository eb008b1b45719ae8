package document

import (
	"bytes"
	"fmt"
	"strings"
	"testing"
)

// analysis is an analysis document of at least size bytes.
func analysis(size int) []byte {
	var b bytes.Buffer
	for i := 0; b.Len() < size; i++ {
		fmt.Fprintf(&b, "[[correlation]]\nname = \"pair-%d\"      # of the long records\nbetween = [\"eelgrass\", \"boats_%d\"]\n"+
			"on-each = { boats = [\"log\"] }\nalpha = 0.05\nuntil = 2020-06-30\n\n", i, i)
	}
	return b.Bytes()
}

func BenchmarkParse100kB(b *testing.B) {
	text := analysis(100_000)
	b.SetBytes(int64(len(text)))
	b.ReportAllocs()
	for b.Loop() {
		Parse(text)
	}
}

func BenchmarkParse100kBWithABrokenLine(b *testing.B) {
	text := bytes.Replace(analysis(100_000), []byte("alpha = 0.05"), []byte("alpha = "), 1)
	b.SetBytes(int64(len(text)))
	for b.Loop() {
		Parse(text)
	}
}

// hostile are texts in which every line is broken in its own way; the time per
// byte must not grow with the number of lines.
var hostile = map[string]string{
	"words":         "be\n",
	"no value":      "between =\n",
	"open array":    "between = [\n",
	"open table":    "a = {\nb = [\n",
	"open nested":   "x = [\n{\n",
	"indented":      "   x = {\n",
	"flat open":     "a = {\nb = 1,\nc = 2,\n",
	"open strings":  "a = \"\"\"\nb = '''\n",
	"escaped":       "a = \"\"\"\\q\\\"\"\"\n",
	"headers":       "[[corr\n",
	"closers":       "]}\n",
	"brackets":      "[[[[[[[[\n",
	"mixed closers": "x = [[[[[[[[}}}}}}}}\n",
	"array of junk": "x = [1, 2\n[a, b],\n",
	"duplicates":    "a = 1\n",
	"tables":        "[a]\n",
	"control":       "a = \x00\n",
}

func BenchmarkBroken100000Lines(b *testing.B) {
	for name, line := range hostile {
		for _, lines := range []int{25_000, 100_000} {
			text := []byte(strings.Repeat(line, lines/strings.Count(line, "\n")))
			b.Run(fmt.Sprintf("%s/%d", name, lines), func(b *testing.B) {
				b.SetBytes(int64(len(text)))
				for b.Loop() {
					Parse(text)
				}
			})
		}
	}
}
