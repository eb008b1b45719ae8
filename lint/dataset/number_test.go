package dataset

import (
	"fmt"
	"math"
	"math/rand/v2"
	"strconv"
	"testing"
)

// The standard library's correctly rounded conversion is the yardstick.
func TestNumbersAreCorrectlyRounded(t *testing.T) {
	texts := []string{"0", "-0", "1", "+1", "-1.5", ".5", "5.", "1e3", "1E-3", "1e+3", "9007199254740992", "9007199254740993",
		"9007199254740992.5", "0.1", "123456789012345678901234567890", "1e22", "1e23", "8.41e21", "2.2250738585072014e-308",
		"4.9e-324", "1.7976931348623157e308", "0.000000000000000000000000000001", "179769313486231570000", "18446744073709551616"}
	r := rand.New(rand.NewPCG(7, 7))
	for range 200_000 {
		switch r.IntN(3) {
		case 0:
			texts = append(texts, fmt.Sprintf("%.*f", r.IntN(12), r.NormFloat64()*math.Pow(10, float64(r.IntN(9)))))
		case 1:
			texts = append(texts, strconv.FormatFloat(math.Float64frombits(r.Uint64()&^(1<<62)), 'g', -1, 64))
		case 2:
			texts = append(texts, strconv.FormatUint(r.Uint64()>>r.IntN(64), 10)+"."+strconv.Itoa(r.IntN(1e6)))
		}
	}
	for _, text := range texts {
		want, err := strconv.ParseFloat(text, 64)
		if err != nil {
			continue
		}
		got, end, ok := scanNumber([]byte(text+",\n"), 0, ',', '.')
		if !ok || end != len(text) || math.Float64bits(got) != math.Float64bits(want) {
			t.Fatalf("%s: got %v (%v), want %v", text, got, ok, want)
		}
		got, end, ok = scanShort([]byte(text+",\n                        "), 0, ',', '.')
		if !ok || end != len(text) || math.Float64bits(got) != math.Float64bits(want) {
			t.Fatalf("%s, the short way: got %v (%v), want %v", text, got, ok, want)
		}
	}
}

func TestWhatIsNotANumber(t *testing.T) {
	for _, text := range []string{"", "-", "+", ".", "e5", "1e", "1e+", "1.2.3", "--1", "0x10", "1_000", "inf", "nan", "1e400", "12a", " 1", "1-2"} {
		if v, _, ok := scanNumber([]byte(text+"\n"), 0, ',', '.'); ok {
			t.Errorf("%q was read as %v", text, v)
		}
		if v, _, ok := scanShort([]byte(text+"\n                        "), 0, ',', '.'); ok {
			t.Errorf("%q was read the short way as %v", text, v)
		}
		if v, ok := parsePlain([]byte(text), '.'); ok {
			t.Errorf("%q was parsed as %v", text, v)
		}
	}
}

func TestThousands(t *testing.T) {
	for text, want := range map[string]string{"1,234": "1234", "12,345,678.9": "12345678.9", "-1,234": "-1234", "999": "999",
		"1,23": "", "1234,567": "", ",123": "", "1,2345": ""} {
		if got := string(stripThousands([]byte(text), []byte(","), '.')); got != want {
			t.Errorf("%q: got %q, want %q", text, got, want)
		}
	}
}

func TestShortNumberDropsNoise(t *testing.T) {
	for v, want := range map[float64]string{0.1 + 0.2: "0.3", 1e-7: "1e-07", 12: "12", -999.9: "-999.9", 0: "0"} {
		if got := shortNumber(v); got != want {
			t.Errorf("%v: got %s, want %s", v, got, want)
		}
	}
}
