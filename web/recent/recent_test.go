package recent_test

import (
	"testing"

	"loopwright/web/recent"
)

func holds(t *testing.T, m *recent.Map[string, int], want map[string]int) {
	t.Helper()
	for _, key := range []string{"a", "b", "c", "d"} {
		value, ok := m.Get(key)
		expected, kept := want[key]
		if ok != kept || value != expected {
			t.Errorf("%q holds %d, %v; want %d, %v", key, value, ok, expected, kept)
		}
	}
}

func TestTheLongestUnusedIsForgottenFirst(t *testing.T) {
	m := recent.New[string, int](3)
	m.Put("a", 1, 1)
	m.Put("b", 2, 1)
	m.Put("c", 3, 1)
	m.Get("a")
	m.Put("d", 4, 1)
	holds(t, m, map[string]int{"a": 1, "c": 3, "d": 4})
}

func TestAHeavyEntryPushesOutSeveralLightOnes(t *testing.T) {
	m := recent.New[string, int](3)
	m.Put("a", 1, 1)
	m.Put("b", 2, 1)
	m.Put("c", 3, 3)
	holds(t, m, map[string]int{"c": 3})
	m.Put("d", 4, 4)
	holds(t, m, map[string]int{})
}

func TestAnEntryIsReplacedAndForgotten(t *testing.T) {
	m := recent.New[string, int](3)
	m.Put("a", 1, 3)
	m.Put("a", 2, 1)
	m.Put("b", 3, 2)
	holds(t, m, map[string]int{"a": 2, "b": 3})
	m.Forget("b")
	m.Forget("c")
	m.Put("d", 4, 2)
	holds(t, m, map[string]int{"a": 2, "d": 4})
}
