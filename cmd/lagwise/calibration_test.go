package main

import (
	"bytes"
	"context"
	"encoding/json"
	"flag"
	"fmt"
	"io"
	"maps"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"slices"
	"strconv"
	"strings"
	"testing"

	"lagwise/stats/association"
)

var (
	calibrationPairs = flag.Int("pairs", 200, "pairs of series a cell of the calibration")
	calibrationRows  = flag.Int("rows", 100, "rows of a series (the seasonal families take a fifth more)")
	calibrationOnly  = flag.String("only", "", "only families whose name holds this")
	calibrationAsks  = flag.Int("asks", 2, "how many of the kinds of request: 2 are correlation and regression, 7 all")
)

// asks are the kinds of request that the calibration asks: how each is written
// for the pair number i, and whether a third series stands beside it.
var asks = []struct {
	name    string
	control func(*rand.Rand, []float64) []float64 // nil: no third series
	text    string
}{
	{"correlation", nil, "[[correlation]]\nname = \"p%[1]d\"\naim = \"association\"\nbetween = [\"a%[1]d\", \"b%[1]d\"]\n\n"},
	{"regression", nil, "[[regression]]\nname = \"p%[1]d\"\naim = \"effect\"\nresponse = \"a%[1]d\"\npredictors = [\"b%[1]d\"]\n\n"},
	{"spearman", nil, "[[correlation]]\nname = \"p%[1]d\"\naim = \"association\"\nbetween = [\"a%[1]d\", \"b%[1]d\"]\ncoefficient = \"spearman\"\n\n"},
	{"kendall", nil, "[[correlation]]\nname = \"p%[1]d\"\naim = \"association\"\nbetween = [\"a%[1]d\", \"b%[1]d\"]\ncoefficient = \"kendall\"\n\n"},
	{"partial, white", autoregression(0), "[[correlation]]\nname = \"p%[1]d\"\naim = \"association\"\nbetween = [\"a%[1]d\", \"b%[1]d\"]\ngiven = [\"c%[1]d\"]\n\n"},
	{"partial, AR 0.8", autoregression(0.8), "[[correlation]]\nname = \"p%[1]d\"\naim = \"association\"\nbetween = [\"a%[1]d\", \"b%[1]d\"]\ngiven = [\"c%[1]d\"]\n\n"},
	{"two predictors", autoregression(0.8), "[[regression]]\nname = \"p%[1]d\"\naim = \"effect\"\nresponse = \"a%[1]d\"\npredictors = [\"b%[1]d\", \"c%[1]d\"]\n\n"},
}

// cell is one cell of the table: a family, a kind of request, related or not.
type cell struct {
	family
	kind int // of asks
	rho  float64
}

// outcome is what a cell gives.
type outcome struct {
	flagged, rejected, oracle, left float64 // shares of the pairs
	chosen                          map[string]int
}

// BenchmarkCalibration repeats the simulation behind the decision procedure,
// end to end through review, amend and compute on generated labs, and prints
// its table: the share of pairs with a drifting series that are flagged, the
// share of unrelated pairs below 0.05 after the preferred rewrites, and the
// share of related ones beside the usual test of their true innovations.
//
//	go test ./cmd/lagwise -run '^$' -bench Calibration -benchtime 1x -pairs 1000
func BenchmarkCalibration(b *testing.B) {
	for b.Loop() {
		fmt.Printf("\n%d pairs a cell, %d rows\n%-28s %-16s %8s %8s %8s %8s %6s  %s\n", *calibrationPairs, *calibrationRows,
			"family", "request", "flagged", "size", "power", "oracle", "ratio", "chosen for unrelated pairs")
		for _, f := range families() {
			if !strings.Contains(f.name, *calibrationOnly) {
				continue
			}
			for kind := range min(*calibrationAsks, len(asks)) {
				unrelated := measure(b, cell{f, kind, 0})
				related := measure(b, cell{f, kind, 0.4})
				fmt.Printf("%-28s %-16s %8.3f %8.3f %8.3f %8.3f %6.2f  %s\n", f.name, asks[kind].name, unrelated.flagged, unrelated.rejected,
					related.rejected, related.oracle, related.rejected/related.oracle, mostChosen(unrelated.chosen))
			}
		}
	}
}

func mostChosen(chosen map[string]int) string {
	best := []string{}
	for range 3 {
		name, most := "", 0
		for k, v := range chosen {
			if v > most || v == most && k < name {
				name, most = k, v
			}
		}
		if most > 0 {
			best = append(best, fmt.Sprintf("%s %d", name, most))
			delete(chosen, name)
		}
	}
	return strings.Join(best, "; ")
}

