package units

import "testing"

func BenchmarkParseName(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Parse("kN"); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkParseFrequent(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Parse("kN/m^2"); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkParseCompound(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Parse("kN/cm^3"); err != nil {
			b.Fatal(err)
		}
	}
}

func BenchmarkParseUnknown(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		if _, err := Parse("kN/width"); err == nil {
			b.Fatal("no error")
		}
	}
}

func BenchmarkFormat(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		Format(48.8888, 4)
	}
}

func BenchmarkToSI(b *testing.B) {
	u := MustParse("ksi")
	for b.Loop() {
		u.ToSI(48.8888)
	}
}

func BenchmarkUnitFor(b *testing.B) {
	d := dimOf("Pa")
	for b.Loop() {
		Printing{}.UnitFor(d, false)
	}
}

func BenchmarkDimensionMul(b *testing.B) {
	d, e := dimOf("kN"), dimOf("mm")
	for b.Loop() {
		if _, err := d.Mul(e); err != nil {
			b.Fatal(err)
		}
	}
}

// The table is built when the program starts.
func BenchmarkBuildTable(b *testing.B) {
	b.ReportAllocs()
	for b.Loop() {
		buildTable()
	}
}
