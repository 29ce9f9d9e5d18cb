package model

import "testing"

// BenchmarkNewWithSpokes is the making of a model with four spokes of 40 m, as
// each point of a sweep does.
func BenchmarkNewWithSpokes(b *testing.B) {
	in := Model{Habitat: Habitat{Room: Room{FloorRadius: 60, CeilingRadius: 50, Length: 10}, Spin: 0.4},
		Solver: Solver{RelTol: 1e-9, PosTol: 1e-12, VelTol: 1e-12, MaxTime: 60}, Output: Output{Step: 0.01},
		Rooms: []Room{{Name: "hub", FloorRadius: 3, Length: 8}}}
	for i, name := range []string{"A", "B", "C", "D"} {
		in.Passages = append(in.Passages, Passage{Name: name, Spinward: Arc{Value: float64(i) * 1.5707963267948966, IsAngle: true},
			FromRadius: 3, ToRadius: 50, Width: 1.6})
	}
	b.ReportAllocs()
	for b.Loop() {
		if _, problems := New(in); len(problems) > 0 {
			b.Fatal(problems)
		}
	}
}
