package main

import (
	"fmt"
	"math"
	"math/rand/v2"
	"os"
	"slices"
	"strconv"
	"strings"
	"time"

	"github.com/rogpeppe/go-internal/testscript"
)

// drawStep: draw FILE AXIS ROWS NAME=EXPRESSION… writes a CSV file of seeded
// series. AXIS is year:1967, month:2005, day:2019 or depth:0 (uneven). An
// expression is a sum of terms, each WEIGHT*KIND:SEED: noise, walk, ar0.7 (any
// parameter), line (from 0, up 1 a step), season (a sine of 12 steps), skewed
// (the exponential of a normal deviate), sum:KIND:SEED (its running sum), or
// another column of the same call, by its name.
func drawStep(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 4 {
		ts.Fatalf("usage: draw FILE AXIS ROWS NAME=EXPRESSION…")
	}
	rows, err := strconv.Atoi(args[2])
	ts.Check(err)
	axis, start, _ := strings.Cut(args[1], ":")
	first, err := strconv.Atoi(start)
	ts.Check(err)
	columns := map[string][]float64{}
	names := []string{}
	for _, a := range args[3:] {
		name, expression, _ := strings.Cut(a, "=")
		columns[name] = sum(ts, columns, expression, rows)
		names = append(names, name)
	}
	var b strings.Builder
	fmt.Fprintf(&b, "%s,%s\n", axis, strings.Join(names, ","))
	for i := range rows {
		b.WriteString(position(ts, axis, first, i))
		for _, name := range names {
			fmt.Fprintf(&b, ",%.4f", columns[name][i])
		}
		b.WriteByte('\n')
	}
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), []byte(b.String()), 0o644))
}

func position(ts *testscript.TestScript, axis string, first, i int) string {
	switch axis {
	case "year":
		return strconv.Itoa(first + i)
	case "month":
		return fmt.Sprintf("%d-%02d", first+i/12, i%12+1)
	case "depth": // steps of 1 to 3
		return fmt.Sprintf("%.2f", float64(first)+2*float64(i)+0.5*math.Sin(3*float64(i)))
	case "day":
		return time.Date(first, 1, 1+i, 0, 0, 0, 0, time.UTC).Format(time.DateOnly)
	}
	ts.Fatalf("no axis %q", axis)
	return ""
}

func sum(ts *testscript.TestScript, columns map[string][]float64, expression string, rows int) []float64 {
	total := make([]float64, rows)
	for _, term := range strings.Split(expression, "+") {
		weight, kind := 1.0, term
		if w, rest, ok := strings.Cut(term, "*"); ok {
			var err error
			weight, err = strconv.ParseFloat(w, 64)
			ts.Check(err)
			kind = rest
		}
		for i, v := range one(ts, columns, kind, rows) {
			total[i] += weight * v
		}
	}
	return total
}

func one(ts *testscript.TestScript, columns map[string][]float64, kind string, rows int) []float64 {
	if c, ok := columns[kind]; ok {
		return c
	}
	if of, ok := strings.CutPrefix(kind, "sum:"); ok {
		x := one(ts, columns, of, rows)
		for i := 1; i < rows; i++ {
			x[i] += x[i-1]
		}
		return x
	}
	name, seedText, _ := strings.Cut(kind, ":")
	seed, _ := strconv.ParseUint(seedText, 10, 64)
	e := make([]float64, rows)
	r := rand.New(rand.NewPCG(seed, 7))
	for i := range e {
		e[i] = r.NormFloat64()
	}
	for i := range e {
		switch name {
		case "noise":
		case "line":
			e[i] = float64(i)
		case "season":
			e[i] = math.Sin(2 * math.Pi * float64(i) / 12)
		case "skewed":
			e[i] = math.Exp(e[i])
		case "walk":
			if i > 0 {
				e[i] += e[i-1]
			}
		default:
			phi, err := strconv.ParseFloat(strings.TrimPrefix(name, "ar"), 64)
			ts.Check(err)
			if i == 0 {
				e[i] /= math.Sqrt(1 - phi*phi)
			} else {
				e[i] += phi * e[i-1]
			}
		}
	}
	return e
}

// withoutStep: without FILE ROW… takes data rows out of a CSV file, counted
// from 1 below the header.
func withoutStep(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) < 2 {
		ts.Fatalf("usage: without FILE ROW…")
	}
	var kept strings.Builder
	for i, line := range strings.SplitAfter(ts.ReadFile(args[0]), "\n") {
		if !slices.Contains(args[1:], strconv.Itoa(i)) {
			kept.WriteString(line)
		}
	}
	ts.Check(os.WriteFile(ts.MkAbs(args[0]), []byte(kept.String()), 0o644))
}

// hostileStep: hostile KIND FILE makes what is too large or too odd to stand in
// a scenario.
func hostileStep(ts *testscript.TestScript, neg bool, args []string) {
	if neg || len(args) != 2 {
		ts.Fatalf("usage: hostile KIND FILE")
	}
	path := ts.MkAbs(args[1])
	text, ok := hostileText(args[0])
	switch {
	case ok:
		ts.Check(os.WriteFile(path, []byte(text), 0o644))
	case args[0] == "fifo":
		ts.Check(makeFIFO(path))
	default:
		ts.Fatalf("no hostile input of kind %q", args[0])
	}
}

func hostileText(kind string) (string, bool) {
	switch kind {
	case "binary":
		r := rand.New(rand.NewPCG(1, 2))
		b := make([]byte, 4096)
		for i := range b {
			b[i] = byte(r.Uint32())
		}
		return string(b), true
	case "wide": // 50,000 columns
		return "year" + strings.Repeat(",x", 50_000) + "\n1967" + strings.Repeat(",1", 50_000) + "\n", true
	case "deep": // 20,000 brackets
		return "between = " + strings.Repeat("[", 20_000) + "\n", true
	case "huge": // above the limit of 64 MB
		return strings.Repeat("# "+strings.Repeat("x", 1021)+"\n", 65<<10), true
	case "invalid-utf8":
		return "[[correlation]]\nname = \"\xff\xfe\"\naim = \"association\"\nbetween = [\"rain\", \"gales\"]\n", true
	case "nul":
		return "[[correlation]]\nquestion = \"a\x00b\"\naim = \"association\"\nbetween = [\"rain\", \"gales\"]\n", true
	case "header-only":
		return "year,eelgrass,boats\n", true
	case "empty":
		return "", true
	}
	return "", false
}
