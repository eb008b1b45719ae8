package dataset

import (
	"errors"
	"fmt"
	"math"
	"math/rand/v2"
	"testing"

	"lagwise/lint/request"
	"lagwise/stats"
)

func steps(names ...string) []request.Transform {
	var on []request.Transform
	for _, n := range names {
		one := request.Transform{Name: n}
		if _, err := fmt.Sscanf(n, "differences(%d)", &one.K); err == nil {
			one.Name = request.Differences
		} else if _, err := fmt.Sscanf(n, "moving-mean(%d)", &one.K); err == nil {
			one.Name = request.MovingMean
		}
		on = append(on, one)
	}
	return on
}

func frameOf(t *testing.T, text string, names ...string) *Frame {
	t.Helper()
	r := plainRead(t, text)
	all := make([]*Series, len(names))
	for i, n := range names {
		all[i] = one(t, r, n)
	}
	return align(t, correlation(names...), all...)
}

// By hand. The year 2003 is missing: no difference or mean crosses it.
const gapped = "year,x\n2000,1\n2001,2\n2002,4\n2004,7\n2005,11\n2006,16\n2007,22\n"

func TestTransformsByHand(t *testing.T) {
	for name, c := range map[string]struct {
		want    []float64
		at      []float64
		runs    string
		removed int
	}{
		"first-differences": {[]float64{1, 2, 4, 5, 6}, []float64{2001, 2002, 2005, 2006, 2007}, "[2 5]", 0},
		"increments":        {[]float64{1, 2, 4, 5, 6}, []float64{2001, 2002, 2005, 2006, 2007}, "[2 5]", 0},
		"rates-of-change":   {[]float64{1, 2, 4, 5, 6}, []float64{2001, 2002, 2005, 2006, 2007}, "[2 5]", 0},
		"differences(2)":    {[]float64{3, 9, 11}, []float64{2002, 2006, 2007}, "[1 3]", 0},
		"moving-mean(3)":    {[]float64{7.0 / 3, 34.0 / 3, 49.0 / 3}, []float64{2001, 2005, 2006}, "[1 3]", 0},
		"moving-mean(2)":    {[]float64{1.5, 3, 9, 13.5, 19}, []float64{2000, 2001, 2004, 2005, 2006}, "[2 5]", 0},
	} {
		f := frameOf(t, gapped, "x")
		g, err := f.Transform(nil, steps(name), nil)
		if err != nil {
			t.Errorf("%s: %v", name, err)
			continue
		}
		if !near(g.Columns[0], c.want, 1e-12) || !equal(g.Positions, c.at) || fmt.Sprint(g.Runs) != c.runs || g.Removed != c.removed || g.Digest == f.Digest {
			t.Errorf("%s: %+v", name, g)
		}
		if !equal(f.Columns[0], []float64{1, 2, 4, 7, 11, 16, 22}) {
			t.Errorf("%s changed its input", name)
		}
	}
}

// Box & Jenkins' airline passengers begin with 112, 118, 132; the differences
// of their logarithms are from another language's math library.
func TestLogDifferences(t *testing.T) {
	f := frameOf(t, "month,x\n1949-01,112\n1949-02,118\n1949-03,132\n", "x")
	g, err := f.Transform(nil, steps("log", "first-differences"), nil)
	if err != nil || !near(g.Columns[0], []float64{0.05218575317057095, 0.1121172981207055}, 1e-14) || g.From != "1949-02" {
		t.Errorf("%+v %v", g, err)
	}
	f = frameOf(t, "year,x\n2000,1\n2001,0\n2002,-3\n", "x")
	_, err = f.Transform(nil, steps("log"), nil)
	wantMessage(t, err, "x", "log of 0 at 2001")
}

func TestRatesDivideBySpacing(t *testing.T) {
	f := frameOf(t, "depth,x\n1,0\n2,1\n4,5\n8,5\n9,7\n16,0\n", "x")
	g, err := f.Transform(nil, steps("rates-of-change"), nil)
	if err != nil || !near(g.Columns[0], []float64{1, 2, 0, 2, -1}, 1e-12) || fmt.Sprint(g.Runs) != "[5]" {
		t.Errorf("%+v %v", g, err)
	}
	d, err := f.Transform(nil, steps("first-differences"), nil)
	if err != nil || !near(d.Columns[0], []float64{1, 4, 0, 2, -7}, 1e-12) {
		t.Errorf("%+v %v", d, err)
	}
}

