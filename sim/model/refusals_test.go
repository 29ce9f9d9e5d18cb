package model_test

import (
	"slices"
	"strings"
	"testing"

	"offplumb/sim/model"
)

// TestRefusals tries what cannot be, each at its key.
func TestRefusals(t *testing.T) {
	spoke := func(from, to, z float64) []model.Passage {
		return []model.Passage{{Name: "spoke", Spinward: deg(30), Axial: z, FromRadius: from, ToRadius: to, Width: 1}}
	}
	hub := []model.Room{{Name: "hub", FloorRadius: 3, Length: 8}}
	ball := []model.Room{{Name: "hub", Shape: model.Sphere, FloorRadius: 3}}
	pod := room("pod", cabin.Room)
	pod.FloorRadius, pod.Spinward = 30, deg(30)
	hatch := []model.Deck{{Name: "floor", Openings: []model.Opening{{Name: "hatch", Size: [2]float64{1, 1}}}}}
	tubeOf := func(r float64, flat bool) model.Habitat {
		h := torus
		h.TubeRadius, h.FlatFloor = r, flat
		return h
	}
	tall := cabin
	tall.Size[2] = 18
	ceiling := func(r float64) model.Model { // a room whose ceiling is beyond its floor
		h := cylinder
		h.CeilingRadius = r
		return model.Model{Habitat: h}
	}
	post := func(from, to, out float64) model.Model {
		return model.Model{Habitat: cylinder, Fixtures: []model.Fixture{{Name: "rail", Kind: model.Post, Diameter: 0.1,
			From: model.Station{Height: from}, To: model.Station{Height: to, Axial: out}}}}
	}
	box := func(at model.Station) model.Model {
		return model.Model{Habitat: torus, Fixtures: []model.Fixture{{Name: "crate", At: at, Size: [3]float64{0.3, 0.3, 0.3}}}}
	}
	for _, c := range []struct {
		name string
		in   model.Model
		key  string
		says string
	}{
		{"ceiling", ceiling(19), "habitat.ceiling_radius", "wants less than floor_radius"},
		{"tube over the axis", model.Model{Habitat: tubeOf(9, false)}, "habitat.tube_radius", "wants less than 8.975 m"},
		{"flat tube over the axis", model.Model{Habitat: tubeOf(10, true)}, "habitat.tube_radius", "wants less than 9.97222 m"},
		{"cabin over the axis", model.Model{Habitat: tall}, "habitat.size", "wants a height less than floor_radius"},
		{"cylinder somewhere round", model.Model{Habitat: cylinder, Rooms: []model.Room{{Name: "hub", FloorRadius: 3, Spinward: deg(5)}}}, "room[0].spinward", "goes the whole way round"},
		{"hatch in a tube", model.Model{Habitat: torus, Decks: hatch}, "deck[0].opening[0]", "has no openings"},
		{"hatch in a sphere", model.Model{Habitat: sphere, Decks: hatch}, "deck[0].opening[0]", "has no openings"},
		{"deck in a cabin", model.Model{Habitat: cabin, Decks: []model.Deck{{Name: "upper", Height: 1}}}, "deck[0]", "a cabin has no further decks"},
		{"deck above a tube", model.Model{Habitat: torus, Decks: []model.Deck{{Name: "upper", Radius: 12.9}}}, "deck[0].radius", "between 13 m and 18 m"},
		{"deck wider than a tube", model.Model{Habitat: torus, Decks: []model.Deck{{Name: "upper", Radius: 17, Whole: true, HasAxial: true, Axial: [2]float64{-2.2, 2}}}}, "deck[0].axial", "ends at -2 m and 2 m"},
		{"spoke to nowhere", model.Model{Habitat: torus, Rooms: hub, Passages: spoke(3, 12.5, 0)}, "passage[0].to_radius", "reaches no room"},
		{"spoke from nowhere", model.Model{Habitat: torus, Rooms: ball, Passages: spoke(3.1, 13, 0)}, "passage[0].from_radius", "reaches no room"},
		{"spoke past the cabin", model.Model{Habitat: cylinder, Rooms: []model.Room{room("pod", cabin.Room)}, Passages: spoke(18, 30, 0)}, "passage[0].to_radius", "reaches no room"},
		{"spoke wider than the tube", model.Model{Habitat: torus, Rooms: hub, Passages: []model.Passage{{Name: "spoke", FromRadius: 3, ToRadius: 15, Diameter: 5.2}}}, "passage[0].diameter", "does not fit into the habitat"},
		{"spoke wider than the hub", model.Model{Habitat: cylinder, Rooms: ball, Passages: []model.Passage{{Name: "spoke", FromRadius: 3, ToRadius: 15, Width: 5.5}}}, "passage[0].width", `does not fit into room "hub"`},
		{"spoke at the edge of the tube", model.Model{Habitat: torus, Rooms: hub, Passages: spoke(3, 15, 2.1)}, "passage[0].width", "does not fit into the habitat"},
		{"spoke along a bulkhead", model.Model{Habitat: cylinder, Rooms: []model.Room{{Name: "pod", Shape: model.Cabin, FloorRadius: 30, Size: [3]float64{4, 4, 2}, Spinward: deg(30), Axial: 6.8}}, Passages: spoke(18, 28, 6.8)}, "passage[0].width", "does not fit into the habitat"},
		{"spoke through a side", model.Model{Habitat: cylinder, Rooms: append([]model.Room{{Name: "ring", Shape: model.Torus, FloorRadius: 9, TubeRadius: 1, Axial: 1.2}}, hub...), Passages: spoke(3, 12.8, 0)}, "passage[0]", `runs into "ring `},
		{"spoke out of the sphere", model.Model{Habitat: sphere, Rooms: hub, Passages: spoke(3, 17.995, 0)}, "passage[0].to_radius", "reaches out of the habitat on its far side, 17.9861 m"},
		{"spoke out of the tube", model.Model{Habitat: cylinder, Rooms: []model.Room{{Name: "ring", Shape: model.Torus, FloorRadius: 9, TubeRadius: 1}}, Passages: spoke(7.1, 12.8, 0)}, "passage[0].from_radius", `reaches out of room "ring" on its far side, 7.13397 m`},
		{"spoke across a spoke", model.Model{Habitat: cylinder, Rooms: hub, Passages: append(spoke(3, 12.8, 0), spoke(3, 12.8, 0.7)...)}, "passage[0]", `runs into "spoke `},
		{"arm beside its cabin's floor", model.Model{Habitat: cylinder, Rooms: []model.Room{{Name: "pod", Shape: model.Cabin, FloorRadius: 6, Size: [3]float64{1.9, 4, 2}, Spinward: deg(24)}}, Passages: spoke(6, 12.8, 0)}, "passage[0]", `runs into "pod spinward wall"`},
		{"trunk beside the floor", model.Model{Habitat: flatTorus, Rooms: []model.Room{pod}, Passages: spoke(17.5, 27.5, 1.4)}, "passage[0].axial", "through its flat floor, which is 3 m wide"},
		{"post of no length", post(1, 1, 0), "fixture[0].to", "wants a place apart"},
		{"post from below", post(-1, 1, 0), "fixture[0].from", "stands outside the habitat"},
		{"post through a bulkhead", post(1, 1, 8), "fixture[0].to", "stands outside the habitat"},
		{"post on no deck", model.Model{Habitat: cylinder, Fixtures: []model.Fixture{{Name: "rail", Kind: model.Post, Diameter: 0.1, To: model.Station{Deck: "attic"}}}}, "fixture[0].to.deck", `no deck named "attic"`},
		{"box beside the tube", box(model.Station{Axial: 2.4}), "fixture[0].at", "stands outside the habitat"},
		{"box in no room", box(model.Station{Room: "pod"}), "fixture[0].at.room", `no room named "pod"`},
		{"box below", box(model.Station{Height: -0.01}), "fixture[0].at", "stands outside the habitat"},
		{"wall through a bulkhead", model.Model{Habitat: cylinder, Fixtures: []model.Fixture{{Name: "screen", Kind: model.Wall, Height: 1, Thickness: 0.05,
			From: model.Station{Axial: 5}, To: model.Station{Axial: 8}}}}, "fixture[0].to", "stands outside the habitat"},
		{"release outside the tube", model.Model{Habitat: torus, Releases: []model.Release{{Name: "a", At: model.Station{Axial: 2.2, Height: 0.1}}}}, "release[0].at", "lies outside the rooms"},
		{"release beside the cabin", model.Model{Habitat: cabin, Releases: []model.Release{{Name: "a", At: model.Station{Spinward: arc(2.7), Height: 1}}}}, "release[0].at.spinward", "lies outside the rooms"},
		{"release above the cabin", model.Model{Habitat: cabin, Releases: []model.Release{{Name: "a", At: model.Station{Height: 2.7}}}}, "release[0].at.height", "lies outside the rooms"},
		{"release below the cabin", model.Model{Habitat: cabin, Releases: []model.Release{{Name: "a", At: model.Station{Spinward: arc(2.4), Height: -0.1}}}}, "release[0].at.height", `lies below deck "floor"`},
	} {
		m, problems := model.New(c.in)
		if m != nil {
			t.Errorf("%s is taken", c.name)
		}
		if !slices.ContainsFunc(problems, func(p model.Problem) bool { return p.Key == c.key && strings.Contains(p.Msg, c.says) }) {
			t.Errorf("%s: %+v, want %q at %s", c.name, problems, c.says, c.key)
		}
	}
}
