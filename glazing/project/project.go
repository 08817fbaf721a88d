// Package project reads the project file: YAML (or JSON) that lists panes, make-ups and what to
// rate them by. It is the only place that knows file names. Every key of the format stands in
// one table, from which come the check of a file, with line, column and the nearest right key,
// and the JSON Schema.
//
//	p, err := project.Load("saltmarsh.yaml", project.Access{})
//	if err != nil {
//		return err // project.Errors: every fault, with its place
//	}
//	ratings, err := p.Rate(p.Makeups[0], p.Bases[0])
package project

import (
	"maps"
	"path/filepath"
	"slices"

	"panewright/glazing"
	"panewright/spectra"
)

// A Project is what a project file says, ready to be rated.
type Project struct {
	File                        string // as the user named it
	Title                       string
	Author, Date, Client, Notes string
	Bases                       []glazing.Basis
	Panes                       []*glazing.Pane
	Makeups                     []*glazing.Makeup
	Conditions                  []glazing.Condition // of the project itself, in the order of the file
	Limits                      []glazing.Limit     // of the project file itself; see AllLimits
	LimitsFile                  *LimitsFile         // that the project names, or nil
	Cautions                    []glazing.Caution   // of the project as a whole
	Digest                      string              // SHA-256 of the project file and each file it names
	Files                       []string            // paths of the project file and of each file that it names

	sun          *spectra.Weighting
	coefficients map[string]surfacesSpec
	person       *glazing.Person          // nil where the project does not say
	stress       *glazing.StressScreening // likewise
}

// Access says which files a project may name.
type Access struct {
	Anywhere bool // also outside its own folder
}

// Load reads a project file and the files that it names. The error is Errors: all that was
// found, or that the file itself cannot be read.
func Load(path string, a Access) (*Project, error) {
	content, err := readProjectFile(path)
	if err != nil {
		return nil, Errors{&Problem{File: path, Text: err.Error()}}
	}
	from, done := folder(filepath.Dir(path), a.Anywhere)
	defer done()
	p, err := read(path, content, from)
	if err != nil {
		return nil, err
	}
	for i, name := range p.Files[1:] {
		if name = filepath.FromSlash(name); !filepath.IsAbs(name) {
			p.Files[i+1] = filepath.Join(filepath.Dir(path), name)
		}
	}
	return p, nil
}

// read reads a project from its content and a source of the files that it names.
func read(file string, content []byte, from source) (*Project, error) {
	r := newReader(aProject, file)
	var spec fileSpec
	if !r.parse(content, &spec) {
		return nil, r.faults
	}
	b := &builder{reader: r, fileSet: &fileSet{read: from, content: map[string][]byte{},
		columns: map[string]spectra.Columns{}, blocks: map[string][]spectra.Block{}, failed: map[string]error{}}, builtIn: map[string]*glazing.Pane{}}
	p := b.project(&spec)
	if len(r.faults) > 0 {
		return nil, r.faults
	}
	p.File = file
	p.Digest = b.fileSet.digest(content)
	p.Files = append([]string{file}, slices.Sorted(maps.Keys(b.fileSet.content))...)
	return p, nil
}

// Method makes a basis ready with the project's own sun, coefficients and conditions, and with who
// feels the glazing and how thermal stress is screened.
func (p *Project) Method(b glazing.Basis) *glazing.Method {
	c := p.coefficients[b.Name]
	return glazing.NewMethod(b, glazing.Options{Sun: p.sun, OutsideWM2K: c.Outside.or(0), InsideWM2K: c.Inside.or(0),
		Conditions: p.Conditions, Person: p.person, Stress: p.stress})
}

// Rate rates every state of a make-up under a basis, as Method has it, with the project's own
// cautions. Who rates many make-ups makes one Method and uses that.
func (p *Project) Rate(m *glazing.Makeup, b glazing.Basis) ([]glazing.Rating, error) {
	return p.RateBy(p.Method(b), m)
}

// RateBy rates every state of a make-up by a method that the project made.
func (p *Project) RateBy(method *glazing.Method, m *glazing.Makeup) ([]glazing.Rating, error) {
	ready, err := method.Ready(m)
	if err != nil {
		return nil, err
	}
	ratings, err := ready.RateAll()
	for i := range ratings {
		ratings[i].Cautions = append(ratings[i].Cautions, p.Cautions...)
	}
	return ratings, err
}

// Makeup returns the make-up of an id, or nil.
func (p *Project) Makeup(id string) *glazing.Makeup {
	for _, m := range p.Makeups {
		if m.ID == id {
			return m
		}
	}
	return nil
}