// measure makes the lab of a cell and takes it through the commands.
func measure(b testing.TB, c cell) outcome {
	dir := b.TempDir()
	oracle := writeLab(b, dir, c)
	analysis := filepath.Join(dir, "pairs.analysis.toml")
	reviewed := commandOutput(b, "review", "--as", "json", analysis)
	var seen struct {
		Findings []struct{ Rule, Request string }
	}
	decode(b, reviewed, &seen)
	flagged := map[string]bool{}
	for _, f := range seen.Findings {
		switch f.Rule {
		case "shared-drift", "one-sided-drift", "drifting-regression":
			flagged[f.Request] = true
		}
	}
	commandOutput(b, "amend", "--quiet", analysis)
	var computed struct {
		Results []struct {
			Request   string
			AsWritten struct {
				On        []string
				Inference string
				P         *float64
				Process   struct{ Process string } `json:"error-process"`
			} `json:"as-written"`
		}
	}
	decode(b, commandOutput(b, "compute", "--as", "json", analysis), &computed)
	o := outcome{oracle: oracle, chosen: map[string]int{}}
	n := float64(*calibrationPairs)
	for _, r := range computed.Results {
		if flagged[r.Request] {
			o.flagged += 1 / n
		}
		if r.AsWritten.P == nil {
			o.left += 1 / n
		} else if *r.AsWritten.P < 0.05 {
			o.rejected += 1 / n
		}
		o.chosen[strings.TrimSpace(strings.Join(r.AsWritten.On, "+")+" "+r.AsWritten.Inference+" "+r.AsWritten.Process.Process)]++
	}
	return o
}

func decode(b testing.TB, text []byte, into any) {
	if err := json.Unmarshal(text, into); err != nil {
		b.Fatalf("%v in %.300s", err, text)
	}
}

// commandOutput runs one command of the program and returns what it printed.
func commandOutput(b testing.TB, args ...string) []byte {
	var out, trouble bytes.Buffer
	if status := run(context.Background(), streams{nil, &out, &trouble}, args); status == exitFailed {
		b.Fatalf("lagwise %s: %s", strings.Join(args, " "), trouble.String())
	}
	_, _ = io.Copy(io.Discard, &trouble)
	return out.Bytes()
}

// writeLab writes the data, the manifest and the analysis of a cell; it
// returns the share of pairs whose true innovations the usual test relates.
func writeLab(b testing.TB, dir string, c cell) float64 {
	rows := *calibrationRows
	if c.season > 0 {
		rows = rows * 6 / 5
	}
	seed := rand.NewPCG(uint64(len(c.name))*7919+uint64(c.rho*1000), uint64(c.kind)+uint64(c.name[0])<<8+uint64(c.name[len(c.name)-1])<<16)
	r := rand.New(seed)
	pairs := *calibrationPairs
	columns := map[byte][][]float64{}
	hits := 0.0
	var analysis strings.Builder
	for i := range pairs {
		x, y, ex, ey := c.make(r, rows, c.rho)
		columns['a'], columns['b'] = append(columns['a'], x), append(columns['b'], y)
		if control := asks[c.kind].control; control != nil {
			e, _ := innovations(r, rows, 0)
			columns['c'] = append(columns['c'], control(r, e))
		}
		fmt.Fprintf(&analysis, asks[c.kind].text, i)
		if got, err := association.Pearson(ex, ey, []int{rows}, association.Inference{Level: 0.95}); err == nil && got.P < 0.05 {
			hits++
		}
	}
	writeAll(b, filepath.Join(dir, "pairs.analysis.toml"), analysis.String())
	step := "P1Y"
	if c.season > 0 {
		step = "P1M"
	}
	writeAll(b, filepath.Join(dir, "lab.series.toml"),
		fmt.Sprintf("[record.all]\nfile = \"all.csv\"\nalong = { column = \"time\", kind = \"time\", step = %q }\n", step))
	writeAll(b, filepath.Join(dir, "all.csv"), table(columns, rows, c.season > 0))
	return hits / float64(pairs)
}

func writeAll(b testing.TB, path, text string) {
	if err := os.WriteFile(path, []byte(text), 0o644); err != nil {
		b.Fatal(err)
	}
}

func table(columns map[byte][][]float64, rows int, monthly bool) string {
	var t strings.Builder
	t.WriteString("time")
	letters := slices.Sorted(maps.Keys(columns))
	for _, letter := range letters {
		for i := range columns[letter] {
			fmt.Fprintf(&t, ",%c%d", letter, i)
		}
	}
	for row := range rows {
		if monthly {
			fmt.Fprintf(&t, "\n%04d-%02d", 1990+row/12, row%12+1)
		} else {
			fmt.Fprintf(&t, "\n%d", 1900+row)
		}
		for _, letter := range letters {
			for _, c := range columns[letter] {
				t.WriteByte(',')
				t.WriteString(strconv.FormatFloat(math.Round(c[row]*1e6)/1e6, 'f', -1, 64))
			}
		}
	}
	t.WriteByte('\n')
	return t.String()
}
