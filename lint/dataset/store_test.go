package dataset

import (
	"context"
	"errors"
	"os"
	"path/filepath"
	"sync"
	"sync/atomic"
	"testing"
	"time"

	"lagwise/lint/request"
)

// library is a store over one file whose clock the test sets.
func library(t *testing.T, text string) (s *Store, get func() (*Record, error), path string) {
	t.Helper()
	root := realPath(t.TempDir())
	path = write(t, filepath.Join(root, "boats.csv"), text)
	s = NewStore(DefaultLimits())
	roots := NewRoots(root, nil)
	return s, func() (*Record, error) {
		return s.Record(t.Context(), roots, root, &request.Record{File: "boats.csv", HeaderRows: 1})
	}, path
}

func TestUnchangedFilesAreRemembered(t *testing.T) {
	s, get, path := library(t, "year,boats\n2001,1\n2002,2\n")
	s.now = func() time.Time { return time.Now().Add(time.Minute) }
	first, err := get()
	if err != nil {
		t.Fatal(err)
	}
	if second, _ := get(); second != first {
		t.Error("an unchanged file was parsed again")
	}
	write(t, path, "year,boats\n2001,1\n2002,2\n2003,3\n")
	if third, _ := get(); third == first || third.Rows != 3 {
		t.Error("a changed file was not read again")
	}
}

// A change within the resolution of the file system's clock keeps size and
// times; only the bytes tell it.
func TestFreshFilesAreLookedAtAgain(t *testing.T) {
	s, get, path := library(t, "year,boats\n2001,1\n2002,2\n")
	first, _ := get()
	if second, _ := get(); second != first {
		t.Error("the same bytes were parsed again")
	}
	key := s.recent.Front().Value.(*kept).key
	if err := os.WriteFile(path, []byte("year,boats\n2001,1\n2002,9\n"), 0o644); err != nil {
		t.Fatal(err)
	}
	info, _ := os.Stat(path)
	s.mu.Lock() // as if the clock had not moved: the identity stays
	at := s.known[key]
	at.Value.(*kept).key = recordKey{identityOf(path, info), key.options}
	delete(s.known, key)
	s.known[at.Value.(*kept).key] = at
	s.mu.Unlock()
	third, err := get()
	if err != nil || third == first || third.Columns[1].Values[1] != 9 {
		t.Errorf("an old record was served: %v", err)
	}
}

func TestOptionsTellReadingsApart(t *testing.T) {
	base := request.Record{File: "x.csv", HeaderRows: 1}
	seen := map[[32]byte]string{readingOptions(&base): "base"}
	for name, change := range map[string]func(r *request.Record){
		"delimiter": func(r *request.Record) { r.Delimiter = ";" }, "decimal": func(r *request.Record) { r.Decimal = "," },
		"missing": func(r *request.Record) { r.Missing = []string{"-9"} }, "only": func(r *request.Record) { r.MissingOnly = []string{"-9"} },
		"none": func(r *request.Record) { r.MissingOnly = []string{} }, "group": func(r *request.Record) { r.Group = "a" },
		"along": func(r *request.Record) { r.Along = &request.Along{Column: "year"} }, "sites": func(r *request.Record) { r.At = &request.Sites{} },
		"header": func(r *request.Record) { r.HeaderRows = 2 },
	} {
		r := base
		change(&r)
		if other, dup := seen[readingOptions(&r)]; dup {
			t.Errorf("%s reads like %s", name, other)
		}
		seen[readingOptions(&r)] = name
	}
}

func TestOneParseHoweverManyWait(t *testing.T) {
	s := NewStore(DefaultLimits())
	var reads atomic.Int32
	release := make(chan struct{})
	read := func(ctx context.Context) (*parsed, error) {
		reads.Add(1)
		<-release
		return &parsed{record: emptyRecord(), settled: true}, nil
	}
	var done sync.WaitGroup
	flights := make([]*flight, 20)
	for i := range flights {
		flights[i] = s.join(t.Context(), recordKey{}, read)
	}
	for _, f := range flights {
		done.Go(func() {
			if r, err := f.wait(t.Context(), s); r == nil || err != nil {
				t.Errorf("%v", err)
			}
		})
	}
	close(release)
	done.Wait()
	if n := reads.Load(); n != 1 {
		t.Errorf("%d reads", n)
	}
	if s.recall(recordKey{}) == nil {
		t.Error("not remembered")
	}
}

func emptyRecord() *Record { return &Record{Axis: &Axis{}, table: &table{}} }

func TestTheLastWaiterCancels(t *testing.T) {
	s := NewStore(DefaultLimits())
	cancelled := make(chan struct{})
	read := func(ctx context.Context) (*parsed, error) {
		<-ctx.Done()
		close(cancelled)
		return nil, ctx.Err()
	}
	one, leaveOne := context.WithCancel(t.Context())
	two, leaveTwo := context.WithCancel(t.Context())
	f := s.join(one, recordKey{}, read)
	s.join(two, recordKey{}, read)
	leaveOne()
	if _, err := f.wait(one, s); !errors.Is(err, context.Canceled) {
		t.Error(err)
	}
	select {
	case <-cancelled:
		t.Fatal("cancelled while another waits")
	default:
	}
	leaveTwo()
	f.wait(two, s)
	<-cancelled
	if s.recall(recordKey{}) != nil {
		t.Error("a cancelled parse was remembered")
	}
}

func TestAPanicIsNotRemembered(t *testing.T) {
	s := NewStore(DefaultLimits())
	f := s.join(t.Context(), recordKey{}, func(context.Context) (*parsed, error) { panic("a broken reader") })
	_, err := f.wait(t.Context(), s)
	wantMessage(t, err, "a broken reader")
	if s.recall(recordKey{}) != nil || len(s.flying) != 0 {
		t.Error("it was remembered")
	}
}

func TestFailuresAreNotRemembered(t *testing.T) {
	s, get, path := library(t, "year,boats\n")
	if _, err := get(); err == nil {
		t.Fatal("a header alone was read")
	}
	write(t, path, "year,boats\n2001,1\n")
	if _, err := get(); err != nil || s.bytes == 0 {
		t.Error(err)
	}
}

func TestTheLeastRecentlyUsedGoesFirst(t *testing.T) {
	limits := DefaultLimits()
	limits.StoredBytes = 3 * emptyRecord().bytes()
	s := NewStore(limits)
	key := func(i int) recordKey { return recordKey{identity: Identity{Inode: uint64(i)}} }
	for i := range 3 {
		s.remember(key(i), &parsed{record: emptyRecord()})
	}
	s.recall(key(0))
	s.remember(key(3), &parsed{record: emptyRecord()})
	for i, want := range []bool{true, false, true, true} {
		if (s.recall(key(i)) != nil) != want {
			t.Errorf("%d: want %v", i, want)
		}
	}
	if s.bytes > limits.StoredBytes {
		t.Errorf("%d bytes", s.bytes)
	}
}
