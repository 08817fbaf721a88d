package project

// The JSON Schema of the project file, from the tags of keys.go.

import (
	"encoding/json"
	"reflect"
	"strconv"
	"strings"
)

// schema is the part of JSON Schema (draft 2020-12) that the key table needs.
type schema struct {
	Schema           string             `json:"$schema,omitempty"`
	Title            string             `json:"title,omitempty"`
	Description      string             `json:"description,omitempty"`
	Type             any                `json:"type,omitempty"`
	Enum             []string           `json:"enum,omitempty"`
	Pattern          string             `json:"pattern,omitempty"`
	Minimum          *float64           `json:"minimum,omitempty"`
	ExclusiveMinimum *float64           `json:"exclusiveMinimum,omitempty"`
	Maximum          *float64           `json:"maximum,omitempty"`
	ExclusiveMaximum *float64           `json:"exclusiveMaximum,omitempty"`
	AnyOf            []*schema          `json:"anyOf,omitempty"`
	Items            *schema            `json:"items,omitempty"`
	MinItems         int                `json:"minItems,omitempty"`
	Properties       map[string]*schema `json:"properties,omitempty"`
	PropertyNames    *schema            `json:"propertyNames,omitempty"`
	Required         []string           `json:"required,omitempty"`
	Additional       any                `json:"additionalProperties,omitempty"`
}

// Schema returns the JSON Schema of the project file, made from the same table of keys as the
// reader's own check. It covers keys, kinds and bounds; what only shows when keys are seen
// together, such as gas fractions that add to 1, is the reader's.
func Schema() []byte {
	s := schemaOf(reflect.TypeFor[fileSpec](), "")
	s.Schema = "https://json-schema.org/draft/2020-12/schema"
	s.Title = "Panewright project file"
	out, err := json.MarshalIndent(s, "", "  ")
	if err != nil {
		panic("project: " + err.Error())
	}
	return append(out, '\n')
}

func schemaOf(t reflect.Type, tag reflect.StructTag) *schema {
	s := &schema{Description: tag.Get("doc")}
	switch t {
	case reflect.TypeFor[text]():
		s.textual(tag)
		return s
	case reflect.TypeFor[number]():
		s.Type = "number"
		s.ExclusiveMinimum, s.Minimum = bound(tag, "above"), bound(tag, "from")
		s.ExclusiveMaximum, s.Maximum = bound(tag, "below"), bound(tag, "upto")
		return s
	case reflect.TypeFor[flag]():
		s.Type = "boolean"
		return s
	case reflect.TypeFor[names]():
		one := &schema{}
		one.textual(tag)
		s.AnyOf = []*schema{one, {Type: "array", Items: one, MinItems: 1}}
		return s
	}
	switch t.Kind() {
	case reflect.Pointer:
		o := schemaOf(t.Elem(), "")
		o.Description = s.Description
		return o
	case reflect.Slice:
		s.Type, s.Items = "array", schemaOf(t.Elem(), "")
		return s
	case reflect.Map:
		s.Type = "object"
		s.Additional = schemaOf(t.Elem(), reflect.StructTag(boundsOf(tag)))
		if one := tag.Get("one"); one != "" {
			s.PropertyNames = &schema{Enum: strings.Fields(one)}
		}
		return s
	}
	s.Type, s.Additional, s.Properties = "object", false, map[string]*schema{}
	for _, k := range keysOf(t) {
		s.Properties[k.name] = schemaOf(k.field.Type, k.field.Tag)
		if k.field.Tag.Get("need") == "yes" {
			s.Required = append(s.Required, k.name)
		}
	}
	return s
}

func (s *schema) textual(tag reflect.StructTag) {
	if one := tag.Get("one"); one != "" {
		s.Type, s.Enum = "string", strings.Fields(one)
		return
	}
	s.Type = []string{"string", "number"} // an id of digits is a number to YAML
	if tag.Get("id") != "" {
		s.Pattern = idPattern
	}
}

func bound(tag reflect.StructTag, name string) *float64 {
	t, ok := tag.Lookup(name)
	if !ok {
		return nil
	}
	v, err := strconv.ParseFloat(t, 64)
	if err != nil {
		panic("project: tag " + name + ": " + err.Error())
	}
	return &v
}
