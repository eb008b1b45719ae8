package evidence

import (
	"context"
	"errors"
	"sync"
	"sync/atomic"
	"testing"
)

func constantly(v int, calls *atomic.Int32) func(context.Context) (int, int64, error) {
	return func(context.Context) (int, int64, error) { calls.Add(1); return v, 8, nil }
}

func TestOneComputationPerKey(t *testing.T) {
	m := newMemory(1 << 20)
	var calls atomic.Int32
	release := make(chan struct{})
	var all sync.WaitGroup
	for range 20 {
		all.Add(1)
		go func() {
			defer all.Done()
			got, err := remember(context.Background(), m, keyOf("a"), func(context.Context) (int, int64, error) {
				calls.Add(1)
				<-release
				return 7, 8, nil
			})
			if got != 7 || err != nil {
				t.Errorf("got %d, %v", got, err)
			}
		}()
	}
	close(release)
	all.Wait()
	if n := calls.Load(); n != 1 {
		t.Errorf("computed %d times", n)
	}
}

func TestCancelledIsForgotten(t *testing.T) {
	m := newMemory(1 << 20)
	ctx, cancel := context.WithCancel(context.Background())
	began := make(chan struct{})
	ended := make(chan struct{})
	go func() {
		<-began
		cancel()
	}()
	_, err := remember(ctx, m, keyOf("a"), func(ctx context.Context) (int, int64, error) {
		close(began)
		<-ctx.Done() // the last waiter has left
		close(ended)
		return 0, 0, ctx.Err()
	})
	if !errors.Is(err, context.Canceled) {
		t.Fatalf("got %v", err)
	}
	<-ended
	var calls atomic.Int32
	if got, err := remember(context.Background(), m, keyOf("a"), constantly(3, &calls)); got != 3 || err != nil {
		t.Errorf("after a cancelled computation: %d, %v", got, err)
	}
}

func TestPanicIsForgotten(t *testing.T) {
	m := newMemory(1 << 20)
	_, err := remember(context.Background(), m, keyOf("a"), func(context.Context) (int, int64, error) { panic("broken") })
	var broken *Broken
	if !errors.As(err, &broken) {
		t.Fatalf("got %v", err)
	}
	var calls atomic.Int32
	if got, _ := remember(context.Background(), m, keyOf("a"), constantly(3, &calls)); got != 3 {
		t.Errorf("got %d", got)
	}
}

func TestErrorOfTheDataIsRemembered(t *testing.T) {
	m := newMemory(1 << 20)
	calls := 0
	for range 3 {
		_, err := remember(context.Background(), m, keyOf("a"), func(context.Context) (int, int64, error) {
			calls++
			return 0, 0, errors.New("constant")
		})
		if err == nil {
			t.Fatal("no error")
		}
	}
	if calls != 1 {
		t.Errorf("computed %d times", calls)
	}
}

func TestLeastRecentlyUsedGoesFirst(t *testing.T) {
	m := newMemory(3 * (256 + 8))
	var calls atomic.Int32
	ask := func(name string) {
		if _, err := remember(context.Background(), m, keyOf(name), constantly(1, &calls)); err != nil {
			t.Fatal(err)
		}
	}
	for _, name := range []string{"a", "b", "c", "a", "d"} { // d drives out b
		ask(name)
	}
	calls.Store(0)
	ask("a")
	ask("c")
	ask("d")
	if n := calls.Load(); n != 0 {
		t.Errorf("%d of the recent ones were computed again", n)
	}
	ask("b")
	if n := calls.Load(); n != 1 {
		t.Errorf("the oldest was computed %d times", n)
	}
}

func TestKeysDoNotRunTogether(t *testing.T) {
	if keyOf("ab", "c") == keyOf("a", "bc") || keyOf([]float64{1}, []float64{}) == keyOf([]float64{}, []float64{1}) {
		t.Error("different parts give one key")
	}
}
