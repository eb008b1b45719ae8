package request

import (
	"slices"

	"lagwise/lint/document"
)

// BindAnalysis reads an analysis out of a tree. file is its path relative to
// the root. Requests stand in the order of the text, whatever their kind.
func BindAnalysis(file string, t *document.Tree) (*Analysis, []Problem) {
	return BindAnalysisUnder(file, t)
}

// BindAnalysisUnder reads an analysis out of the table at a path of keys, such
// as tool, lagwise in the metadata block of a script. Where there is no such
// table the analysis is empty; what stands beside it is not judged.
func BindAnalysisUnder(file string, t *document.Tree, path ...string) (*Analysis, []Problem) {
	c := newChecker(t)
	root := t.Root
	for _, key := range path {
		m := root.Get(key)
		if m == nil || !m.Value.IsTable() {
			return &Analysis{File: file, Tree: t}, c.problems
		}
		root = m.Value
	}
	c.table(root, AnalysisDoc.String(), document.Span{})
	r := c.read(root)
	a := &Analysis{File: file, Title: r.text("title", ""), Manifests: r.list("manifests"), Tree: t}
	if n := r.node("manifests"); n != nil {
		a.Places = spans(r.items(n))
	}
	var told []int // how many problems there were after each request
	entries := requestsIn(r)
	before := len(c.problems)
	for i, e := range entries {
		sofar := len(c.problems)
		asked := c.asked(e)
		asked.faulty = len(c.problems) > sofar || !t.Valid()
		asked.File, asked.Index, asked.under = file, i, path
		a.Requests = append(a.Requests, asked)
		told = append(told, len(c.problems))
	}
	written := c.nameRequests(a.Requests)
	for i, asked := range a.Requests {
		for ; before < told[i]; before++ {
			c.problems[before].Request = asked.Name
		}
		if !written[i] {
			asked.madeUp = true
		}
		asked.Digest = asked.Request.digest()
	}
	return a, c.problems
}

// entry is the table of one request.
type entry struct {
	kind Kind
	node *document.Node
}

func requestsIn(r reader) []entry {
	var entries []entry
	for _, kind := range []Kind{Correlation, Regression} {
		for _, n := range tablesIn(r.node(kind.String())) {
			if n.IsTable() {
				entries = append(entries, entry{kind, n})
			}
		}
	}
	slices.SortStableFunc(entries, func(a, b entry) int { return a.node.At.Start - b.node.At.Start })
	return entries
}

// asked checks and binds one request.
func (c *checker) asked(e entry) *Asked {
	head := placeOf(e.node)
	c.table(e.node, e.kind.String(), head)
	r := c.read(e.node)
	a := &Asked{
		Header: head,
		At:     document.Span{Start: head.Start, End: max(head.End, lastOf(e.node))},
		Keys:   r.places(),
		Names:  map[string][]document.Span{},
		tree:   c.tree,
		table:  e.node,
	}
	a.Request = Request{
		Kind:       e.kind,
		Name:       r.text("name", ""),
		Question:   r.text("question", ""),
		Aim:        r.text("aim", ""),
		Expected:   r.text("expected", ""),
		Planned:    r.boolean("planned"),
		TimeScale:  r.text("time-scale", ""),
		On:         r.transforms("on"),
		OnEach:     c.onEach(r.table("on-each")),
		Every:      r.text("every", ""),
		Aggregate:  r.text("aggregate", ""),
		LeastShare: 0.8,
		YearStarts: r.text("year-starts", "01-01"),
		Tolerance:  r.text("tolerance", "0"),
		Grid:       c.grid(r.table("grid")),
		From:       r.text("from", ""),
		Until:      r.text("until", ""),
		Deviations: r.deviations(),
	}
	if share := r.number("least-share"); share != nil {
		a.LeastShare = *share
	}
	a.Groups, a.GroupList = c.groups(r)
	if e.kind == Regression {
		c.regression(a, r)
	} else {
		c.correlation(a, r)
	}
	c.seriesOfOnEach(a, r)
	return a
}

// lastOf returns where the last statement of a table ends, those of the
// tables in it included.
func lastOf(n *document.Node) int {
	end := n.At.End
	for _, m := range n.Members {
		if m.Value != nil {
			end = max(end, m.Statement.End, lastOf(m.Value))
		}
	}
	for _, item := range n.Items {
		end = max(end, lastOf(item))
	}
	return end
}

func (c *checker) correlation(a *Asked, r reader) {
	a.Between = a.namesIn(r, "between")
	a.Given = a.namesIn(r, "given")
	a.RemoveFrom = r.text("remove-from", "both")
	a.Coefficient = r.text("coefficient", "pearson")
	a.Inference = r.text("inference", "usual")
	a.Replicates = r.integer("replicates", 2000)
	a.Lag = r.integer("lag", 0)
	a.Lags = c.lags(r.table("lags"))
	c.correlationContradictions(a, r)
}

