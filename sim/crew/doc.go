// Package crew works out crew paths: where a person's feet, waist and head
// are at each time, and what the structure must do to hold the person there.
//
// A path is a chain of legs. [NewPlan] joins them; [Plan.At] gives the feet,
// [Feet.Point] any point of the body, [Plan.Loads] the loads.
package crew
