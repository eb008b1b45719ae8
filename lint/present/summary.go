package present

import (
	"fmt"

	"lagwise/lint/finding"
)

// Summary counts what a review says.
type Summary struct {
	Error       int `json:"error"`
	Warning     int `json:"warning"`
	Information int `json:"information"`
	Hint        int `json:"hint"`
	Deviations  int `json:"deviations"`
	Documents   int `json:"documents"`
	Requests    int `json:"requests"`
	Series      int `json:"series"`
}

// Summarize counts; findings under a deviation count as deviations only.
func Summarize(all []Reviewed) Summary {
	s := Summary{Documents: len(all)}
	for _, doc := range all {
		s.Requests += doc.Requests
		s.Series += doc.Series
		for _, f := range doc.Findings {
			s.count(f)
		}
	}
	return s
}

func (s *Summary) count(f finding.Finding) {
	switch {
	case f.Deviation != nil:
		s.Deviations++
	case f.Severity == finding.Error:
		s.Error++
	case f.Severity == finding.Warning:
		s.Warning++
	case f.Severity == finding.Information:
		s.Information++
	case f.Severity == finding.Hint:
		s.Hint++
	}
}

// Words is the summary in a line.
func (s Summary) Words() string {
	words := fmt.Sprintf("%s in %s: %s, %s, %d information, %s",
		counted(s.Requests, "request"), counted(s.Documents, "document"), counted(s.Error, "error"), counted(s.Warning, "warning"),
		s.Information, counted(s.Hint, "hint"))
	if s.Deviations > 0 {
		words += fmt.Sprintf(", %d under a deviation", s.Deviations)
	}
	return words + "."
}

func counted(n int, noun string) string {
	if n == 1 {
		return "1 " + noun
	}
	return fmt.Sprintf("%d %ss", n, noun)
}
