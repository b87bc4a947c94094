package house

import (
	"fmt"
	"go/constant"
	"go/format"
	"go/types"
	"maps"
	"slices"
	"strconv"
	"strings"
)

// Declarations returns the exported API of a package as Go source without bodies, sorted by name, so that it can be read
// by people, compared as text and type-checked again (with IgnoreFuncBodies). Unexported fields of a struct become one
// blank field that keeps the struct comparable or not; promoted fields and methods of unexported embedded types are
// written as if they were the struct's own. Comments are left out.
//
// An API that mentions unexported types of its package cannot be type-checked again.
func Declarations(pkg *types.Package) (string, error) {
	w := &writer{pkg: pkg, imports: map[string]bool{}}
	scope := pkg.Scope()
	for _, name := range scope.Names() {
		if obj := scope.Lookup(name); obj.Exported() {
			w.object(obj)
		}
	}
	var b strings.Builder
	fmt.Fprintf(&b, "package %s\n\n", pkg.Name())
	for _, p := range slices.Sorted(maps.Keys(w.imports)) {
		fmt.Fprintf(&b, "import %q\n", p)
	}
	b.WriteString("\n" + w.text.String())
	text, err := format.Source([]byte(b.String()))
	if err != nil {
		return "", fmt.Errorf("house: declarations of %s: %w", pkg.Path(), err)
	}
	return string(text), nil
}

// writer collects declarations and the packages that they mention.
type writer struct {
	pkg     *types.Package
	imports map[string]bool
	text    strings.Builder
}

func (w *writer) printf(layout string, args ...any) { fmt.Fprintf(&w.text, layout, args...) }

// qualify is a types.Qualifier.
func (w *writer) qualify(p *types.Package) string {
	if p == w.pkg {
		return ""
	}
	w.imports[p.Path()] = true
	return p.Name()
}

func (w *writer) typ(t types.Type) string { return types.TypeString(t, w.qualify) }

// object writes the declaration of a package-level object.
func (w *writer) object(obj types.Object) {
	switch obj := obj.(type) {
	case *types.Const:
		kind := ""
		if b, ok := obj.Type().(*types.Basic); !ok || b.Info()&types.IsUntyped == 0 {
			kind = w.typ(obj.Type())
		}
		w.printf("const %s %s = %s\n", obj.Name(), kind, literal(obj))
	case *types.Var:
		w.printf("var %s %s\n", obj.Name(), w.typ(obj.Type()))
	case *types.Func:
		w.function("", obj.Name(), obj.Signature())
	case *types.TypeName:
		w.typeName(obj)
	}
}

func (w *writer) function(receiver, name string, s *types.Signature) {
	w.printf("func %s%s%s\n", receiver, name, strings.TrimPrefix(w.typ(s), "func"))
}

func (w *writer) typeName(obj *types.TypeName) {
	parameters := ""
	if g, ok := obj.Type().(interface{ TypeParams() *types.TypeParamList }); ok {
		parameters = w.parameters(g.TypeParams())
	}
	if obj.IsAlias() {
		w.printf("type %s%s = %s\n", obj.Name(), parameters, w.typ(types.Unalias(obj.Type())))
		return
	}
	named := obj.Type().(*types.Named)
	w.printf("\ntype %s%s ", obj.Name(), parameters)
	switch under := named.Underlying().(type) {
	case *types.Struct:
		w.printf("struct {\n")
		if w.fields(under) {
			blank := "struct{}"
			if !types.Comparable(under) {
				blank = "[0]func() // not comparable"
			}
			w.printf("_ %s\n", blank)
		}
		w.printf("}\n")
	case *types.Interface:
		w.printf("interface {\n%s\n}\n", w.elements(under))
	default:
		w.printf("%s\n", w.typ(under))
	}
	if !types.IsInterface(named) {
		w.methods(named)
	}
	w.printf("\n")
}

// fields writes the exported fields of a struct, and reports whether there are others.
func (w *writer) fields(s *types.Struct) (hidden bool) {
	for i := range s.NumFields() {
		f := s.Field(i)
		switch inner, ok := f.Type().Underlying().(*types.Struct); {
		case f.Exported():
			name := f.Name() + " "
			if f.Embedded() {
				name = ""
			}
			tag := ""
			if s.Tag(i) != "" {
				tag = strconv.Quote(s.Tag(i))
			}
			w.printf("%s%s %s\n", name, w.typ(f.Type()), tag)
		case f.Embedded() && ok:
			hidden = true
			w.fields(inner)
		default:
			hidden = true
		}
	}
	return hidden
}

// elements returns the methods and embedded types of an interface, one a line.
func (w *writer) elements(t *types.Interface) string {
	var lines []string
	for i := range t.NumEmbeddeds() {
		lines = append(lines, w.typ(t.EmbeddedType(i)))
	}
	for i := range t.NumExplicitMethods() {
		m := t.ExplicitMethod(i)
		lines = append(lines, m.Name()+strings.TrimPrefix(w.typ(m.Signature()), "func"))
	}
	return strings.Join(lines, "\n")
}

// methods writes the exported methods of a type, without those that an exported embedded field brings.
func (w *writer) methods(named *types.Named) {
	byValue := types.NewMethodSet(named)
	all := types.NewMethodSet(types.NewPointer(named))
	s, _ := named.Underlying().(*types.Struct)
	for i := range all.Len() {
		m := all.At(i)
		if !m.Obj().Exported() || s != nil && len(m.Index()) > 1 && s.Field(m.Index()[0]).Exported() {
			continue
		}
		receiver := "*" + named.Obj().Name()
		if byValue.Lookup(nil, m.Obj().Name()) != nil {
			receiver = named.Obj().Name()
		}
		var names []string
		for p := range named.TypeParams().TypeParams() {
			names = append(names, p.Obj().Name())
		}
		if names != nil {
			receiver += "[" + strings.Join(names, ", ") + "]"
		}
		w.function("("+receiver+") ", m.Obj().Name(), m.Obj().(*types.Func).Signature())
	}
}

// parameters returns a list of type parameters in brackets, or nothing.
func (w *writer) parameters(list *types.TypeParamList) string {
	var all []string
	for p := range list.TypeParams() {
		all = append(all, p.Obj().Name()+" "+w.typ(p.Constraint()))
	}
	if all == nil {
		return ""
	}
	return "[" + strings.Join(all, ", ") + "]"
}

// literal returns the value of a constant such that reading it again gives the same kind; floats to 17 digits.
func literal(c *types.Const) string {
	v := c.Val()
	b := c.Type().Underlying().(*types.Basic)
	switch {
	case b.Info()&types.IsFloat != 0:
		x, _ := constant.Float64Val(v)
		s := strconv.FormatFloat(x, 'g', -1, 64)
		if !strings.ContainsAny(s, ".e") {
			s += ".0"
		}
		return s
	case b.Kind() == types.UntypedRune:
		n, _ := constant.Int64Val(v)
		return strconv.QuoteRune(rune(n))
	case b.Info()&types.IsComplex != 0:
		re, _ := constant.Float64Val(constant.Real(v))
		im, _ := constant.Float64Val(constant.Imag(v))
		return fmt.Sprintf("%g + %gi", re, im)
	}
	return v.ExactString()
}
