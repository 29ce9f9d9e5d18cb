package study_test

import (
	"bytes"
	"errors"
	"math"
	"reflect"
	"testing"

	"offplumb/sim/measure"
	"offplumb/sim/study"
)

type inner struct {
	A float64
	B [3]float64
	T string
}

type packed struct {
	F float64
	I int
	U uint32
	O bool
	S string
	L []inner
	W []string
}

// fill sets every field that it reaches to something of its own.
func fill(v reflect.Value, n *int) {
	*n++
	switch v.Kind() {
	case reflect.Float64:
		v.SetFloat(1 / float64(*n+2))
	case reflect.Bool:
		v.SetBool(true)
	case reflect.String:
		v.SetString("text " + string(rune('a'+*n%20)))
	case reflect.Slice:
		v.Set(reflect.MakeSlice(v.Type(), 2, 2))
		fallthrough
	case reflect.Array:
		for i := range v.Len() {
			fill(v.Index(i), n)
		}
	case reflect.Struct:
		for i := range v.NumField() {
			fill(v.Field(i), n)
		}
	case reflect.Uint, reflect.Uint8, reflect.Uint32, reflect.Uint64:
		v.SetUint(uint64(*n))
	default:
		v.SetInt(-int64(*n))
	}
}

// TestPackKeepsEveryField: what studies store comes back whole, so that a field
// added to a landing is not lost in a join.
func TestPackKeepsEveryField(t *testing.T) {
	for _, like := range []any{packed{}, measure.Landing{}, measure.Rest{}, measure.Verdict{}} {
		var buf bytes.Buffer
		p := study.NewPacker(&buf)
		n := 0
		var want []any
		for range 3 {
			v := reflect.New(reflect.TypeOf(like)).Elem()
			fill(v, &n)
			want = append(want, v.Interface())
			if err := p.Put(v.Interface()); err != nil {
				t.Fatal(err)
			}
		}
		if err := p.Flush(); err != nil {
			t.Fatal(err)
		}
		u := study.NewUnpacker(bytes.NewReader(buf.Bytes()))
		for i := range want {
			got := reflect.New(reflect.TypeOf(like))
			if err := u.Get(got.Interface()); err != nil {
				t.Fatal(err)
			}
			if !reflect.DeepEqual(got.Elem().Interface(), want[i]) {
				t.Errorf("got\n%+v\nwant\n%+v", got.Elem(), want[i])
			}
		}
		if err := u.End(); err != nil {
			t.Error(err)
		}
	}
}

// TestPackIsExact: all doubles keep their bits.
func TestPackIsExact(t *testing.T) {
	for _, x := range []float64{0, math.Copysign(0, -1), math.NaN(), math.Inf(1), math.Inf(-1), math.SmallestNonzeroFloat64, math.MaxFloat64, 0.1, -1e-300} {
		var buf bytes.Buffer
		p := study.NewPacker(&buf)
		if err := errors.Join(p.Put(x), p.Flush()); err != nil {
			t.Fatal(err)
		}
		var got float64
		if err := study.NewUnpacker(&buf).Get(&got); err != nil || math.Float64bits(got) != math.Float64bits(x) {
			t.Errorf("got %g (%v), want %g", got, err, x)
		}
	}
}

// TestPackCutOff: results that are cut off anywhere, or longer than told, are
// refused, not guessed.
func TestPackCutOff(t *testing.T) {
	var v packed
	n := 0
	fill(reflect.ValueOf(&v).Elem(), &n)
	var buf bytes.Buffer
	p := study.NewPacker(&buf)
	if err := errors.Join(p.Put(v), p.Flush()); err != nil {
		t.Fatal(err)
	}
	for cut := range buf.Len() {
		u := study.NewUnpacker(bytes.NewReader(buf.Bytes()[:cut]))
		var got packed
		if err := u.Get(&got); !errors.Is(err, study.ErrPacked) {
			t.Errorf("cut at %d of %d: %v", cut, buf.Len(), err)
		}
	}
	u := study.NewUnpacker(bytes.NewReader(append(buf.Bytes(), 0)))
	var got packed
	if err := errors.Join(u.Get(&got), u.End()); !errors.Is(err, study.ErrPacked) {
		t.Errorf("a byte too many: %v", err)
	}
}

func TestLayoutTellsTypesApart(t *testing.T) {
	if a, b := study.Layout(inner{}), study.Layout(packed{}); a == b || a != "{A float64;B [3]float64;T string;}" {
		t.Errorf("%q and %q", a, b)
	}
}
