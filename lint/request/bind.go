package request

import (
	"strconv"
	"strings"
	"time"

	"lagwise/lint/document"
)

// reader takes typed values out of one checked table. What is absent or was
// found wrong reads as not given.
type reader struct {
	c *checker
	n *document.Node
}

func (c *checker) read(n *document.Node) reader { return reader{c, n} }

// node returns the value of a key, nil when it is not given or wrong.
func (r reader) node(key string) *document.Node {
	m := r.n.Get(key)
	if m == nil || r.c.bad[m.Value] {
		return nil
	}
	return m.Value
}

// table returns the value of a key that is a table.
func (r reader) table(key string) *document.Node {
	if n := r.node(key); n.IsTable() {
		return n
	}
	return nil
}

// text returns a scalar as text, or the default.
func (r reader) text(key, otherwise string) string {
	if n := r.node(key); n != nil && n.Value != nil {
		return scalar(n)
	}
	return otherwise
}

// list returns the scalars of a list, or the one scalar; nil when the key is
// not given.
func (r reader) list(key string) []string {
	n := r.node(key)
	if n == nil {
		return nil
	}
	texts := []string{}
	for _, item := range r.items(n) {
		texts = append(texts, scalar(item))
	}
	return texts
}

// items returns the sound scalars of a list, or the one scalar itself.
func (r reader) items(n *document.Node) []*document.Node {
	if !isList(n) {
		return []*document.Node{n}
	}
	var sound []*document.Node
	for _, item := range n.Items {
		if !r.c.bad[item] && item.Value != nil {
			sound = append(sound, item)
		}
	}
	return sound
}

func (r reader) integer(key string, otherwise int) int {
	if v := r.number(key); v != nil {
		return int(*v)
	}
	return otherwise
}

func (r reader) number(key string) *float64 {
	n := r.node(key)
	if n == nil {
		return nil
	}
	if v, ok := numberOf(n); ok {
		return &v
	}
	return nil
}

func (r reader) boolean(key string) *bool {
	n := r.node(key)
	if n == nil {
		return nil
	}
	if v, ok := n.Value.(bool); ok {
		return &v
	}
	return nil
}

func (r reader) flag(key string) bool {
	v := r.boolean(key)
	return v != nil && *v
}

// transforms reads `on` and its like; levels is the empty list.
func (r reader) transforms(key string) []Transform {
	var on []Transform
	for _, word := range r.list(key) {
		if t, ok := ParseTransform(word); ok {
			on = append(on, t)
		}
	}
	return on
}

// places returns where each key of the table stands.
func (r reader) places() map[string]Place {
	places := map[string]Place{}
	for _, m := range r.n.Members {
		if m.Value != nil {
			places[m.Key.Text] = placeOfMember(m)
		}
	}
	return places
}

func placeOfMember(m *document.Member) Place {
	return Place{Key: m.Key.At, Value: placeOf(m.Value), Statement: m.Statement}
}

// scalar returns a value as text: numbers in their shortest form, dates as
// ISO 8601 writes them.
func scalar(n *document.Node) string {
	switch v := n.Value.(type) {
	case string:
		if n.Kind == document.LocalDateTime {
			return strings.Replace(v, " ", "T", 1)
		}
		return v
	case int64:
		return strconv.FormatInt(v, 10)
	case float64:
		return plain(v)
	case bool:
		return strconv.FormatBool(v)
	case time.Time:
		return v.Format(time.RFC3339Nano)
	}
	return ""
}

// isDay reports whether text is a calendar day, YYYY-MM-DD.
func isDay(s string) bool {
	_, err := time.Parse(time.DateOnly, s)
	return err == nil
}

// deviations binds the deviations of a request, record or series.
func (r reader) deviations() []Deviation {
	var all []Deviation
	for _, item := range tablesIn(r.node("deviation")) {
		if !item.IsTable() {
			continue
		}
		d := r.c.read(item)
		all = append(all, Deviation{
			From:       d.text("from", ""),
			Reason:     d.text("reason", ""),
			By:         d.text("by", ""),
			AcceptedBy: d.text("accepted-by", ""),
			Until:      d.text("until", ""),
			Data:       d.text("data", ""),
			Pair:       d.pair(),
			At:         item.At,
			Keys:       d.places(),
		})
	}
	return all
}

func (r reader) pair() []string {
	pair := r.list("pair")
	if pair != nil && len(pair) != 2 {
		r.c.wrong(r.node("pair"), "pair names two series, like pair = [\"eelgrass\", \"boats\"].")
		return nil
	}
	return pair
}
