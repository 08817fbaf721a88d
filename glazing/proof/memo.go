package proof

// What the checks of one run share, so that each thing is made once.

import (
	"panewright/glazing"
)

// A memo keeps what was made for other checks of the same run.
type memo struct {
	methods map[string]*glazing.Method // by basis
	panes   map[string]*glazing.Pane   // by name and definition
	ratings map[string]*glazing.Rating // by basis, make-up and definitions
}

// method returns a basis made ready.
func (m *memo) method(basis string) (*glazing.Method, error) {
	return kept(&m.methods, basis, func() (*glazing.Method, error) {
		b, err := glazing.BasisNamed(basis)
		if err != nil {
			return nil, err
		}
		return glazing.NewMethod(b, glazing.Options{}), nil
	})
}

// kept returns what a map has under a key, or makes it.
func kept[T any](m *map[string]T, key string, build func() (T, error)) (T, error) {
	if v, ok := (*m)[key]; ok {
		return v, nil
	}
	v, err := build()
	if err != nil {
		return v, err
	}
	if *m == nil {
		*m = map[string]T{}
	}
	(*m)[key] = v
	return v, nil
}
