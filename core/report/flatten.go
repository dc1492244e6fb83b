package report

import (
	"encoding"
	"fmt"
	"math"
	"reflect"
	"regexp"
	"strconv"
	"strings"

	"tailgap/core/words"
)

// flat is a record in one line: the names of its values, as JSON has them
// with those of nested records joined by an underscore, and the values.
type flat struct {
	names, cells []string
}

// flatten lays a struct out in one line. Every type of struct has the same
// names, whatever is nil in it. It is an error if a number is none (NaN or
// infinite).
func flatten(record any) (flat, error) {
	var line flat
	err := line.add("", reflect.ValueOf(record), reflect.TypeOf(record))
	return line, err
}

var textual = reflect.TypeFor[encoding.TextMarshaler]()

// add lays out a value of the given type; an invalid value is one that isn't
// there and gives empty cells. Lists of records are left out.
func (line *flat) add(name string, value reflect.Value, kind reflect.Type) error {
	switch {
	case kind.Kind() == reflect.Pointer:
		if value.IsValid() {
			value = value.Elem() // invalid for nil
		}
		return line.add(name, value, kind.Elem())
	case kind.Kind() == reflect.Struct && !kind.Implements(textual):
		return line.addFields(name, value, kind)
	case kind.Kind() == reflect.Slice && kind.Elem().Kind() == reflect.Struct && !kind.Elem().Implements(textual):
		return nil
	}
	cell := ""
	if value.IsValid() {
		var err error
		if cell, err = printed(value); err != nil {
			return fmt.Errorf("%s can't be written: %w", name, err)
		}
	}
	line.names = append(line.names, name)
	line.cells = append(line.cells, cell)
	return nil
}

func (line *flat) addFields(name string, value reflect.Value, kind reflect.Type) error {
	for i := range kind.NumField() {
		field := kind.Field(i)
		tag, _, _ := strings.Cut(field.Tag.Get("json"), ",")
		if tag == "-" {
			continue
		}
		nested := strings.Trim(name+"_"+tag, "_") // an embedded struct has no name of its own
		var inner reflect.Value
		if value.IsValid() {
			inner = value.Field(i)
		}
		if err := line.add(nested, inner, field.Type); err != nil {
			return err
		}
	}
	return nil
}

// printed is a value's cell, numbers with every digit the machine has.
func printed(value reflect.Value) (string, error) {
	if text, ok := value.Interface().(encoding.TextMarshaler); ok {
		written, err := text.MarshalText()
		return harmless(string(written)), err
	}
	switch value.Kind() {
	case reflect.Float64:
		x := value.Float()
		if math.IsNaN(x) || math.IsInf(x, 0) {
			return "", fmt.Errorf("it came out as %v", x)
		}
		return strconv.FormatFloat(x, 'g', -1, 64), nil
	case reflect.Slice:
		var all []string
		for i := range value.Len() {
			one, err := printed(value.Index(i))
			if err != nil {
				return "", err
			}
			all = append(all, one)
		}
		return harmless(strings.Join(all, " | ")), nil
	case reflect.String:
		return harmless(value.String()), nil
	}
	return fmt.Sprint(value.Interface()), nil
}

// formula finds what a spreadsheet would run: = + - @ or one of their wide
// forms at the start of a cell, or where another separator would begin one.
var formula = regexp.MustCompile(`(^|[,;|])( *[=+\-@＝＋－＠])`)

// harmless is a text in one line that no spreadsheet runs and no terminal
// obeys.
func harmless(text string) string {
	return formula.ReplaceAllString(words.Line(text), "$1'$2")
}