// An age axis runs backwards: a value that is higher at a lower age has risen.
func TestRatesOfAgesRunForwardInTime(t *testing.T) {
	r := mustRead(t, along("age", request.Age), "age,x\n1,10\n2,8\n3,7\n")
	f := align(t, correlation("x"), one(t, r, "x"))
	g, err := f.Transform(nil, steps("rates-of-change"), nil)
	if err != nil || !equal(g.Columns[0], []float64{1, 2}) || g.From != "2" || g.Until != "1" {
		t.Errorf("%+v %v", g, err)
	}
}

// A fixed season of four plus a line: anomalies leave deviations with mean 0
// in each quarter, and seasonal differences the four steps of the line.
func TestSeasonalTransforms(t *testing.T) {
	text := "q,x\n"
	for i := range 20 {
		text += fmt.Sprintf("%d-Q%d,%v\n", 2000+i/4, i%4+1, []float64{10, 20, 40, 30}[i%4]+0.5*float64(i))
	}
	f := frameOf(t, text, "x")
	a, err := f.Transform(nil, steps("anomalies"), nil)
	if err != nil || a.Removed != 3 || a.Season != 4 {
		t.Fatalf("%+v %v", a, err)
	}
	for i, v := range a.Columns[0] { // line minus the mean of its quarter: 2 a year about year 2
		if want := 2 * float64(i/4-2); math.Abs(v-want) > 1e-12 {
			t.Errorf("%d: %v, want %v", i, v, want)
		}
	}
	d, err := f.Transform(nil, steps("seasonal-differences"), nil)
	if err != nil || len(d.Columns[0]) != 16 || d.Removed != 0 {
		t.Fatalf("%+v %v", d, err)
	}
	for _, v := range d.Columns[0] {
		if math.Abs(v-2) > 1e-12 {
			t.Errorf("%v", d.Columns[0])
		}
	}
	both, err := f.Transform(nil, steps("anomalies", "detrended"), nil)
	if err != nil || both.Removed != 4 {
		t.Errorf("%+v %v", both, err)
	}
	_, err = frameOf(t, gapped, "x").Transform(nil, steps("anomalies"), nil)
	wantMessage(t, err, "x", "season")
}

// NIST StRD Norris is not a trend; Longley's Population on Year is: the
// residuals of a least-squares line sum to 0, against the line and the
// positions.
func TestDetrendedIsOrthogonalToTheLine(t *testing.T) {
	r := rand.New(rand.NewPCG(5, 5))
	text := "year,x\n"
	for i := range 60 {
		text += fmt.Sprintf("%d,%v\n", 1900+i, 1e6+3*float64(i)+r.NormFloat64())
	}
	f := frameOf(t, text, "x")
	g, err := f.Transform(nil, steps("detrended"), nil)
	if err != nil || g.Removed != 1 {
		t.Fatal(err)
	}
	sum, cross := 0.0, 0.0
	for i, v := range g.Columns[0] {
		sum += v
		cross += v * (g.Positions[i] - 1930)
	}
	if math.Abs(sum) > 1e-8 || math.Abs(cross) > 1e-6 {
		t.Errorf("%v %v", sum, cross)
	}
	z, err := f.Transform(nil, steps("standardized"), nil)
	if err != nil {
		t.Fatal(err)
	}
	sum, squares := 0.0, 0.0
	for _, v := range z.Columns[0] {
		sum += v
		squares += v * v
	}
	if math.Abs(sum) > 1e-9 || math.Abs(squares-59) > 1e-9 {
		t.Errorf("mean %v, squares %v", sum/60, squares)
	}
	_, err = frameOf(t, "year,x\n2000,3\n2001,3\n2002,3\n", "x").Transform(nil, steps("standardized"), nil)
	var u *stats.Undefined
	if !errors.As(err, &u) || u.Reason != stats.Constant || u.What != "x" {
		t.Errorf("%v", err)
	}
}

