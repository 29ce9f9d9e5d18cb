package sim

import (
	"go/ast"
	"go/doc"
	"go/parser"
	"go/token"
	"io/fs"
	"path/filepath"
	"slices"
	"strings"
	"testing"
)

// TestEveryNameIsExplained: each package has one comment, and each exported
// name of it says what it is.
func TestEveryNameIsExplained(t *testing.T) {
	packages := 0
	err := filepath.WalkDir("..", func(dir string, d fs.DirEntry, err error) error {
		if err != nil || !d.IsDir() {
			return err
		}
		if name := d.Name(); name == "testdata" || len(name) > 2 && name[0] == '.' {
			return fs.SkipDir
		}
		fset, files := parsed(t, dir)
		if len(files) == 0 {
			return nil
		}
		packages++
		for _, fault := range unexplained(t, fset, files) {
			t.Errorf("%s: %s", dir, fault)
		}
		return nil
	})
	if err != nil {
		t.Fatal(err)
	}
	if packages < 15 {
		t.Errorf("only %d packages were looked at", packages)
	}
}

// parsed gives the files of a package, tests apart.
func parsed(t *testing.T, dir string) (*token.FileSet, []*ast.File) {
	t.Helper()
	paths, err := filepath.Glob(filepath.Join(dir, "*.go"))
	if err != nil {
		t.Fatal(err)
	}
	fset := token.NewFileSet()
	var out []*ast.File
	for _, path := range paths {
		if strings.HasSuffix(path, "_test.go") {
			continue
		}
		f, err := parser.ParseFile(fset, path, nil, parser.ParseComments)
		if err != nil {
			t.Fatal(err)
		}
		out = append(out, f)
	}
	return fset, out
}

// unexplained lists what lacks a comment.
func unexplained(t *testing.T, fset *token.FileSet, files []*ast.File) (out []string) {
	t.Helper()
	comments := 0
	for _, f := range files {
		if f.Doc != nil {
			comments++
		}
	}
	if comments != 1 {
		out = append(out, "wants one package comment")
	}
	pkg, err := doc.NewFromFiles(fset, files, "offplumb/x")
	if err != nil {
		t.Fatal(err)
	}
	values, funcs := slices.Concat(pkg.Consts, pkg.Vars), pkg.Funcs
	for _, typ := range pkg.Types {
		if typ.Doc == "" {
			out = append(out, typ.Name)
		}
		values = slices.Concat(values, typ.Consts, typ.Vars)
		funcs = slices.Concat(funcs, typ.Funcs, typ.Methods)
	}
	for _, f := range funcs {
		if f.Doc == "" {
			out = append(out, strings.TrimPrefix(f.Recv+"."+f.Name, "."))
		}
	}
	for _, v := range values {
		out = append(out, bare(v)...)
	}
	return out
}

// bare lists the exported names of a declaration that have a comment neither
// of their own nor over the group.
func bare(v *doc.Value) (out []string) {
	if v.Doc != "" {
		return nil
	}
	for _, spec := range v.Decl.Specs {
		s := spec.(*ast.ValueSpec)
		for _, name := range s.Names {
			if name.IsExported() && s.Doc == nil && s.Comment == nil {
				out = append(out, name.Name)
			}
		}
	}
	return out
}

// TestUnexplainedNames: the search finds a name of each sort.
func TestUnexplainedNames(t *testing.T) {
	const src = `package x

type T struct{}
func (T) M() {}
func F() T { return T{} }
const C = 1
var (
	V = 1
	W = 2 // explained
	v = 3
)
// G is explained.
func G() {}
`
	fset := token.NewFileSet()
	f, err := parser.ParseFile(fset, "x.go", src, parser.ParseComments)
	if err != nil {
		t.Fatal(err)
	}
	got := unexplained(t, fset, []*ast.File{f})
	slices.Sort(got)
	if want := []string{"C", "F", "T", "T.M", "V", "wants one package comment"}; !slices.Equal(got, want) {
		t.Errorf("found %q, want %q", got, want)
	}
}
