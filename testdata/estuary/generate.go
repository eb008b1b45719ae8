//go:build ignore

// Generate writes the data of the Aldermere estuary, an invented place: every
// number is drawn from a seeded generator, and each series is built to show
// one thing. Run it from the top of the module:
//
//	go run testdata/estuary/generate.go            # into testdata/estuary/data
//	go run testdata/estuary/generate.go FOLDER     # somewhere else
//
// The same bytes come out on every run, and a test holds that they are those
// in the tree.
package main

import (
	"fmt"
	"log"
	"math"
	"math/rand/v2"
	"os"
	"path/filepath"
	"strings"
	"time"
)

func main() {
	folder := "testdata/estuary/data"
	if len(os.Args) > 1 {
		folder = os.Args[1]
	}
	for name, text := range map[string]string{
		"shore-annual.csv":    shore(),
		"weir-annual.csv":     weir(),
		"sonde-monthly.csv":   sonde(),
		"turbidity-daily.csv": turbidity(),
	} {
		if err := os.WriteFile(filepath.Join(folder, name), []byte(text), 0o644); err != nil {
			log.Fatal(err)
		}
	}
}

// source is one stream of normal deviates; each series has its own, so that
// changing one leaves the others as they are.
type source struct{ *rand.Rand }

func seeded(seed uint64) source { return source{rand.New(rand.NewPCG(seed, 1967))} }

// noise is independent values.
func (s source) noise(n int) []float64 {
	e := make([]float64, n)
	for i := range e {
		e[i] = s.NormFloat64()
	}
	return e
}

// walk sums independent steps: each value is the last one plus a step.
func walk(steps []float64, drift float64) []float64 {
	x, sum := make([]float64, len(steps)), 0.0
	for i, e := range steps {
		x[i] = sum
		sum += drift + e
	}
	return x
}

// ar1 is x(t) = phi x(t-1) + e(t), started in its stationary distribution.
func ar1(e []float64, phi float64) []float64 {
	x := make([]float64, len(e))
	x[0] = e[0] / math.Sqrt(1-phi*phi)
	for i := 1; i < len(e); i++ {
		x[i] = phi*x[i-1] + e[i]
	}
	return x
}

// mixed shares w of its variance with a.
func mixed(a, b []float64, w float64) []float64 {
	x := make([]float64, len(a))
	for i := range a {
		x[i] = math.Sqrt(w)*a[i] + math.Sqrt(1-w)*b[i]
	}
	return x
}

const years = 54 // 1967 to 2020

// nitrateSteps is what the nitrate in the river does from year to year. The
// mussels feed on the bloom that follows, so theirs go with it.
func nitrateSteps() []float64 { return seeded(22).noise(years) }

// shore is the survey of 1 August: eelgrass and boats drift, each on its own;
// the mussels drift too, and their year-to-year growth follows the nitrate.
// In 2001 the shore was closed, and no mussel was measured.
func shore() string {
	eelgrass := walk(seeded(1).noise(years), -0.45)
	boats := walk(seeded(2).noise(years), 0.5)
	mussels := walk(mixed(nitrateSteps(), seeded(35).noise(years), 0.5), 0)
	var b strings.Builder
	b.WriteString("year,eelgrass_ha,boats_moored,mussel_mm\n")
	for i := range years {
		mussel := fmt.Sprintf("%.1f", 46+1.4*mussels[i])
		if 1967+i == 2001 {
			mussel = ""
		}
		fmt.Fprintf(&b, "%d,%.1f,%.0f,%s\n", 1967+i, 148+2.6*eelgrass[i], 96+6.5*boats[i], mussel)
	}
	return b.String()
}

// weir is the year at the weir: nitrate wanders; rain and gales are as good
// as independent from one year to the next.
func weir() string {
	nitrate := walk(nitrateSteps(), 0.1)
	rain := seeded(5).noise(years)
	gales := mixed(rain, seeded(71).noise(years), 0.3)
	var b strings.Builder
	b.WriteString("year,nitrate_t,rain_mm,gale_days\n")
	for i := range years {
		fmt.Fprintf(&b, "%d,%.1f,%.0f,%.0f\n", 1967+i, 310+14*nitrate[i], 820+95*rain[i], 31+6*gales[i])
	}
	return b.String()
}

const months = 16 * 12 // 2005 to 2020

// sonde is the monthly buoy: temperature and oxygen have a fixed season and
// slow weather, and a month warmer than usual has less oxygen; silicate is used up when the bloom is on, and
// the bloom is skewed as blooms are.
func sonde() string {
	warm := ar1(seeded(7).noise(months), 0.6)
	oxygen := ar1(mixed(seeded(7).noise(months), seeded(8).noise(months), 0.3), 0.6)
	bloom := ar1(seeded(9).noise(months), 0.3)
	silicate := mixed(bloom, seeded(10).noise(months), 0.35)
	var b strings.Builder
	b.WriteString("month,temperature,oxygen,chlorophyll,silicate\n")
	for i := range months {
		season := math.Cos(2 * math.Pi * float64(i-7) / 12) // highest in August
		chlorophyll := math.Exp(0.9 + 0.85*bloom[i])
		fmt.Fprintf(&b, "%04d-%02d,%.1f,%.2f,%.2f,%.1f\n", 2005+i/12, i%12+1,
			12+5*season+0.8*warm[i], 9.4-1.4*season-0.3*oxygen[i], chlorophyll, 24-4*silicate[i])
	}
	return b.String()
}

const days = 240 // from 1 March 2019

// turbidity is two probes, a mile apart, that have nothing to do with each
// other but each with its own yesterday; the tide gauge beside them explains
// part of the northern one. The salinity cell failed now and then and wrote
// -999.
func turbidity() string {
	north := ar1(seeded(11).noise(days), 0.75)
	south := ar1(seeded(47).noise(days), 0.75)
	tide := ar1(seeded(13).noise(days), 0.6)
	salinity := ar1(seeded(14).noise(days), 0.5)
	failed := map[int]bool{31: true, 32: true, 118: true, 119: true, 120: true, 201: true}
	day := time.Date(2019, 3, 1, 0, 0, 0, 0, time.UTC)
	var b strings.Builder
	b.WriteString("day,north_fnu,south_fnu,tidal_range_m,salinity\n")
	for i := range days {
		salt := fmt.Sprintf("%.1f", 28+1.1*salinity[i])
		if failed[i] {
			salt = "-999"
		}
		fmt.Fprintf(&b, "%s,%.1f,%.1f,%.2f,%s\n", day.AddDate(0, 0, i).Format(time.DateOnly),
			30+4.2*north[i]+1.5*tide[i], 34+4.6*south[i], 3.6+0.35*tide[i], salt)
	}
	return b.String()
}
