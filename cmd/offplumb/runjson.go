package main

import (
	"encoding/json"
	"io"
	"math"
	"runtime"

	"offplumb/scenarios"
	"offplumb/sim/model"
)

// number is a JSON number, null where there is no value.
type number float64

// MarshalJSON implements [json.Marshaler].
func (n number) MarshalJSON() ([]byte, error) {
	if x := float64(n); math.IsNaN(x) || math.IsInf(x, 0) {
		return []byte("null"), nil
	}
	return json.Marshal(float64(n))
}

// record is run.json. Units stand in the names, as in the tables.
type record struct {
	Program  string          `json:"program"`
	Version  string          `json:"version"`
	Go       string          `json:"go"`
	Complete bool            `json:"complete"`
	Scenario scenarioRecord  `json:"scenario"`
	Options  optionRecord    `json:"options"`
	Solver   solverRecord    `json:"solver"`
	Habitat  habitatRecord   `json:"habitat"`
	Landings []landingRecord `json:"landings"`
	Lists    []listRecord    `json:"release_lists,omitempty"`
	Paths    []pathRecord    `json:"crew_paths"`
	Scatters []scatterRecord `json:"scatters,omitempty"`
	Maps     []mapRecord     `json:"landing_maps,omitempty"`
	Throws   []throwRecord   `json:"throws,omitempty"`
	Limits   []limitRecord   `json:"limits"`
	Warnings []warningRecord `json:"warnings"`
	Caution  string          `json:"caution"`
	Files    []entry         `json:"files"`
}

type scenarioRecord struct {
	File   string        `json:"file"`
	Title  string        `json:"title"`
	SHA256 string        `json:"sha256"`
	Inputs []inputRecord `json:"inputs,omitempty"`
}

type inputRecord struct {
	File   string `json:"file"`
	SHA256 string `json:"sha256"`
}

type optionRecord struct {
	Set  []string `json:"set"`
	Only []string `json:"only"`
	Seed uint64   `json:"seed"`
}

type solverRecord struct {
	Method   string `json:"method"`
	Relative number `json:"relative_tolerance"`
	Position number `json:"position_tolerance_m"`
	Velocity number `json:"velocity_tolerance_m_s"`
	MaxTime  number `json:"max_time_s"`
	Steps    int    `json:"steps"`
	Rejected int    `json:"rejected_steps"`
	Derivs   int    `json:"derivative_calls"`
}

type habitatRecord struct {
	Spin    number `json:"spin_rad_s"`
	Radius  number `json:"floor_radius_m"`
	Gravity number `json:"floor_gravity_m_s2"`
}

type landingRecord struct {
	Release    string `json:"release"`
	Outcome    string `json:"outcome"`
	Surface    string `json:"surface,omitempty"`
	Time       number `json:"time_s"`
	Offset     number `json:"offset_m"`
	Deflection number `json:"deflection_m"`
	Speed      number `json:"speed_m_s"`
	Energy     number `json:"energy_J"`
	ErrorPlace number `json:"error_m"`
	ErrorTime  number `json:"error_s"`
	ErrorSpeed number `json:"error_m_s"`
}

type pathRecord struct {
	Path      string `json:"path"`
	Crew      string `json:"crew"`
	Time      number `json:"time_s"`
	Clearance number `json:"clearance_m"`
}

type limitRecord struct {
	Limit   string `json:"limit"`
	Of      string `json:"of"`
	Measure string `json:"measure"`
	Value   number `json:"value"`
	Unit    string `json:"unit,omitempty"`
	Verdict string `json:"verdict"`
	Source  string `json:"source,omitempty"`
	Note    string `json:"note,omitempty"`
}

type scatterRecord struct {
	Study    string        `json:"study"`
	Of       string        `json:"of"`
	Sampling string        `json:"sampling"`
	Samples  int           `json:"samples"`
	Flown    int           `json:"flown"`
	Landed   int           `json:"landed"`
	Surfaces []shareRecord `json:"surfaces"`
	Openings []shareRecord `json:"openings"`
}

type shareRecord struct {
	Name  string `json:"name"`
	Count int    `json:"count"`
	Share number `json:"share"`
	Low   number `json:"low"`
	High  number `json:"high"`
}

type warningRecord struct {
	Of      string `json:"of"`
	Message string `json:"message"`
}

// runJSON writes run.json: what was run, how, what came out, and which file is
// about what.
func (j *job) runJSON(w io.Writer, complete bool) error {
	m := j.model()
	r := record{Program: programName, Version: version, Go: runtime.Version(), Complete: complete,
		Scenario: scenarioOf(j.Scenario), Options: optionRecord{Set: orEmpty(j.flags.sets), Only: orEmpty(j.flags.only), Seed: j.flags.seed},
		Solver: j.solver(m), Habitat: habitatRecord{number(m.Habitat.Spin), number(m.Habitat.FloorRadius), number(m.Gravity(m.Habitat.FloorRadius))},
		Landings: []landingRecord{}, Paths: []pathRecord{}, Limits: []limitRecord{}, Warnings: []warningRecord{},
		Caution: caution, Files: j.files}
	for i := range j.landings {
		l := &j.landings[i]
		r.Landings = append(r.Landings, landingRecord{l.Release, l.Outcome.String(), l.Surface, number(l.Time),
			number(l.Offset), number(l.Deflection), number(l.Speed), number(l.Energy),
			number(l.Error.Place), number(l.Error.Time), number(l.Error.Speed)})
	}
	for i := range j.paths {
		if p := &j.paths[i]; !p.skipped {
			r.Paths = append(r.Paths, pathRecord{p.plan.Path.Name, p.plan.Crew.Name, number(p.plan.Duration()), number(p.clearance.Gap)})
		}
	}
	r.Lists = j.listRecords()
	r.Scatters = j.scatterRecords()
	r.Maps = j.mapRecords()
	r.Throws = j.throwRecords()
	for i := range j.verdicts {
		v := &j.verdicts[i]
		r.Limits = append(r.Limits, limitRecord{v.Limit, v.Of, v.Measure, number(v.Value), v.Unit, v.Verdict, v.Source, v.Note()})
	}
	for _, n := range j.notes {
		r.Warnings = append(r.Warnings, warningRecord{n.Of, n.Msg})
	}
	enc := json.NewEncoder(w)
	enc.SetIndent("", "  ")
	enc.SetEscapeHTML(false)
	return enc.Encode(r)
}

func scenarioOf(sc *scenarios.Scenario) scenarioRecord {
	out := scenarioRecord{File: sc.Name, Title: sc.Title, SHA256: sc.Inputs[0].SHA256}
	for _, in := range sc.Inputs[1:] {
		out.Inputs = append(out.Inputs, inputRecord{in.Name, in.SHA256})
	}
	return out
}

func (j *job) solver(m *model.Model) solverRecord {
	out := solverRecord{Method: "Dormand-Prince 5(4), adaptive", Relative: number(m.Solver.RelTol), Position: number(m.Solver.PosTol),
		Velocity: number(m.Solver.VelTol), MaxTime: number(m.Solver.MaxTime)}
	for i := range j.results {
		w := &j.results[i].Work
		out.Steps, out.Rejected, out.Derivs = out.Steps+w.Steps, out.Rejected+w.Rejected, out.Derivs+w.Derivs
	}
	for i := range j.streams {
		w := &j.streams[i].tally.work
		out.Steps, out.Rejected, out.Derivs = out.Steps+w.Steps, out.Rejected+w.Rejected, out.Derivs+w.Derivs
	}
	return out
}

func orEmpty(list []string) []string {
	if list == nil {
		return []string{}
	}
	return list
}
