package request

import (
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"lagwise/lint/document"
)

// value checks the value of a key: first its type, then its form.
func (c *checker) value(k Key, n *document.Node) {
	switch {
	case k.Types&NamedTables != 0:
		c.namedTables(k, n)
	case k.Types&TableList != 0:
		c.tableList(k, n)
	case isList(n) && k.Types&List != 0:
		for _, item := range n.Items {
			c.single(k, item)
		}
		c.levelsAlone(k, n)
	default:
		c.single(k, n)
	}
}

func isList(n *document.Node) bool {
	return n.Kind == document.Array || n.Kind == document.TableArray
}

// single checks a value that is not a list.
func (c *checker) single(k Key, n *document.Node) {
	if n.IsTable() && k.Types&Table != 0 {
		c.table(n, k.Sub, placeOf(n))
		return
	}
	if !typeFits(k.Types, n.Kind) {
		c.wrong(n, "%s takes %s, for example %s.", keyName(k), typeWords(k), k.Example)
		return
	}
	if text, ok := n.Value.(string); ok && n.Kind == document.String {
		c.text(k, n, text)
		return
	}
	if v, ok := numberOf(n); ok {
		c.number(k, n, v)
		return
	}
	if v, ok := n.Value.(bool); ok && k.Form == SeasonLength && v {
		c.wrong(n, "season takes a duration, a number of steps, or false where there is none.")
	}
}

// typeFits reports whether a kind of value belongs to a set of types.
func typeFits(types Types, kind document.Kind) bool {
	switch kind {
	case document.String:
		return types&Text != 0
	case document.Integer:
		return types&(Integer|Number) != 0
	case document.Float:
		return types&Number != 0
	case document.Boolean:
		return types&Boolean != 0
	case document.LocalDate, document.LocalDateTime, document.OffsetDateTime:
		return types&Date != 0
	}
	return false
}

// keyName is how a key is named in messages: a free key by its table.
func keyName(k Key) string {
	if k.Name == Any {
		return "each key of " + heading(k.Table)
	}
	return k.Name
}

func typeWords(k Key) string {
	var words []string
	for _, t := range []struct {
		is   Types
		word string
	}{{Text, "text"}, {Integer, "a whole number"}, {Number, "a number"}, {Boolean, "true or false"}, {Date, "a date"}, {Table, "a table"}} {
		if k.Types&t.is != 0 {
			words = append(words, t.word)
		}
	}
	switch {
	case k.Form == SeriesName && k.Types&List != 0:
		return "a list of series"
	case k.Types&List != 0:
		words = append(words, "a list of them")
	}
	return oneOf(words)
}

// numberOf returns the value of a number.
func numberOf(n *document.Node) (float64, bool) {
	switch v := n.Value.(type) {
	case int64:
		return float64(v), true
	case float64:
		return v, true
	}
	return 0, false
}

// number checks a number against the bounds of its key.
func (c *checker) number(k Key, n *document.Node, v float64) {
	positive := k.Form == DurationOrSize && k.Name != "tolerance" || k.Form == SeasonLength
	switch b := k.Bounds; {
	case math.IsNaN(v) || math.IsInf(v, 0):
		c.wrong(n, "%s takes a finite number.", keyName(k))
	case positive && v <= 0:
		c.wrong(n, "%s is a length: a number above 0.", keyName(k))
	case k.Form == SeasonLength && v < 2:
		c.wrong(n, "season takes 2 or more steps, or false where there is none.")
	case k.Name == "tolerance" && v < 0:
		c.wrong(n, "tolerance is 0 or more.")
	case b == nil:
	case b.Open && v <= b.Min:
		c.wrong(n, "%s is above %s%s, not %s.", keyName(k), plain(b.Min), atMost(b), plain(v))
	case v < b.Min || v > b.Max:
		c.wrong(n, "%s is from %s%s, not %s.", keyName(k), plain(b.Min), atMost(b), plain(v))
	}
}

// atMost words the upper bound, unless it is only there to keep sums finite.
func atMost(b *Bounds) string {
	if b.Max >= 1e9 {
		return " up"
	}
	return " to " + plain(b.Max)
}

func plain(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }

