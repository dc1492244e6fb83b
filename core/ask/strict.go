package ask

import (
	"bytes"
	"encoding"
	"encoding/json"
	"errors"
	"fmt"
	"reflect"
	"strings"
)

// strictly is an error where JSON would be read in silence as what nobody
// wrote: a name that is there twice (the last one would count), or a null in
// a list or in the curve (a zero would stand for it).
func strictly(text []byte) error {
	return strictValue(json.NewDecoder(bytes.NewReader(text)), "the question", true)
}

func strictValue(decoder *json.Decoder, name string, mayBeNull bool) error {
	token, err := decoder.Token()
	switch {
	case err != nil:
		return err
	case token == nil && !mayBeNull:
		return fmt.Errorf("%s holds a null; write a value, or leave it out", name)
	case token == json.Delim('['):
		for decoder.More() {
			if err := strictValue(decoder, name, false); err != nil {
				return err
			}
		}
		_, err = decoder.Token()
	case token == json.Delim('{'):
		err = strictObject(decoder, name)
	}
	return err
}

func strictObject(decoder *json.Decoder, name string) error {
	outermost := name == "the question"
	seen := map[string]bool{}
	for decoder.More() {
		token, err := decoder.Token()
		if err != nil {
			return err
		}
		key := fmt.Sprintf("%.60q", token)
		folded := strings.ToLower(key)
		if seen[folded] {
			return fmt.Errorf("%s is there twice in %s; leave one out", key, name)
		}
		seen[folded] = true
		if err := strictValue(decoder, key, outermost); err != nil {
			return err
		}
	}
	if name == `"curve"` && !(seen[`"mean"`] && seen[`"sd"`]) {
		return errors.New("a given curve needs both mean and sd; without a curve it is fitted to the scores")
	}
	_, err := decoder.Token()
	return err
}

// jsonWord says what stands in a file, named as encoding/json names it:
// "object", "array", "string", "bool", "number" or "number 1e400".
func jsonWord(kind string) string {
	switch kind {
	case "object":
		return "an object in braces"
	case "array":
		return "a list in brackets"
	case "string":
		return "a text in quotes"
	case "bool":
		return "true or false"
	case "number":
		return "a number"
	}
	return fmt.Sprintf("the %.40s", kind)
}

var textual = reflect.TypeFor[encoding.TextUnmarshaler]()

// wanted says what a value of the type is written as.
func wanted(kind reflect.Type) string {
	if reflect.PointerTo(kind).Implements(textual) {
		return jsonWord("string")
	}
	switch kind.Kind() {
	case reflect.Slice:
		return jsonWord("array")
	case reflect.Struct:
		return jsonWord("object")
	case reflect.Bool:
		return jsonWord("bool")
	case reflect.Float64:
		return jsonWord("number")
	case reflect.Int, reflect.Uint64:
		return "a whole number from 0 up"
	}
	return jsonWord("string")
}
