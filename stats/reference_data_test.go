package stats_test

import (
	"encoding/csv"
	"fmt"
	"math"
	"os"
	"strconv"
)

// refData is one file of data/: every column as text and as numbers (NaN for
// an empty or non-numeric cell).
type refData struct {
	text    map[string][]string
	numbers map[string][]float64
}

func readData(path string) (refData, error) {
	f, err := os.Open(path)
	if err != nil {
		return refData{}, err
	}
	defer f.Close()
	rows, err := csv.NewReader(f).ReadAll()
	if err != nil {
		return refData{}, fmt.Errorf("%s: %w", path, err)
	}
	d := refData{text: make(map[string][]string), numbers: make(map[string][]float64)}
	for j, name := range rows[0] {
		for _, row := range rows[1:] {
			v, err := strconv.ParseFloat(row[j], 64)
			if err != nil {
				v = math.NaN()
			}
			d.text[name] = append(d.text[name], row[j])
			d.numbers[name] = append(d.numbers[name], v)
		}
	}
	return d, nil
}

// complete returns the named columns without the rows that have an empty cell
// in any of them. It panics on an unknown name: that is a mistake in the case.
func (d refData) complete(names ...string) [][]float64 {
	out := make([][]float64, len(names))
	for _, name := range names {
		if d.text[name] == nil {
			panic("no column " + name)
		}
	}
	for i := range d.text[names[0]] {
		whole := true
		for _, name := range names {
			whole = whole && d.text[name][i] != ""
		}
		if !whole {
			continue
		}
		for j, name := range names {
			out[j] = append(out[j], d.numbers[name][i])
		}
	}
	return out
}

// column is the name of the column that has the given role in the case.
func (c refCase) column(role string) string {
	name, ok := c.Columns[role].(string)
	if !ok {
		panic(fmt.Sprintf("%s: no column has the role %s", c.ID, role))
	}
	return name
}

// columns are the names of the columns that share a role; one name alone may
// stand without a list.
func (c refCase) columns(role string) []string {
	switch v := c.Columns[role].(type) {
	case string:
		return []string{v}
	case []any:
		return texts(v)
	}
	return nil
}

func texts(list []any) []string {
	out := make([]string, len(list))
	for i, v := range list {
		out[i] = v.(string)
	}
	return out
}

// text and whole read an option; a missing one is "" or fallback.
func (c refCase) text(option string) string {
	s, _ := c.Options[option].(string)
	return s
}

func (c refCase) whole(option string, fallback int) int {
	if v, ok := c.Options[option].(float64); ok {
		return int(v)
	}
	return fallback
}

func (c refCase) number(option string, fallback float64) float64 {
	if v, ok := c.Options[option].(float64); ok {
		return v
	}
	return fallback
}

func (c refCase) truth(option string) bool {
	b, _ := c.Options[option].(bool)
	return b
}
