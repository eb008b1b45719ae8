package evidence

// DataDigest digests the values of all series that the request names, before
// any alignment: two judgements of one text that agree in it agree in
// everything. The error is that of reading the series.
func (c *Case) DataDigest() ([32]byte, error) {
	all, err := c.load()
	if err != nil {
		return [32]byte{}, err
	}
	parts := []any{"data"}
	for _, s := range all {
		parts = append(parts, s.Digest, s.Season)
	}
	return keyOf(parts...), nil
}