// text checks the form of a text.
func (c *checker) text(k Key, n *document.Node, s string) {
	switch k.Form {
	case Words:
		if !slices.Contains(k.Values, s) {
			c.wrongWord(n, s, k.Values, fmt.Sprintf("%s = %s is not known; allowed: %s.", wordName(k), shown(s), allowed(k)))
		}
	case TransformName:
		if _, ok := ParseTransform(s); !ok && s != Levels {
			c.wrongWord(n, s, k.Values, transformTrouble(s))
		}
	case ErrorsOf:
		if _, ok := ParseErrors(s); !ok {
			c.wrongWord(n, s, k.Values, fmt.Sprintf("errors = %s is not a known process; allowed: independent, ar(p), arma(p,q), car(1), exponential, gaussian or spherical, the last three also as nugget+….", shown(s)))
		}
	default:
		if trouble := formTrouble(k, s); trouble != "" {
			c.wrong(n, "%s", trouble)
		}
	}
}

// formTrouble says what is wrong with a text of a form that has no words.
func formTrouble(k Key, s string) string {
	switch k.Form {
	case Name, Path, Pattern, SeriesName, RecordName, RuleName, Position:
		if strings.TrimSpace(s) == "" {
			return keyName(k) + " is empty."
		}
	case Character:
		if len([]rune(s)) > 1 {
			return fmt.Sprintf("%s is a single character, not %s.", k.Name, shown(s))
		}
	case Duration, DurationOrSize, SeasonLength:
		p, err := ParsePeriod(s)
		switch {
		case err != nil:
			return capital(k.Name) + ": " + err.Error() + "."
		case p.Zero() && k.Name != "tolerance":
			return fmt.Sprintf("%s is a length: %s has none.", k.Name, shown(s))
		}
	case MonthDay:
		if !isDay("2001-" + s) {
			return fmt.Sprintf("%s is a month and day like \"10-01\", not %s.", k.Name, shown(s))
		}
	case Day:
		if !isDay(s) {
			return fmt.Sprintf("%s is a date like \"2027-06-30\", not %s.", k.Name, shown(s))
		}
	case DataDigest:
		if !strings.HasPrefix(s, "sha256:") {
			return fmt.Sprintf("%s is a digest like \"sha256:…\" as compute prints it, not %s.", k.Name, shown(s))
		}
	case KeyPath:
		if !isConventionsKey(s) {
			return fmt.Sprintf("%s names keys or tables of conventions, like \"weight.shared-drift\" or \"accepted-methods\"; %s is none.", k.Name, shown(s))
		}
	}
	return ""
}

// wordName is the key of a word; in the table of weights the words are
// severities, whatever the rule.
func wordName(k Key) string {
	if k.Name == Any {
		return "severity"
	}
	return k.Name
}

// allowed lists the words of a key, and that a number serves where it does.
func allowed(k Key) string {
	words := k.Values
	if k.Types&(Integer|Number) != 0 {
		words = append(slices.Clone(words), "a number")
	}
	const listed = 12 // more are better read in the reference
	if len(words) > listed {
		return oneOf(words[:listed]) + " and more"
	}
	return oneOf(words)
}

func transformTrouble(s string) string {
	switch name, _, _ := strings.Cut(s, "("); name {
	case Differences:
		return fmt.Sprintf("%s: differences takes the steps they span, 1 or more, like \"differences(2)\".", shown(s))
	case MovingMean:
		return fmt.Sprintf("%s: moving-mean takes the values it is over, 2 or more, like \"moving-mean(3)\".", shown(s))
	}
	return fmt.Sprintf("%s is not a transform; allowed: levels, %s, differences(K) or moving-mean(K).", shown(s),
		strings.Join(transformWords[:len(transformWords)-2], ", "))
}

// levelsAlone reports levels beside transforms.
func (c *checker) levelsAlone(k Key, n *document.Node) {
	if k.Form != TransformName || k.Table == "accepted-methods" || len(n.Items) < 2 {
		return
	}
	for _, item := range n.Items {
		if item.Value == Levels {
			c.wrong(item, "levels stands alone: it means that no transform is taken.")
		}
	}
}

// isConventionsKey reports whether a dotted path is a key or table of
// conventions.
func isConventionsKey(path string) bool {
	table := ConventionsDoc.String()
	for part := range strings.SplitSeq(path, ".") {
		k, ok := Lookup(table, part)
		if !ok || part == "" {
			return false
		}
		table = k.Sub
	}
	return true
}
