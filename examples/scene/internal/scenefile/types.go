package scenefile

import (
	"fmt"
	"strconv"
	"strings"
)

// form says in words what a value of type t is.
func (t *Type) form() string {
	s := t.mainForm()
	for i := range t.Or {
		s += " or " + t.Or[i].Type.form()
	}
	return s
}

func (t *Type) mainForm() string {
	switch t.Base {
	case Text:
		return "a text"
	case Name:
		return "a text that is not empty"
	case Input, Output:
		return "a file name"
	case Choice:
		return oneOf(t.Words)
	case Flag:
		return "true or false"
	case Always:
		return "true"
	case Number, Integer:
		noun := "a number"
		if t.Base == Integer {
			noun = "a whole number"
		}
		if t.Min == nil && t.Max == nil {
			return noun
		}
		if t.Max != nil && *t.Min == *t.Max {
			return t.interval()
		}
		return noun + " " + t.interval()
	case Array:
		s := countWord(t.Len) + " " + t.Of.plural()
		if t.Nonzero {
			s += ", not all 0"
		}
		return s
	case List:
		if t.Least > 0 {
			return fmt.Sprintf("a list of at least %s %s", countWord(t.Least), t.Of.pluralFor(t.Least))
		}
		return "a list of " + t.Of.plural()
	case Numbers:
		return "a number or three numbers"
	}
	return "an object (" + t.Object + ")"
}

// plural says in words what several values of type t are.
func (t *Type) plural() string {
	switch t.Base {
	case Integer:
		return "whole numbers"
	case Number:
		return strings.Replace(strings.TrimPrefix(t.form(), "a "), "number", "numbers", 1)
	case Array:
		if t.Of.Base == Number && t.Of.Min == nil {
			return []string{2: "points [x, y]", 3: "vectors [x, y, z]"}[t.Len]
		}
	case List:
		return "lists, each " + t.form()
	case Struct:
		return "objects (" + t.Object + ")"
	}
	return "texts"
}

// pluralFor is plural, or the singular for a count of one.
func (t *Type) pluralFor(n int) string {
	s := t.plural()
	if n == 1 {
		first, rest, _ := strings.Cut(s, " ")
		s = strings.TrimSuffix(first, "s")
		if rest != "" {
			s += " " + rest
		}
	}
	return s
}

// interval says in symbols in which range a number lies.
func (t *Type) interval() string {
	show := func(v float64) string { return strconv.FormatFloat(v, 'g', -1, 64) }
	whole := func(v float64) string {
		if t.Base == Integer {
			return strconv.FormatFloat(v, 'f', -1, 64)
		}
		return show(v)
	}
	switch {
	case t.Max != nil && *t.Min == *t.Max:
		return whole(*t.Min)
	case t.Max != nil:
		return "from " + whole(*t.Min) + " to " + whole(*t.Max)
	case t.Open:
		return "> " + whole(*t.Min)
	}
	return "≥ " + whole(*t.Min)
}

// within says what to write for a number out of range.
func (t *Type) within(k *Key) string {
	positive := t.Max == nil && t.Open && *t.Min == 0
	switch {
	case positive && k.Unit == "length":
		return "give a positive length"
	case positive:
		return "give a positive number"
	}
	return "for example " + strconv.Quote(k.Name) + ": " + k.Example
}

// countWord returns a small number as a word.
func countWord(n int) string {
	return [...]string{"no", "one", "two", "three", "four"}[n]
}

// oneOf lists words in quotes.
func oneOf(words []string) string {
	q := quoteAll(words)
	if len(q) == 1 {
		return q[0]
	}
	return strings.Join(q[:len(q)-1], ", ") + " or " + q[len(q)-1]
}

// quoteAll puts every word in double quotes.
func quoteAll(words []string) []string {
	q := make([]string, len(words))
	for i, w := range words {
		q[i] = strconv.Quote(w)
	}
	return q
}

// keyNames returns the names of keys in order.
func keyNames(keys []Key) []string {
	names := make([]string, len(keys))
	for i, k := range keys {
		names[i] = k.Name
	}
	return names
}

// article returns the name of a shape behind its article.
func article(kind string) string {
	if strings.ContainsRune("aeiou", rune(kind[0])) {
		return "an " + kind
	}
	return "a " + kind
}
