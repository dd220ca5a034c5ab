package solver

import (
	"reflect"
	"testing"
)

func TestNullSpaceGivesWholeNumbersWithoutCommonFactor(t *testing.T) {
	tests := []struct {
		name string
		rows []map[int]int
		size int
		want [][]int
	}{
		{"nothing to eliminate", nil, 2, [][]int{{1, 0}, {0, 1}}},
		{"two meshes with a contact between them", []map[int]int{{0: 1, 1: -1}}, 2, [][]int{{1, 1}}},
		{"two that run the same way through it", []map[int]int{{0: 1, 1: 1}}, 2, [][]int{{1, -1}}},
		{"a chain of four", []map[int]int{{1: 1, 2: -1}, {0: 1, 1: -1}, {2: -1, 3: 1}}, 4, [][]int{{1, 1, 1, 1}}},
		{"the same contact twice", []map[int]int{{0: 1, 1: -1}, {0: -1, 1: 1}}, 2, [][]int{{1, 1}}},
		{"a mesh whose current is set", []map[int]int{{0: 1}, {0: 1, 1: -1}}, 2, nil},
		{"a branch in three meshes", []map[int]int{{0: 1, 1: 1, 2: -1}}, 3, [][]int{{1, -1, 0}, {1, 0, 1}}},
		{"multiples", []map[int]int{{0: 2, 1: 3, 2: 4}}, 3, [][]int{{3, -2, 0}, {2, 0, -1}}},
		{"multiples of two rows", []map[int]int{{0: 2, 1: 3}, {1: 5, 2: 7}}, 3, [][]int{{21, -14, 10}}},
	}
	for _, test := range tests {
		if got := nullSpace(test.rows, test.size); !reflect.DeepEqual(got, test.want) {
			t.Errorf("%s: %v, want %v", test.name, got, test.want)
		}
	}
}
