package rules

import "lagwise/lint/document"

// tableAt returns the table at a path of keys, or nil: the place that an edit
// of a record or a series is written to.
func tableAt(t *document.Tree, path ...string) *document.Node {
	if t == nil {
		return nil
	}
	node := t.Root
	for _, key := range path {
		if node == nil {
			return nil
		}
		member := node.Get(key)
		if member == nil {
			return nil
		}
		node = member.Value
	}
	return node
}