func TestRowsLostByOneAreLostByAll(t *testing.T) {
	f := frameOf(t, "year,x,y\n2000,1,5\n2001,2,6\n2002,4,7\n2003,7,8\n", "x", "y")
	g, err := f.Transform([][]request.Transform{steps("first-differences")}, nil, nil)
	if err != nil || !equal(g.Columns[0], []float64{1, 2, 3}) || !equal(g.Columns[1], []float64{6, 7, 8}) {
		t.Errorf("%+v %v", g, err)
	}
	g, err = f.Transform([][]request.Transform{nil, steps("differences(2)")}, steps("first-differences"), nil)
	if err != nil || !equal(g.Columns[0], []float64{3}) || !equal(g.Columns[1], []float64{0}) {
		t.Errorf("%+v %v", g, err)
	}
	_, err = f.Transform(nil, steps("differences(9)"), nil)
	wantMessage(t, err, "leave no row of 4")
	if same, err := f.Transform(nil, nil, nil); err != nil || same != f {
		t.Errorf("no transform made another frame: %v", err)
	}
}

func TestGroupsAreTransformedByThemselves(t *testing.T) {
	rec := along("year", request.Time)
	rec.Group = "site"
	r := mustRead(t, rec, "site,year,x\nquay,2000,1\nquay,2001,2\nquay,2002,3\nweir,2003,50\nweir,2004,40\nweir,2005,30\n")
	f := align(t, correlation("x"), one(t, r, "x"))
	g, err := f.Transform(nil, steps("first-differences"), nil)
	if err != nil || !equal(g.Columns[0], []float64{1, 1, -10, -10}) || fmt.Sprint(g.Runs) != "[2 4]" {
		t.Errorf("%+v %v", g, err)
	}
	d, err := f.Transform(nil, steps("detrended"), nil)
	if err != nil || !near(d.Columns[0], make([]float64, 6), 1e-12) || d.Removed != 2 {
		t.Errorf("%+v %v", d, err)
	}
}

// White innovations of an AR(1) with coefficient 0.8: its own autoregression
// takes the dependence off, and its trend and season when they are asked for.
func TestPrewhitened(t *testing.T) {
	r := rand.New(rand.NewPCG(11, 4))
	text, level := "month,x\n", 0.0
	for m := range 400 {
		level = 0.8*level + r.NormFloat64()
		text += fmt.Sprintf("%s,%v\n", formatMonth(1980*12+m), level+0.05*float64(m)+5*math.Sin(2*math.Pi*float64(m)/12))
	}
	f := frameOf(t, text, "x")
	g, err := f.Transform(nil, steps("prewhitened"), []Shape{{Trend: true, Season: true}})
	if err != nil || g.Removed != 12 || len(g.Positions) >= 400 || len(g.Positions) < 390 {
		t.Fatalf("%+v %v", g, err)
	}
	e := g.Columns[0]
	num, den := 0.0, 0.0
	for i := range e {
		den += e[i] * e[i]
		if i > 0 {
			num += e[i] * e[i-1]
		}
	}
	if r1 := num / den; math.Abs(r1) > 1.96/math.Sqrt(400) {
		t.Errorf("lag-1 autocorrelation %v", r1)
	}
	uneven := frameOf(t, "depth,x\n1,1\n5,2\n6,3\n22,4\n23,5\n40,6\n", "x")
	_, err = uneven.Transform(nil, steps("prewhitened"), nil)
	wantMessage(t, err, "even steps")
}

func TestDigestsTellContentNotNames(t *testing.T) {
	a := frameOf(t, "year,x\n2000,1\n2001,2\n2002,4\n", "x")
	b := frameOf(t, "year;y\r\n2000;1.0\r\n2001;2.00\r\n2002;4e0\r\n", "y")
	c := frameOf(t, "year,x\n2000,1\n2001,2\n2002,5\n", "x")
	d := frameOf(t, "year,x\n2001,1\n2002,2\n2003,4\n", "x")
	if a.Digest != b.Digest || a.Digest == c.Digest || a.Digest == d.Digest {
		t.Error("digests")
	}
}
