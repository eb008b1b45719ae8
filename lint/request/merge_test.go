package request

import (
	"reflect"
	"testing"

	"lagwise/lint/document"
)

func conventions(t *testing.T, text string) *Conventions {
	t.Helper()
	c, problems := BindConventions("x.conventions.toml", document.Parse([]byte(text)))
	if len(problems) > 0 {
		t.Fatalf("%+v", problems)
	}
	return c
}

func TestBindConventions(t *testing.T) {
	c := conventions(t, estuaryConventions)
	alpha, least, always := 0.05, 6.0, false
	want := &Conventions{
		File: "x.conventions.toml", BuildsOn: []string{"../lab/estuary.conventions.toml"},
		Review: Review{Exclude: []string{"archive/**"}, Final: []string{"weight.shared-drift", "accepted-methods"}, HoldAt: "warning",
			Alpha: &alpha, LeastN: map[string]int{"correlation": 20, "regression": 30}, LeastEffectiveN: &least},
		AskedFor: AskedFor{[]string{"question", "aim"}, []string{"unit", "title"}, []string{"reason", "by", "until"}, "P1Y"},
		Accepted: Accepted{[]string{"pearson", "spearman", "kendall"}, []string{"ols", "gls"},
			[]string{"first-differences", "seasonal-differences", "rates-of-change", "prewhitened"}, &always},
		Weight: map[string]string{"shared-drift": "error", "many-relations": "none"},
		Limits: map[string]float64{"variance-inflation": 10, "material-skewness": 1},
		Tests:  TestSettings{"aic", "newey-west", 20, "holm"},
	}
	places, keys, tree := c.Places, c.Keys, c.Tree
	c.Places, c.Keys, c.Tree = nil, nil, nil
	if !reflect.DeepEqual(c, want) {
		t.Errorf("got %+v\nwant %+v", c, want)
	}
	if len(places) != 1 || tree.Raw(keys["weight.shared-drift"].Value) != `"error"` || tree.Raw(keys["review.least-n.regression"].Value) != "30" {
		t.Errorf("places %v %v", places, keys["weight.shared-drift"])
	}
}

func TestMergeKeyByKey(t *testing.T) {
	base := conventions(t, "[review]\nalpha = 0.01\nleast-n = { correlation = 25, regression = 50 }\n[weight]\na = \"error\"\nb = \"hint\"\n[accepted-methods]\ncoefficient = [\"pearson\", \"kendall\"]\nestimator = \"ols\"\n")
	over := conventions(t, "[review]\nhold-at = \"error\"\nleast-n.correlation = 30\n[weight]\nb = \"none\"\n[accepted-methods]\ncoefficient = \"spearman\"\nestimator = []\n")
	m := Merge(base, over)
	if *m.Review.Alpha != 0.01 || m.Review.HoldAt != "error" {
		t.Errorf("review: %+v", m.Review)
	}
	if !reflect.DeepEqual(m.Review.LeastN, map[string]int{"correlation": 30, "regression": 50}) {
		t.Errorf("least-n: %v", m.Review.LeastN)
	}
	if !reflect.DeepEqual(m.Weight, map[string]string{"a": "error", "b": "none"}) {
		t.Errorf("weight: %v", m.Weight)
	}
	if !reflect.DeepEqual(m.Accepted.Coefficient, []string{"spearman"}) || m.Accepted.Estimator != nil {
		t.Errorf("accepted: %+v", m.Accepted)
	}
	if base.Weight["b"] != "hint" || base.Review.LeastN["correlation"] != 25 {
		t.Error("the base was changed")
	}
	if m := Merge(nil, nil); m == nil {
		t.Error("nothing merged is nil")
	}
	if m := Merge(nil, over); m.Review.HoldAt != "error" {
		t.Errorf("over nothing: %+v", m)
	}
}

func TestFinalStays(t *testing.T) {
	base := conventions(t, "[review]\nfinal = [\"weight.a\", \"accepted-methods\"]\n[weight]\na = \"error\"\n[accepted-methods]\nestimator = \"ols\"\n")
	text := "[review]\nfinal = []\nalpha = 0.1\n[weight]\na = \"none\"\nc = \"hint\"\n[accepted-methods]\nestimator = [\"ols\"]\ncoefficient = \"pearson\"\n"
	m, problems := MergeFinal(base, conventions(t, text))
	if m.Weight["a"] != "error" || m.Weight["c"] != "hint" || m.Accepted.Coefficient != nil || *m.Review.Alpha != 0.1 {
		t.Errorf("%+v", m)
	}
	var at []string
	for _, p := range problems {
		at = append(at, text[p.At.Start:p.At.End])
	}
	if want := []string{`"pearson"`, `"none"`}; !reflect.DeepEqual(at, want) {
		t.Errorf("problems at %q, want %q", at, want)
	}
	if m, problems := MergeFinal(m, conventions(t, "weight.a = \"hint\"\n")); m.Weight["a"] != "error" || len(problems) != 1 {
		t.Errorf("taken back by a third file: %v %v", m.Weight, problems)
	}
}
