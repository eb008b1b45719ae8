package evidence

import (
	"context"
	"errors"
	"slices"
	"sync"

	"lagwise/lint/dataset"
	"lagwise/lint/request"
)

// Case is what may be known of one request. It is cheap to make: everything
// in it is computed when asked for and remembered in its store. A case lives
// as long as one judgement; its context ends every question.
type Case struct {
	ctx   context.Context
	store *Store
	Bound
	req request.Request // the request asked about: as written, or a candidate

	mu      sync.Mutex // guards what follows
	failure error
	loaded  []*dataset.Series
	frames  [3]*framed
	fit     *fitted
}

type framed struct {
	rows *rows
	err  error
}

type fitted struct {
	fit *Fit
	err error
}

// Case returns what may be known of a bound request.
func (s *Store) Case(ctx context.Context, b Bound) *Case {
	return &Case{ctx: ctx, store: s, Bound: b, req: b.Asked.Request}
}

// With returns the case of another request on the same series: a candidate.
func (c *Case) With(req request.Request) *Case {
	return &Case{ctx: c.ctx, store: c.store, Bound: c.Bound, req: req}
}

// Req returns the request that the case is about.
func (c *Case) Req() *request.Request { return &c.req }

// Names returns the names of the series, in the order of the frames' columns.
func (c *Case) Names() []string {
	columns := c.req.Columns()
	names := make([]string, len(columns))
	for i, s := range columns {
		names[i] = s.Series
	}
	return names
}

// Index returns the column of a series.
func (c *Case) Index(name string) int {
	return slices.Index(c.Names(), name)
}

// Pairs returns the columns of every pair of a correlation, in its order.
func (c *Case) Pairs() [][2]int {
	var pairs [][2]int
	for _, p := range c.req.Pairs() {
		pairs = append(pairs, [2]int{c.Index(p[0]), c.Index(p[1])})
	}
	return pairs
}

// Given returns the columns of the controlled series of a correlation.
func (c *Case) Given() []int {
	var given []int
	for _, name := range c.req.Given {
		given = append(given, c.Index(name))
	}
	return given
}

// Failure returns what went wrong that the data are not to blame for.
func (c *Case) Failure() error {
	c.mu.Lock()
	defer c.mu.Unlock()
	return c.failure
}

// note records a failure and hands the error on.
func (c *Case) note(err error) error {
	if err != nil && passing(err) {
		c.mu.Lock()
		c.failure = errors.Join(c.failure, err)
		c.mu.Unlock()
	}
	return err
}

// load returns the series with their values, read at most once a case.
func (c *Case) load() ([]*dataset.Series, error) {
	c.mu.Lock()
	got := c.loaded
	c.mu.Unlock()
	if got != nil {
		return got, nil
	}
	for _, name := range c.Names() {
		i := slices.IndexFunc(c.Series, func(b BoundSeries) bool { return b.Name == name })
		b := c.Series[i]
		s, err := c.store.glimpsed(c.ctx, c.Bound, b)
		if err != nil {
			return nil, c.note(seriesError(b.Name, err))
		}
		got = append(got, s)
	}
	c.mu.Lock()
	c.loaded = got
	c.mu.Unlock()
	return got, nil
}

// Unavailable says that a series of the request could not be read.
type Unavailable struct {
	Series  string
	Trouble Trouble
}

func (u *Unavailable) Error() string { return u.Series + ": " + u.Trouble.Message }

func seriesError(name string, err error) error {
	var t *dataset.Trouble
	if errors.As(err, &t) {
		return &Unavailable{Series: name, Trouble: troubleOf(t)}
	}
	return err
}

func troubleOf(t *dataset.Trouble) Trouble {
	return Trouble{Kind: TroubleKind(t.Kind), Column: t.Column, Nearest: t.Nearest, Message: t.Message}
}
