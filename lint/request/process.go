package request

import (
	"strconv"
	"strings"
)

// ErrorProcess is the process of the errors of a regression.
type ErrorProcess struct {
	Kind   string // independent, ar, arma, car, exponential, gaussian, spherical
	P, Q   int    // orders of ar, arma and car
	Nugget bool   // of a covariance that decays with distance
}

// maxOrder bounds the orders of an error process.
const maxOrder = 100

// ParseErrors reads a process of the errors: independent, ar(p), arma(p,q),
// car(1), exponential, gaussian, spherical; the last three also as
// nugget+exponential and so on.
func ParseErrors(s string) (ErrorProcess, bool) {
	switch kind, nugget := strings.CutPrefix(s, "nugget+"); kind {
	case "exponential", "gaussian", "spherical":
		return ErrorProcess{Kind: kind, Nugget: nugget}, true
	}
	if s == "independent" {
		return ErrorProcess{Kind: s}, true
	}
	name, args, ok := call(s)
	if !ok {
		return ErrorProcess{}, false
	}
	for _, order := range args {
		if order > maxOrder {
			return ErrorProcess{}, false
		}
	}
	switch {
	case name == "ar" && len(args) == 1 && args[0] >= 1, name == "car" && len(args) == 1 && args[0] == 1:
		return ErrorProcess{Kind: name, P: args[0]}, true
	case name == "arma" && len(args) == 2 && args[0]+args[1] >= 1:
		return ErrorProcess{Kind: name, P: args[0], Q: args[1]}, true
	}
	return ErrorProcess{}, false
}

// String returns the process as it is written.
func (e ErrorProcess) String() string {
	switch e.Kind {
	case "ar", "car":
		return e.Kind + "(" + strconv.Itoa(e.P) + ")"
	case "arma":
		return "arma(" + strconv.Itoa(e.P) + "," + strconv.Itoa(e.Q) + ")"
	}
	if e.Nugget {
		return "nugget+" + e.Kind
	}
	return e.Kind
}
