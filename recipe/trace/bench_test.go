package trace

import "testing"

func BenchmarkWalkLongBatch(b *testing.B) {
	r := long()
	b.ReportAllocs()
	for b.Loop() {
		if tr := Walk(r, Options{}); len(tr.Problems) > 0 {
			b.Fatal(tr.Problems)
		}
	}
}
