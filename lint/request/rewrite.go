package request

import (
	"slices"
	"strings"

	"lagwise/lint/document"
)

// Rewrite returns the fewest edits of the text that turn a request as it is
// written into another; all other bytes, comments among them, stay. asked must
// be bound from t, or from another reading of the same text. What is at its default is taken out if it is written, and
// not written if it is not; a list stays a list and a bare number or date one.
// A new key takes the line of a key that goes, else it follows the table's
// last statement. estimator = "gls" is left to errors, which implies it. A
// request that changes its kind keeps its fields, and a name that was made of
// the series is made anew; deviations are never touched.
//
// The result is empty when nothing has to change and nil when the text cannot
// be edited so: the request does not stand in t, an entry of an inline list
// would have to change its kind, or what is wrong in the request would come
// to bear.
func Rewrite(t *document.Tree, asked *Asked, to *Request) []document.Edit {
	table := asked.table
	if asked.tree != t { // another reading of the same text
		table = tableAt(t.Root, asked.Header)
	}
	if table == nil {
		return nil
	}
	w := &rewriter{t: t, table: table, asked: asked, to: filled(to)}
	edits := w.rewrite()
	if !asked.faulty && asked.Kind == to.Kind || edits == nil {
		return edits
	}
	// Only a request with problems, or of another kind, can surprise.
	if w.force = w.differing(edits); len(w.force) == 0 {
		return edits
	}
	if edits = w.rewrite(); edits == nil || len(w.differing(edits)) > 0 {
		return nil
	}
	return edits
}

// filled gives a request the defaults that depend on another field.
func filled(to *Request) *Request {
	r := *to
	if r.Kind == Regression {
		if r.Estimator == "" {
			r.Estimator = "ols"
		}
		if r.Errors == "" {
			r.Errors = defaultErrors(r.Estimator)
		}
	}
	return &r
}

// tableAt finds the request's table by its header, or by its place when it
// is inline.
func tableAt(n *document.Node, head document.Span) *document.Node {
	if n == nil {
		return nil
	}
	if n.IsTable() && placeOf(n) == head {
		return n
	}
	for _, m := range n.Members {
		if found := tableAt(m.Value, head); found != nil {
			return found
		}
	}
	for _, item := range n.Items {
		if found := tableAt(item, head); found != nil {
			return found
		}
	}
	return nil
}

// rewriter gathers the edits of one request.
type rewriter struct {
	t     *document.Tree
	table *document.Node
	asked *Asked
	to    *Request
	force []string // keys that must be written or removed whatever they seem to be

	edits   []document.Edit
	inserts [][2]string // key and value
	removed []*document.Member
	stuck   bool // the text cannot be edited so
}

func (w *rewriter) rewrite() []document.Edit {
	w.edits, w.inserts, w.removed, w.stuck = []document.Edit{}, nil, nil, false
	for _, key := range requestKeys(w.to.Kind, w.asked.Kind) {
		w.key(key)
	}
	w.replaceRemoved()
	w.insert()
	w.remove()
	if w.to.Kind != w.asked.Kind {
		w.renameKind()
	}
	slices.SortStableFunc(w.edits, func(a, b document.Edit) int { return a.At.Start - b.At.Start })
	for i := 1; i < len(w.edits); i++ {
		if w.edits[i].At.Start < w.edits[i-1].At.End {
			return nil
		}
	}
	if w.stuck {
		return nil
	}
	return w.edits
}

// key decides what becomes of one key.
func (w *rewriter) key(key string) {
	was, want := w.asked.written(key), w.to.written(key)
	m := w.table.Get(key)
	forced := slices.Contains(w.force, key)
	switch {
	case key == "name":
		if w.to.Name == w.asked.Name && !forced || w.asked.madeUp && w.to.Name == MadeName(w.to) {
			return
		}
	case key == "estimator" && want != "" && w.to.Errors != Independent:
		// errors says it
		if m != nil && m.Value.Value != "gls" {
			w.removed = append(w.removed, m)
		}
		return
	case was == want && !forced && !(m != nil && w.foreign(key)):
		return
	}
	switch {
	case want == "" && m != nil:
		w.removed = append(w.removed, m)
	case want == "":
	case m == nil:
		w.inserts = append(w.inserts, [2]string{key, want})
	case m.Value.Kind == document.Table || m.Value.Kind == document.TableArray:
		w.removed = append(w.removed, m)
		w.inserts = append(w.inserts, [2]string{key, want})
	default:
		w.edits = append(w.edits, w.replace(m.Value, key, want)...)
	}
}

// foreign reports whether the new kind does not know a key.
func (w *rewriter) foreign(key string) bool {
	_, ok := schemaIndex[[2]string{w.to.Kind.String(), key}]
	return !ok
}

// replace writes a new value over an old one, in the old one's form.
func (w *rewriter) replace(n *document.Node, key, want string) []document.Edit {
	if n.Kind == document.Array {
		return w.replaceItems(n, key, want)
	}
	if key == "from" || key == "until" {
		bare := w.to.From
		if key == "until" {
			bare = w.to.Until
		}
		if bareFits(n.Kind, bare) {
			want = bare
		}
	}
	return []document.Edit{{At: n.At, Text: want}}
}

// bareFits reports whether a position may stay a bare number or date.
func bareFits(kind document.Kind, text string) bool {
	switch kind {
	case document.LocalDate:
		return isDay(text)
	case document.Integer, document.Float:
		tree := document.Parse([]byte("x = " + text))
		m := tree.Root.Get("x")
		if !tree.Valid() || m == nil {
			return false
		}
		_, number := numberOf(m.Value)
		return number && scalar(m.Value) == text
	}
	return false
}

// replaceItems edits a list item by item where it does not get shorter, so
// that what stands between its items stays.
func (w *rewriter) replaceItems(n *document.Node, key, want string) []document.Edit {
	items := w.itemsOf(key)
	if items == nil {
		return []document.Edit{{At: n.At, Text: want}}
	}
	if len(n.Items) == 0 || len(items) < len(n.Items) {
		return []document.Edit{{At: n.At, Text: "[" + strings.Join(items, ", ") + "]"}}
	}
	var edits []document.Edit
	for i, old := range n.Items {
		text, isText := old.Value.(string)
		same := w.t.Raw(old.At) == items[i] || isText && old.Kind == document.String && document.Quote(text) == items[i]
		if !same {
			edits = append(edits, document.Edit{At: old.At, Text: items[i]})
		}
	}
	if more := items[len(n.Items):]; len(more) > 0 {
		end := n.Items[len(n.Items)-1].At.End
		edits = append(edits, document.Edit{At: document.Span{Start: end, End: end}, Text: ", " + strings.Join(more, ", ")})
	}
	return edits
}

// itemsOf returns the wanted entries of a key that takes a list, as TOML.
func (w *rewriter) itemsOf(key string) []string {
	var words []string
	switch key {
	case "on":
		for _, t := range w.to.On {
			words = append(words, t.String())
		}
	case "between":
		words = w.to.Between
	case "given":
		words = w.to.Given
	case "groups":
		words = w.to.GroupList
	case "predictors":
		var items []string
		for _, p := range w.to.Predictors {
			items = append(items, predictorItem(p))
		}
		return items
	}
	var items []string
	for _, s := range words {
		items = append(items, document.Quote(s))
	}
	return items
}