func (c *checker) regression(a *Asked, r reader) {
	a.Response = r.text("response", "")
	if n := r.node("response"); n != nil {
		a.Names[a.Response] = append(a.Names[a.Response], n.At)
	}
	for _, p := range c.predictors(r) {
		a.Predictors = append(a.Predictors, p.Predictor)
		a.Names[p.Series] = append(a.Names[p.Series], p.name)
	}
	c.process(a, r)
	a.Likelihood = r.text("likelihood", "reml")
	a.StandardErrors = r.text("standard-errors", "usual")
	a.Trend = r.flag("trend")
	a.SeasonalTerms = r.flag("seasonal-terms")
	a.Form = r.text("form", "static")
	c.regressionContradictions(a, r)
}

// process fills in estimator and errors, each from the other where only one
// is written.
func (c *checker) process(a *Asked, r reader) {
	a.Estimator, a.Errors = r.text("estimator", ""), ""
	if e, ok := ParseErrors(r.text("errors", "")); ok {
		a.Errors = e.String()
	}
	written := a.Errors != ""
	switch {
	case a.Estimator == "" && written && a.Errors != Independent:
		a.Estimator = "gls"
	case a.Estimator == "":
		a.Estimator = "ols"
	case a.Estimator == "ols" && written && a.Errors != Independent:
		c.wrong(r.node("errors"), "estimator = \"ols\" takes the errors as independent; write estimator = \"gls\" for %s, or leave errors out.", shown(a.Errors))
		a.Errors = Independent
	case a.Estimator == "gls" && a.Errors == Independent:
		c.wrong(r.node("errors"), "Independent errors are what estimator = \"ols\" has; gls needs a process such as \"ar(1)\".")
		a.Errors = ""
	}
	if a.Errors == "" {
		a.Errors = defaultErrors(a.Estimator)
	}
}

// Independent is the process of errors that ordinary least squares assumes.
const Independent = "independent"

func defaultErrors(estimator string) string {
	if estimator == "gls" {
		return "ar(1)"
	}
	return Independent
}

// namesIn reads a key that names series, and keeps where each stands.
func (a *Asked) namesIn(r reader, key string) []string {
	n := r.node(key)
	if n == nil {
		return nil
	}
	names := r.list(key)
	for i, item := range r.items(n) {
		if i < len(names) {
			a.Names[names[i]] = append(a.Names[names[i]], item.At)
		}
	}
	return names
}

// namedPredictor is a predictor and where its series is named.
type namedPredictor struct {
	Predictor
	name document.Span
	node *document.Node // the entry
}

func (c *checker) predictors(r reader) []namedPredictor {
	n := r.node("predictors")
	if n == nil {
		return nil
	}
	entries := []*document.Node{n}
	if isList(n) {
		entries = n.Items
	}
	var all []namedPredictor
	for _, item := range entries {
		switch {
		case c.bad[item]:
		case item.IsTable():
			p := c.read(item)
			if series := p.node("series"); series != nil {
				all = append(all, namedPredictor{Predictor{scalar(series), p.integer("lag", 0)}, series.At, item})
			}
		case item.Kind == document.String:
			all = append(all, namedPredictor{Predictor{Series: scalar(item)}, item.At, item})
		}
	}
	return all
}

func (c *checker) onEach(n *document.Node) map[string][]Transform {
	if n == nil {
		return nil
	}
	each := map[string][]Transform{}
	for _, m := range n.Members {
		if on := c.read(n).transforms(m.Key.Text); len(on) > 0 {
			each[m.Key.Text] = on
		}
	}
	if len(each) == 0 {
		return nil
	}
	return each
}

func (c *checker) lags(n *document.Node) *LagWindow {
	if n == nil {
		return nil
	}
	r := c.read(n)
	if r.node("from") == nil || r.node("to") == nil {
		return nil
	}
	w := &LagWindow{r.integer("from", 0), r.integer("to", 0)}
	if w.From > w.To {
		c.wrong(n, "lags runs from the lower lag to the higher: from = %d, to = %d.", w.To, w.From)
		return nil
	}
	return w
}

func (c *checker) grid(n *document.Node) *Grid {
	if n == nil {
		return nil
	}
	r := c.read(n)
	step := r.number("step")
	if step == nil {
		return nil
	}
	return &Grid{Step: *step, By: r.text("by", "linear")}
}

// groups reads within, each, or the groups named. A bare word that is neither
// but nearly one of them is taken as a slip.
func (c *checker) groups(r reader) (word string, groups []string) {
	n := r.node("groups")
	if n == nil {
		return "within", nil
	}
	words := r.list("groups")
	if len(words) == 0 {
		return "within", nil
	}
	if len(words) == 1 && (words[0] == "within" || words[0] == "each") {
		return words[0], nil
	}
	k, _ := Lookup("correlation", "groups")
	if n.Kind == document.String && Nearest(words[0], k.Values) != "" {
		c.wrongWord(n, words[0], k.Values, "groups is within, each, or a list of groups.")
		return "within", nil
	}
	return "", words
}
