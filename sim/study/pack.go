package study

import (
	"bufio"
	"encoding/binary"
	"errors"
	"fmt"
	"io"
	"math"
	"reflect"
	"strings"
)

// Packer writes values one after another, compactly and exactly: what an
// [Unpacker] reads is the same to the last bit, negative zero and missing values
// included. A value is a bool, a whole number, a float64, a text, or a slice,
// array or struct of such; all fields of a struct are exported.
type Packer struct {
	w     *bufio.Writer
	known map[string]uint64 // texts written before, by their number
	err   error
}

// NewPacker packs into a writer.
func NewPacker(w io.Writer) *Packer {
	return &Packer{w: bufio.NewWriter(w), known: map[string]uint64{}}
}

// mostTexts bounds the texts that are kept to be written once: names of
// surfaces recur, names of releases do not. mostLength is that of those kept,
// in bytes.
const (
	mostTexts  = 4096
	mostLength = 256
)

// Put writes a value.
func (p *Packer) Put(v any) error {
	if p.err == nil {
		p.put(reflect.ValueOf(v))
	}
	return p.err
}

// Flush writes what is still held back.
func (p *Packer) Flush() error {
	if p.err == nil {
		p.err = p.w.Flush()
	}
	return p.err
}

func (p *Packer) put(v reflect.Value) {
	switch v.Kind() {
	case reflect.Bool:
		n := uint64(0)
		if v.Bool() {
			n = 1
		}
		p.number(n)
	case reflect.Int, reflect.Int8, reflect.Int16, reflect.Int32, reflect.Int64:
		p.bytes(binary.AppendVarint(p.w.AvailableBuffer(), v.Int()))
	case reflect.Uint, reflect.Uint8, reflect.Uint16, reflect.Uint32, reflect.Uint64:
		p.number(v.Uint())
	case reflect.Float64:
		p.bytes(binary.LittleEndian.AppendUint64(p.w.AvailableBuffer(), math.Float64bits(v.Float())))
	case reflect.String:
		p.text(v.String())
	case reflect.Slice:
		p.number(uint64(v.Len()))
		fallthrough
	case reflect.Array:
		for i := range v.Len() {
			p.put(v.Index(i))
		}
	case reflect.Struct:
		for i := range v.NumField() {
			p.put(v.Field(i))
		}
	default:
		p.err = fmt.Errorf("study: a %s cannot be packed", v.Type())
	}
}

func (p *Packer) bytes(b []byte) {
	if _, err := p.w.Write(b); err != nil && p.err == nil {
		p.err = err
	}
}

func (p *Packer) number(n uint64) { p.bytes(binary.AppendUvarint(p.w.AvailableBuffer(), n)) }

// text writes the number of a text that was there before, or 0 and the text.
func (p *Packer) text(s string) {
	if n, ok := p.known[s]; ok {
		p.number(n)
		return
	}
	if len(p.known) < mostTexts && len(s) <= mostLength {
		p.known[s] = uint64(len(p.known) + 1)
	}
	p.number(0)
	p.number(uint64(len(s)))
	if _, err := p.w.WriteString(s); err != nil && p.err == nil {
		p.err = err
	}
}

// Unpacker reads what a [Packer] wrote.
type Unpacker struct {
	r     *bufio.Reader
	texts []string
	err   error
}

// NewUnpacker unpacks from a reader.
func NewUnpacker(r io.Reader) *Unpacker { return &Unpacker{r: bufio.NewReader(r)} }

// ErrPacked says that packed values are cut off or garbled.
var ErrPacked = errors.New("packed results are cut off or garbled")

// Get reads a value into what a pointer points to, which has the type of what
// was put.
func (u *Unpacker) Get(to any) error {
	if u.err == nil {
		u.get(reflect.ValueOf(to).Elem())
	}
	return u.err
}

// End is an error where anything is left to be read.
func (u *Unpacker) End() error {
	if u.err != nil {
		return u.err
	}
	switch _, err := u.r.ReadByte(); {
	case errors.Is(err, io.EOF):
		return nil
	case err != nil:
		return fmt.Errorf("%w: %w", ErrPacked, err)
	}
	return fmt.Errorf("%w: there is more than was told", ErrPacked)
}

func (u *Unpacker) get(v reflect.Value) {
	if u.err != nil {
		return
	}
	switch v.Kind() {
	case reflect.Bool:
		v.SetBool(u.number() == 1)
	case reflect.Int, reflect.Int8, reflect.Int16, reflect.Int32, reflect.Int64:
		n, err := binary.ReadVarint(u.r)
		u.fail(err)
		v.SetInt(n)
	case reflect.Uint, reflect.Uint8, reflect.Uint16, reflect.Uint32, reflect.Uint64:
		v.SetUint(u.number())
	case reflect.Float64:
		var b [8]byte
		_, err := io.ReadFull(u.r, b[:])
		u.fail(err)
		v.SetFloat(math.Float64frombits(binary.LittleEndian.Uint64(b[:])))
	case reflect.String:
		v.SetString(u.text())
	case reflect.Slice:
		u.slice(v)
	case reflect.Array:
		for i := range v.Len() {
			u.get(v.Index(i))
		}
	case reflect.Struct:
		for i := range v.NumField() {
			u.get(v.Field(i))
		}
	default:
		u.err = fmt.Errorf("study: a %s cannot be unpacked", v.Type())
	}
}

// slice reads a slice; an empty one is nil. It grows as values come, so that a
// garbled length takes no memory.
func (u *Unpacker) slice(v reflect.Value) {
	v.SetZero()
	for n := u.number(); n > 0 && u.err == nil; n-- {
		one := reflect.New(v.Type().Elem()).Elem()
		u.get(one)
		v.Set(reflect.Append(v, one))
	}
}

func (u *Unpacker) number() uint64 {
	n, err := binary.ReadUvarint(u.r)
	u.fail(err)
	return n
}

func (u *Unpacker) text() string {
	if n := u.number(); n > uint64(len(u.texts)) {
		u.fail(fmt.Errorf("no text %d", n))
	} else if n > 0 {
		return u.texts[n-1]
	}
	var b strings.Builder
	if n := u.number(); u.err == nil {
		_, err := io.CopyN(&b, u.r, int64(min(n, math.MaxInt32)))
		u.fail(err)
	}
	if len(u.texts) < mostTexts && b.Len() <= mostLength {
		u.texts = append(u.texts, b.String())
	}
	return b.String()
}

func (u *Unpacker) fail(err error) {
	if err != nil && u.err == nil {
		u.err = fmt.Errorf("%w: %w", ErrPacked, err)
	}
}

// Layout describes a type as it is packed: two programs whose layouts are the
// same read one another's values.
func Layout(v any) string { return layout(reflect.TypeOf(v)) }

func layout(t reflect.Type) string {
	switch t.Kind() {
	case reflect.Slice:
		return "[]" + layout(t.Elem())
	case reflect.Array:
		return fmt.Sprintf("[%d]%s", t.Len(), layout(t.Elem()))
	case reflect.Struct:
		var b strings.Builder
		for i := range t.NumField() {
			f := t.Field(i)
			fmt.Fprintf(&b, "%s %s;", f.Name, layout(f.Type))
		}
		return "{" + b.String() + "}"
	}
	return t.Kind().String()
}
