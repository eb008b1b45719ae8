package main

import (
	"context"
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"lagwise/lint/engine"
	"lagwise/rules"
)

func BenchmarkJudgeMany(b *testing.B) {
	dir := b.TempDir()
	os.Mkdir(filepath.Join(dir, ".git"), 0o755)
	r := rand.New(rand.NewPCG(1, 2))
	var cols [][]float64
	for range 50 {
		x := make([]float64, 1000)
		for t := range x {
			x[t] = r.NormFloat64()
			if t > 0 {
				x[t] += x[t-1]
			}
		}
		cols = append(cols, x)
	}
	var csv strings.Builder
	csv.WriteString("year")
	for i := range cols {
		fmt.Fprintf(&csv, ",s%d", i)
	}
	for row := range 1000 {
		fmt.Fprintf(&csv, "\n%d", 1000+row)
		for _, c := range cols {
			fmt.Fprintf(&csv, ",%.4f", c[row])
		}
	}
	writeAll(b, filepath.Join(dir, "many.csv"), csv.String()+"\n")
	writeAll(b, filepath.Join(dir, "many.series.toml"), "[record.many]\nfile = \"many.csv\"\n")
	var an strings.Builder
	for i := range 200 {
		fmt.Fprintf(&an, "[[correlation]]\nname = \"r%d\"\naim = \"association\"\nquestion = \"q\"\nbetween = [\"s%d\", \"s%d\"]\n\n", i, i%50, (i*7+1+i/50)%50)
	}
	path := filepath.Join(dir, "many.analysis.toml")
	writeAll(b, path, an.String())
	w := engine.New(engine.Options{Rules: rules.All(), OnDate: "2026-01-01"}).Workspace(dir)
	text := an.String()
	w.Open(path, []byte(text), 0)
	if j, err := w.Edition().Judge(context.Background(), path); err != nil || len(j.Findings) < 100 {
		b.Fatal(err, len(j.Findings))
	}
	i := 0
	for b.Loop() {
		i++
		text = strings.Replace(text, "question = \"q", "question = \"qx", 1)
		w.Change(path, []byte(text), int32(i))
		if _, err := w.Edition().Judge(context.Background(), path); err != nil {
			b.Fatal(err)
		}
	}
}
