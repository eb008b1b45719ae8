package dataset

import (
	"bytes"
	"context"
	"encoding/csv"
	"fmt"
	"math/rand/v2"
	"strconv"
	"testing"

	"lagwise/lint/request"
)

// BenchmarkRead reads 40 MB of five columns from memory.
func BenchmarkRead(b *testing.B) {
	text := benchText()
	b.SetBytes(int64(len(text)))
	b.ReportAllocs()
	for b.Loop() {
		rec := &request.Record{File: "long.csv", HeaderRows: 1}
		if _, trouble := readRecord(context.Background(), bytes.NewReader(text), int64(len(text)), rec, DefaultLimits()); trouble != nil {
			b.Fatal(trouble)
		}
	}
}

// BenchmarkReadDates is the same with a column of instants.
func BenchmarkReadDates(b *testing.B) {
	var text bytes.Buffer
	text.WriteString("time,turbidity\n")
	for i := 0; text.Len() < 8<<20; i++ {
		fmt.Fprintf(&text, "%s,%d.5\n", formatSecond(float64(i)*900), i%977)
	}
	b.SetBytes(int64(text.Len()))
	for b.Loop() {
		rec := &request.Record{File: "long.csv", HeaderRows: 1}
		if _, trouble := readRecord(context.Background(), bytes.NewReader(text.Bytes()), int64(text.Len()), rec, DefaultLimits()); trouble != nil {
			b.Fatal(trouble)
		}
	}
}

// BenchmarkStandardLibrary is the same work by encoding/csv and strconv.
func BenchmarkStandardLibrary(b *testing.B) {
	text := benchText()
	b.SetBytes(int64(len(text)))
	for b.Loop() {
		r := csv.NewReader(bytes.NewReader(text))
		r.ReuseRecord = true
		r.Read()
		columns := make([][]float64, 5)
		for {
			record, err := r.Read()
			if err != nil {
				break
			}
			for i, cell := range record {
				v, _ := strconv.ParseFloat(cell, 64)
				columns[i] = append(columns[i], v)
			}
		}
	}
}

func benchText() []byte {
	r := rand.New(rand.NewPCG(1, 2))
	var text bytes.Buffer
	text.WriteString("t,a,b,c,d\n")
	for i := 0; text.Len() < 40<<20; i++ {
		fmt.Fprintf(&text, "%d,%.5f,%.5f,%.4f,%.3f\n", i, r.NormFloat64(), 10*r.NormFloat64(), 100+r.NormFloat64(), 1000*r.Float64())
	}
	return text.Bytes()
}
