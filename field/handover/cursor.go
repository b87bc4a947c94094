package handover

import (
	"bytes"
	"encoding/json"
	"errors"
	"fmt"
	"io"
	"slices"
	"strconv"
	"strings"
)

// cursor reads a JSON document from front to back into places that the caller names, and knows where it is.
type cursor struct {
	data []byte
	d    *json.Decoder
	path []string
}

func newCursor(data []byte) *cursor {
	d := json.NewDecoder(bytes.NewReader(data))
	d.UseNumber()
	return &cursor{data: data, d: d}
}

// fail returns an error at the place of the cursor.
func (c *cursor) fail(format string, a ...any) error {
	line := 1 + bytes.Count(c.data[:min(int(c.d.InputOffset()), len(c.data))], []byte{'\n'})
	where := strings.Join(c.path, ".")
	if where == "" {
		where = "document"
	}
	return fmt.Errorf("handover: line %d, %s: %s", line, where, fmt.Sprintf(format, a...))
}

// token returns the next token.
func (c *cursor) token() (json.Token, error) {
	t, err := c.d.Token()
	switch {
	case err == nil:
		return t, nil
	case errors.Is(err, io.EOF), errors.Is(err, io.ErrUnexpectedEOF):
		return nil, c.fail("the file ends here; it is cut off")
	}
	return nil, c.fail("no JSON: %v; NaN and infinity are no numbers of a file", err)
}

// open reads an opening bracket.
func (c *cursor) open(bracket json.Delim, what string) error {
	t, err := c.token()
	if err != nil {
		return err
	}
	if t != bracket {
		return c.fail("%s stands here; want %s", shown(t), what)
	}
	return nil
}

// object reads an object with the given keys, each at most once and all but the optional ones.
func (c *cursor) object(keys map[string]func() error, optional ...string) error {
	if err := c.open('{', "an object"); err != nil {
		return err
	}
	seen := map[string]bool{}
	for c.d.More() {
		t, err := c.token()
		if err != nil {
			return err
		}
		key, _ := t.(string)
		read, ok := keys[key]
		switch {
		case !ok:
			return c.fail("key %q is not known; want %s", key, strings.Join(sortedKeys(keys), ", "))
		case seen[key]:
			return c.fail("key %q stands twice; keep one", key)
		}
		seen[key] = true
		if err := c.within(key, read); err != nil {
			return err
		}
	}
	if _, err := c.token(); err != nil {
		return err
	}
	for _, key := range sortedKeys(keys) {
		if !seen[key] && !slices.Contains(optional, key) {
			return c.fail("key %q is missing", key)
		}
	}
	return nil
}

func sortedKeys(m map[string]func() error) []string {
	var keys []string
	for k := range m {
		keys = append(keys, k)
	}
	slices.Sort(keys)
	return keys
}

// within reads something that stands under a name.
func (c *cursor) within(name string, read func() error) error {
	c.path = append(c.path, name)
	err := read()
	c.path = c.path[:len(c.path)-1]
	return err
}

// array reads an array of at most so many elements.
func (c *cursor) array(most int, one func() error) (count int, err error) {
	if err := c.open('[', "an array"); err != nil {
		return 0, err
	}
	for ; c.d.More(); count++ {
		if count == most {
			return count, c.fail("more than %d elements", most)
		}
		if err := c.within(strconv.Itoa(count), one); err != nil {
			return count, err
		}
	}
	_, err = c.token()
	return count, err
}

// number reads a finite number.
func (c *cursor) number(dst *float64) error {
	t, err := c.token()
	if err != nil {
		return err
	}
	n, ok := t.(json.Number)
	if !ok {
		return c.fail("%s stands here; want a number", shown(t))
	}
	if *dst, err = strconv.ParseFloat(n.String(), 64); err != nil {
		return c.fail("%s is out of the range of numbers", n)
	}
	return nil
}

// numbers reads an array of as many numbers as dst has.
func (c *cursor) numbers(dst []float64) error {
	k := 0
	n, err := c.array(len(dst), func() error {
		k++
		return c.number(&dst[k-1])
	})
	if err == nil && n < len(dst) {
		return c.fail("%d numbers; want %d", n, len(dst))
	}
	return err
}

// text reads a text.
func (c *cursor) text(dst *string) error {
	t, err := c.token()
	if err != nil {
		return err
	}
	s, ok := t.(string)
	if !ok {
		return c.fail("%s stands here; want a text", shown(t))
	}
	*dst = s
	return nil
}

// end demands that nothing follows.
func (c *cursor) end() error {
	if _, err := c.d.Token(); err != io.EOF {
		return c.fail("text after the end of the document; want one JSON object")
	}
	return nil
}

// shown returns a token as a file has it, but texts without their quotes.
func shown(t json.Token) string {
	if t == nil {
		return "null"
	}
	return fmt.Sprint(t)
}
