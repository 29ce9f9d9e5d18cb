package scenarios_test

import (
	"errors"
	"testing"

	"offplumb/scenarios"
)

// FuzzList reads anything as a release list, kept and streamed: both take it
// with the same number of rows, or both refuse it, each fault at its place.
func FuzzList(f *testing.F) {
	for _, list := range []string{settableList, "release,height_m\na,1\nb,2\n", "\ufeffrelease,height_m\r\n\"a\n\",1\r\n", "release;height_m\na;1\n",
		"release,height_m\na,1\na,1\n", "release,height_m\n\n\n,\n=1,1e400\n", "release,body,mass_kg,diameter_m,deck,spinward_m,axial_m,height_m,v_spinward_m_s,v_axial_m_s,v_up_m_s\na,,1,0.1,floor,1,0,1,1,2,3\n"} {
		f.Add(list)
	}
	const src = "format = 1\n[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\n[[release_list]]\nfile = \"l.csv\"\nuntil = \"landing\"\n"
	f.Fuzz(func(t *testing.T, list string) {
		rows := map[int]int{}
		for _, keep := range []int{1 << 20, 1} {
			sc, err := scenarios.Load("fuzz.toml", []byte(src), scenarios.Options{KeepRows: keep, ReadFile: func(string) ([]byte, error) { return []byte(list), nil }})
			var faults scenarios.ErrorList
			switch {
			case err == nil:
				rows[keep] = len(sc.Model.Releases)
				for _, s := range sc.Streams {
					rows[keep] += s.Rows
				}
			case errors.As(err, &faults):
				rows[keep] = -1
				for _, e := range faults {
					checkFault(t, e)
				}
			default:
				t.Fatal(err)
			}
		}
		if rows[1] != rows[1<<20] {
			t.Errorf("%d rows kept, %d streamed (-1: refused) of %q", rows[1<<20], rows[1], list)
		}
	})
}

// FuzzQuantity sets quantities of all dimensions to anything: they are taken,
// finite and in their range, or refused at the setting.
func FuzzQuantity(f *testing.F) {
	for _, q := range []string{"1.9 m", "-3 rpm", "1e400 m", "nan m", "0x1p3 m", "1_0 m", "１ m", "22 °C", "1 m/s^2", "1 µm", "- 3 m", "+.5e-3 ft", "5", ""} {
		f.Add(q)
	}
	const src = "format = 1\n[habitat]\nfloor_radius = \"18 m\"\nspin = \"5 rpm\"\n[air]\npressure = \"1 bar\"\n[[body]]\nname = \"b\"\nmass = \"1 kg\"\ndiameter = \"1 cm\"\n[[release]]\nname = \"a\"\nbody = \"b\"\nat = { height = \"1 m\" }\n"
	keys := []string{"habitat.spin", "habitat.floor_radius", "air.temperature", "air.pressure", "body.b.mass", "release.a.at.height", "release.a.at.spinward", "release.a.time", "release.a.until"}
	f.Fuzz(func(t *testing.T, q string) {
		for _, key := range keys {
			_, err := scenarios.Load("fuzz.toml", []byte(src), scenarios.Options{Sets: []string{key + "=" + q}})
			var faults scenarios.ErrorList
			if err != nil && !errors.As(err, &faults) {
				t.Fatal(err)
			}
			for _, e := range faults {
				checkFault(t, e)
			}
		}
	})
}
