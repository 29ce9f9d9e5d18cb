package scenarios_test

import (
	"bytes"
	"fmt"
	"math/rand/v2"
	"os"
	"testing"
)

// stowed are the kinds of things of the store ring. Those without a mass are
// bodies of the scenario. Masses and sizes are our own guesses.
var stowed = []struct {
	name, body string
	mass, wide float64 // kg, m
}{
	{"tin", "tin", 0, 0.08}, {"cell pack", "cell pack", 0, 0.09}, {"socket", "socket", 0, 0.028},
	{"water flask", "", 1.05, 0.09}, {"ratchet", "", 0.55, 0.05}, {"hand lamp", "", 0.3, 0.07}, {"coil of line", "", 1.4, 0.16},
	{"filter", "", 0.7, 0.18}, {"sample jar", "", 0.25, 0.07}, {"glove pair", "", 0.12, 0.1}, {"drill head", "", 1.9, 0.12},
	{"shackle", "", 0.32, 0.06}, {"valve body", "", 2.4, 0.11}, {"roll of tape", "", 0.2, 0.1}, {"box of rivets", "", 0.9, 0.1},
	{"ration bag", "", 0.5, 0.14}, {"bolt M12", "", 0.09, 0.03}, {"spare fan", "", 0.8, 0.15}, {"cable drum", "", 3.2, 0.2}, {"mallet", "", 0.75, 0.08},
}

// storeList writes the stowage list of the store ring: things at the front
// edge of shelves, every third knocked off.
func storeList() []byte {
	r := rand.New(rand.NewPCG(21, 46))
	var b bytes.Buffer
	b.WriteString("release,body,mass_kg,diameter_m,deck,spinward_m,axial_m,height_m,v_spinward_m_s,v_axial_m_s,v_up_m_s\n")
	shelves := [...]float64{0.55, 1.05, 1.55, 2.05}
	for i := range 200 {
		k := &stowed[i%len(stowed)]
		deck := [...]string{"floor", "upper"}[i/len(stowed)%2]
		middle, half := -2.0, 1.9 // m, of the rack
		if deck == "upper" {
			half = 1.4
		}
		mass := ""
		wide := ""
		if k.mass > 0 {
			mass, wide = fmt.Sprint(k.mass), fmt.Sprint(k.wide)
		}
		axial := 2.25 - k.wide/2 - 0.01 // in front of the rack
		fmt.Fprintf(&b, "%s %03d,%s,%s,%s,%s,%.2f,%.3f,%.3f", k.name, i+1, k.body, mass, wide, deck,
			middle+half*(2*r.Float64()-1), axial, shelves[i/7%len(shelves)]+k.wide/2)
		if i%3 == 0 { // a careless hand
			fmt.Fprintf(&b, ",%.2f,%.2f,%.2f\n", r.NormFloat64()*0.3, -0.8*r.Float64(), 0.3*r.Float64())
			continue
		}
		b.WriteString(",,,\n")
	}
	return b.Bytes()
}

// TestStoreList: the stowage list of the store ring is the one that is made
// here; -update writes it.
func TestStoreList(t *testing.T) {
	const name = "shipped/store-ring.csv"
	if *update {
		if err := os.WriteFile(name, storeList(), 0o666); err != nil {
			t.Fatal(err)
		}
	}
	got, err := os.ReadFile(name)
	if err != nil || !bytes.Equal(got, storeList()) {
		t.Errorf("%s is not what -update writes (%v)", name, err)
	}
}
