package finding

// severityNames is indexed by Severity.
var severityNames = [...]string{"unset", "error", "warning", "information", "hint", "none"}

// String returns the name used in documents and JSON.
func (s Severity) String() string { return severityNames[s] }

// ParseSeverity returns the severity of a name used in documents.
func ParseSeverity(name string) (Severity, bool) {
	for i, n := range severityNames {
		if i > 0 && n == name {
			return Severity(i), true
		}
	}
	return Unset, false
}

// AtLeast reports whether s is as heavy as the other or heavier.
func (s Severity) AtLeast(other Severity) bool { return s != Unset && s <= other && s != None }
