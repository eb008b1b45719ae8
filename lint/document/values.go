package document

import (
	"errors"
	"math"
	"strconv"
	"strings"
	"time"

	"github.com/pelletier/go-toml/v2/unstable"
)

var errNoDate = errors.New("not a date or time of the calendar")

// scalar decodes a well-formed scalar. The error says only that the value does
// not exist (a 13th month) or does not fit into 64 bits.
func scalar(kind unstable.Kind, raw string, decoded []byte) (Kind, any, error) {
	switch kind {
	case unstable.String:
		return String, string(decoded), nil
	case unstable.Bool:
		return Boolean, raw == "true", nil
	case unstable.Integer:
		v, err := strconv.ParseInt(raw, 0, 64)
		return Integer, v, err
	case unstable.Float:
		v, err := float(raw)
		return Float, v, err
	case unstable.DateTime:
		v, err := offsetDateTime(raw)
		return OffsetDateTime, v, err
	case unstable.LocalDateTime:
		return LocalDateTime, raw, local(raw, "2006-01-02T15:04:05.999999999", "2006-01-02T15:04")
	case unstable.LocalDate:
		return LocalDate, raw, local(raw, "2006-01-02")
	}
	return LocalTime, raw, local(raw, "15:04:05.999999999", "15:04")
}

func float(raw string) (float64, error) {
	if strings.HasSuffix(raw, "nan") { // strconv takes no signed nan
		sign := 1.0
		if raw[0] == '-' {
			sign = -1
		}
		return math.Copysign(math.NaN(), sign), nil
	}
	return strconv.ParseFloat(strings.ReplaceAll(raw, "_", ""), 64)
}

func offsetDateTime(raw string) (time.Time, error) {
	text := upperTime(raw)
	// Go takes offsets up to 24:60; RFC 3339 (2002) ends at 23:59.
	if i := len(text) - len("+00:00"); text[len(text)-1] != 'Z' && (text[i+1:i+3] > "23" || text[i+4:] > "59") {
		return time.Time{}, errNoDate
	}
	t, err := time.Parse(time.RFC3339Nano, text)
	if err != nil {
		t, err = time.Parse("2006-01-02T15:04Z07:00", text)
	}
	return t, err
}

func local(raw string, layouts ...string) error {
	for _, layout := range layouts {
		if _, err := time.Parse(layout, upperTime(raw)); err == nil {
			return nil
		}
	}
	return errNoDate
}

// upperTime writes the separators of a date and time as Go's layouts do.
func upperTime(raw string) string { return separators.Replace(raw) }

var separators = strings.NewReplacer(" ", "T", "t", "T", "z", "Z")
