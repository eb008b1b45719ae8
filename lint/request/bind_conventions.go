package request

import "lagwise/lint/document"

// BindConventions reads conventions out of a tree. What is not given stays
// zero. Whether the rules and thresholds that are named exist is for those
// who know them.
func BindConventions(file string, t *document.Tree) (*Conventions, []Problem) {
	c := newChecker(t)
	c.table(t.Root, ConventionsDoc.String(), document.Span{})
	r := c.read(t.Root)
	v := &Conventions{File: file, BuildsOn: r.list("builds-on"), Tree: t, Keys: map[string]Place{}}
	if n := r.node("builds-on"); n != nil {
		v.Places = spans(r.items(n))
	}
	pathsBelow(t.Root, "", v.Keys)
	if n := r.table("review"); n != nil {
		v.Review = c.review(n)
	}
	if n := r.table("asked-for"); n != nil {
		a := c.read(n)
		v.AskedFor = AskedFor{Request: a.list("request"), Series: a.list("series"), Deviation: a.list("deviation"),
			DeviationLongest: a.text("deviation-longest", "")}
	}
	if n := r.table("accepted-methods"); n != nil {
		a := c.read(n)
		v.Accepted = Accepted{Coefficient: a.list("coefficient"), Estimator: a.list("estimator"), On: a.list("on"),
			AlwaysDifference: a.boolean("always-difference")}
	}
	if n := r.table("weight"); n != nil {
		v.Weight = map[string]string{}
		for _, m := range n.Members {
			if text := c.read(n).text(m.Key.Text, ""); text != "" {
				v.Weight[m.Key.Text] = text
			}
		}
	}
	if n := r.table("limits"); n != nil {
		v.Limits = map[string]float64{}
		for _, m := range n.Members {
			if x := c.read(n).number(m.Key.Text); x != nil {
				v.Limits[m.Key.Text] = *x
			}
		}
	}
	if n := r.table("test-settings"); n != nil {
		v.Tests = c.tests(n)
	}
	return v, c.problems
}

func (c *checker) review(n *document.Node) Review {
	r := c.read(n)
	v := Review{Exclude: r.list("exclude"), Final: r.list("final"), HoldAt: r.text("hold-at", ""),
		Alpha: r.number("alpha"), LeastEffectiveN: r.number("least-effective-n")}
	if least := r.table("least-n"); least != nil {
		v.LeastN = map[string]int{}
		for _, k := range leastNKeys {
			if x := c.read(least).number(k.Name); x != nil {
				v.LeastN[k.Name] = int(*x)
			}
		}
	}
	return v
}

func (c *checker) tests(n *document.Node) TestSettings {
	r := c.read(n)
	v := TestSettings{LeastNVerdict: r.integer("least-n-verdict", 0), Family: r.text("family", "")}
	if adf := r.table("adf"); adf != nil {
		v.ADFLags = c.read(adf).text("lags", "")
	}
	if kpss := r.table("kpss"); kpss != nil {
		v.KPSSBandwidth = c.read(kpss).text("bandwidth", "")
	}
	return v
}

// pathsBelow gathers where the keys of a table and of the tables in it stand.
func pathsBelow(n *document.Node, prefix string, places map[string]Place) {
	for _, m := range n.Members {
		if m.Value == nil {
			continue
		}
		places[prefix+m.Key.Text] = placeOfMember(m)
		if m.Value.IsTable() {
			pathsBelow(m.Value, prefix+m.Key.Text+".", places)
		}
	}
}

func spans(nodes []*document.Node) []document.Span {
	all := make([]document.Span, len(nodes))
	for i, n := range nodes {
		all[i] = n.At
	}
	return all
}
