package rules

import (
	"lagwise/lint/document"
	"lagwise/lint/request"
)

// subject is the value that names what a request relates.
func subject(a *request.Asked) document.Span {
	for _, key := range subjectKeys {
		if p, ok := a.Keys[key]; ok {
			return p.Value
		}
	}
	return a.Header
}
