package dataset

import (
	"math"
	"strings"
)

// window is the positions from low up to but not including high; inclusive
// says that high belongs to it too.
type window struct {
	low, high float64
	inclusive bool
}

func (w window) holds(pos float64) bool {
	return pos >= w.low && (pos < w.high || w.inclusive && pos == w.high)
}

// windowOf reads `from` and `until` in the units of an axis. Both ends belong
// to the window: until = "2020" is the whole year. Ages may be given in
// either direction.
func windowOf(a *Axis, from, until string) (window, error) {
	w := window{math.Inf(-1), math.Inf(1), true}
	var err error
	var closed bool
	if from != "" {
		if w.low, _, _, err = bound(a, "from", from); err != nil {
			return w, err
		}
	}
	if until != "" {
		var low float64
		if low, w.high, closed, err = bound(a, "until", until); err != nil {
			return w, err
		}
		w.inclusive = closed
		if a.Kind == "age" && from != "" && low < w.low {
			w.low, w.high = low, w.low
		}
	}
	return w, nil
}

// bound returns the first position of a bound and the first behind it; closed
// says that they are the same position, which belongs to it.
func bound(a *Axis, key, text string) (low, high float64, closed bool, err error) {
	text = strings.TrimSpace(text)
	if a.Unit == Number || a.Unit == Row {
		v, ok := parsePlain([]byte(text), '.')
		if !ok {
			return 0, 0, false, mismatch("%s = %q is not a number, but the axis %s is counted in numbers (%s to %s)", key, text, a.Kind, a.First(), a.Last())
		}
		if a.Kind == "age" {
			v = -v
		}
		return v, v, true, nil
	}
	m, ok := parseTime([]byte(text))
	if !ok {
		return 0, 0, false, mismatch("%s = %q is not a time; write it like %s", key, text, a.First())
	}
	if m.form == decimalForm {
		pos, ok := map[AxisUnit]float64{Year: m.decimal, Month: math.Floor(m.decimal * 12)}[a.Unit]
		if !ok {
			return 0, 0, false, mismatch("%s = %q is a decimal year, but the axis has dates; write it like %s", key, text, a.First())
		}
		return pos, pos, true, nil
	}
	low, high = m.in(a.Unit), m.after(a.Unit)
	if high <= low {
		return low, low, true, nil
	}
	return low, high, false, nil
}
