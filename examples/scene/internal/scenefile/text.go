package scenefile

import (
	"bytes"
	"strconv"
	"unicode/utf16"
	"unicode/utf8"
)

// quotedText reads a text in double quotes and checks its UTF-8 and escapes.
func (p *parser) quotedText() error {
	start, src := p.pos, p.src
	for i := start + 1; i < len(src); {
		switch c := src[i]; {
		case c == '"':
			p.leaf(i + 1)
			return nil
		case c == '\\':
			n, problem := escape(src[i:])
			if problem != "" {
				p.pos = i
				return p.fail(problem, `escapes are \" \\ \/ \b \f \n \r \t and \u with four hexadecimal digits`)
			}
			i += n
		case c < 0x20:
			p.pos = i
			return p.fail("a control character or line end inside a text", `close the text with ", or write an escape such as \n`)
		case c < utf8.RuneSelf:
			i++
		default:
			r, n := utf8.DecodeRune(src[i:])
			if r == utf8.RuneError && n == 1 {
				p.pos = i
				return p.fail("wrong UTF-8 (byte 0x"+strconv.FormatUint(uint64(c), 16)+")", "save the file as UTF-8")
			}
			i += n
		}
	}
	return p.fail("a text that does not end", `close it with "`)
}

// escape returns the length of the escape sequence at the start of src, or what
// is wrong with it.
func escape(src []byte) (n int, problem string) {
	if len(src) < 2 {
		return 0, "a text that does not end"
	}
	if bytes.IndexByte([]byte(`"\/bfnrt`), src[1]) >= 0 {
		return 2, ""
	}
	if src[1] != 'u' {
		return 0, `unknown escape \` + strconv.QuoteToASCII(string(rune(src[1])))
	}
	r, ok := hex4(src[2:])
	if !ok {
		return 0, `\u without four hexadecimal digits`
	}
	if !utf16.IsSurrogate(r) {
		return 6, ""
	}
	if len(src) >= 12 && src[6] == '\\' && src[7] == 'u' {
		if low, ok := hex4(src[8:]); ok && utf16.DecodeRune(r, low) != utf8.RuneError {
			return 12, ""
		}
	}
	return 0, "half a surrogate pair (" + string(src[:6]) + ")"
}

// hex4 returns the value of the four hexadecimal digits at the start of src.
func hex4(src []byte) (rune, bool) {
	if len(src) < 4 {
		return 0, false
	}
	r := rune(0)
	for _, c := range src[:4] {
		switch {
		case '0' <= c && c <= '9':
			r = r<<4 | rune(c-'0')
		case 'a' <= c && c <= 'f':
			r = r<<4 | rune(c-'a'+10)
		case 'A' <= c && c <= 'F':
			r = r<<4 | rune(c-'A'+10)
		default:
			return 0, false
		}
	}
	return r, true
}

// unquote returns the value of the text in double quotes at the start of src,
// which was checked. Without escapes it is a part of src.
func unquote(src []byte) []byte {
	src = src[1:]
	for i, c := range src {
		if c == '"' {
			return src[:i]
		}
		if c == '\\' {
			return unescape(src, i)
		}
	}
	return nil
}

// unescape copies src up to the closing quote, its escapes resolved; the first i
// bytes have none.
func unescape(src []byte, i int) []byte {
	out := append([]byte(nil), src[:i]...)
	for src[i] != '"' {
		if src[i] != '\\' {
			out = append(out, src[i])
			i++
			continue
		}
		c := src[i+1]
		if c != 'u' {
			if k := bytes.IndexByte([]byte("bfnrt"), c); k >= 0 {
				c = "\b\f\n\r\t"[k]
			}
			out = append(out, c)
			i += 2
			continue
		}
		r, _ := hex4(src[i+2:])
		i += 6
		if utf16.IsSurrogate(r) {
			low, _ := hex4(src[i+2:])
			r = utf16.DecodeRune(r, low)
			i += 6
		}
		out = utf8.AppendRune(out, r)
	}
	return out
}
