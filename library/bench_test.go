package library_test

import (
	"testing"

	"workheat/library"
)

// The catalogue is made anew at every start of the program.
func BenchmarkCatalogue(b *testing.B) {
	b.ReportAllocs()
	for range b.N {
		library.Catalogue()
	}
}
