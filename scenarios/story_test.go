package scenarios_test

import (
	"context"
	"testing"

	"offplumb/scenarios"
	"offplumb/sim/study"
)

// TestStoriesOfSpokeFall tries what the tracks of a shipped scenario are told
// as. The first touch of each can be had on the back of an envelope: without
// air a drop from r0 has moved across by r0 (sin x - x cos x), about r0 x^3/3,
// when the habitat has turned by x. With the room w aside it touches after
// (3 w/r0)^(1/3)/omega: 2.0 s, 1.3 s, 2.0 s.
func TestStoriesOfSpokeFall(t *testing.T) {
	e, ok := scenarios.ExampleNamed("spoke-fall")
	if !ok {
		t.Fatal("there is no spoke-fall")
	}
	sc, err := scenarios.Load("spoke-fall.toml", e.Files[0].Data, scenarios.Options{})
	if err != nil {
		t.Fatal(err)
	}
	p, problems := study.Prepare(sc.Model)
	if len(problems) > 0 {
		t.Fatal(problems)
	}
	results, err := p.Run(context.Background(), study.Options{Workers: 1})
	if err != nil {
		t.Fatal(err)
	}
	for i, want := range []string{
		"touches spoke A antispinward wall at 2.02 s with 1.37 m/s, 90.5 J; bounces there once more; slides 24.6 m on spoke A antispinward wall; " +
			"leaves spoke A at 9.08 s with 8.00 m/s, 3070 J; touches floor at 9.61 s with 10.3 m/s, 5120 J; bounces there once more; rests at 10.0 s",
		"touches spoke A antispinward wall at 1.30 s with 3.19 m/s, 488 J; bounces there once more; slides 10.6 m on spoke A antispinward wall; " +
			"leaves spoke A at 3.65 s with 7.19 m/s, 2480 J; touches floor at 4.22 s with 9.72 m/s, 4530 J; bounces there once more; rests at 4.60 s",
		"touches spoke A antispinward wall at 2.08 s with 1.70 m/s, 2.31 J; bounces there 2 times more; slides 22.2 m on spoke A antispinward wall; " +
			"leaves spoke A at 8.16 s with 8.31 m/s, 55.2 J; touches floor at 8.69 s with 10.6 m/s, 90.5 J; bounces there 3 times more; rests at 10.4 s",
	} {
		if got := results[i].Rest.Story; got != want {
			t.Errorf("%s\ngot  %s\nwant %s", results[i].Rest.Release, got, want)
		}
	}
	if len(results) != 3 {
		t.Errorf("%d releases", len(results))
	}
}
