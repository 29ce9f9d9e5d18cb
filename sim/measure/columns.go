package measure

import "offplumb/sim/frame"

// landingColumns are those of landings.csv.
var landingColumns = []column[Landing]{
	{key: "release", meaning: "name of the release", text: func(l *Landing) string { return l.Release }},
	{key: "body", meaning: "name of the body", text: func(l *Landing) string { return l.Body }},
	{key: "outcome", meaning: "landed: it touched a surface; time: its duration ended; lost: its centre passed the hull's outer face",
		text: func(l *Landing) string { return l.Outcome.String() }},
	{key: "surface", meaning: "surface first touched after leaving whatever it touched at release", text: func(l *Landing) string { return l.Surface }},
	{key: "time", unit: second, meaning: "time of the landing, from the release", num: func(l *Landing) float64 { return l.Time }},
	{key: "offset", unit: metre, meaning: "deck offset: arc on the deck beneath the release, from plumb under the release to plumb under the landing, spinward positive",
		num: func(l *Landing) float64 { return l.Offset }},
	{key: "deflection", unit: metre, meaning: "apparent deflection: deck offset less that of the uniform-gravity path, spinward positive",
		num: func(l *Landing) float64 { return l.Deflection }},
	{key: "offset_axial", unit: metre, meaning: "axial distance from release to landing", num: func(l *Landing) float64 { return l.OffsetAxial }},
	{key: "deflection_axial", unit: metre, meaning: "axial distance less that of the uniform-gravity path", num: func(l *Landing) float64 { return l.DeflAxial }},
	{key: "deck", meaning: "deck beneath the landing", text: func(l *Landing) string { return l.Deck }},
	{key: "spinward", unit: metre, meaning: "place of the centre: arc on that deck", num: func(l *Landing) float64 { return l.Arc }},
	{key: "axial", unit: metre, meaning: "place of the centre: axial", num: func(l *Landing) float64 { return l.Place.Z }},
	{key: "height", unit: metre, meaning: "place of the centre: height above that deck", num: func(l *Landing) float64 { return l.Place.Height }},
	{key: "spinward", unit: degree, meaning: "place of the centre: angle from spinward zero", num: func(l *Landing) float64 { return l.angle() }},
	{key: "speed", unit: speedUnit, meaning: "speed of the centre relative to the surface", num: func(l *Landing) float64 { return l.Speed }},
	{key: "normal_speed", unit: speedUnit, meaning: "part of the speed along the surface's normal", num: func(l *Landing) float64 { return l.NormalSpeed }},
	{key: "incidence", unit: degree, meaning: "angle between velocity and normal, 0 head-on", num: func(l *Landing) float64 { return l.Incidence }},
	{key: "energy", unit: joule, meaning: "impact energy: half mass times speed squared, without spin", num: func(l *Landing) float64 { return l.Energy }},
	{key: "normal_energy", unit: joule, meaning: "half mass times normal speed squared", num: func(l *Landing) float64 { return l.NormalEnergy }},
	{key: "falls_through", meaning: "openings fallen through in the whole motion, separated by semicolons", text: func(l *Landing) string { return l.through() }},
	{key: "uniform_time", unit: second, meaning: "duration of the uniform-gravity path", num: func(l *Landing) float64 { return l.uniform(l.Uniform.Time) }},
	{key: "uniform_offset", unit: metre, meaning: "deck offset of the uniform-gravity path", num: func(l *Landing) float64 { return l.uniform(l.Uniform.Offset) }},
	{key: "uniform_speed", unit: speedUnit, meaning: "speed at the end of the uniform-gravity path", num: func(l *Landing) float64 { return l.uniform(l.Uniform.Speed) }},
	{key: errorKey, unit: metre, meaning: "numerical error of the place and of the offsets: a bound, by a second computation; empty where the two touch different things, and without a landing", num: func(l *Landing) float64 { return l.Error.Place }},
	{key: errorKey, unit: second, meaning: "numerical error of the time", num: func(l *Landing) float64 { return l.Error.Time }},
	{key: errorKey, unit: speedUnit, meaning: "numerical error of speed and normal speed", num: func(l *Landing) float64 { return l.Error.Speed }},
}

// restColumns are those of rests.csv.
var restColumns = []column[Rest]{
	{key: "release", meaning: "name of the release", text: func(r *Rest) string { return r.Release }},
	{key: "outcome", meaning: "rested; landed: it was to stop there; time: its duration ended; lost: its centre passed the hull's outer face; stuck: it is wedged, or its motion has no end that the model can resolve",
		text: func(r *Rest) string { return r.Outcome.String() }},
	{key: "surface", meaning: "what it is on at the end", text: func(r *Rest) string { return r.Surface }},
	{key: "time", unit: second, meaning: "time of the end, from the release", num: func(r *Rest) float64 { return r.Time }},
	{key: "deck", meaning: "deck beneath it", text: func(r *Rest) string { return r.Deck }},
	{key: "spinward", unit: metre, meaning: "place of the centre: arc on that deck", num: func(r *Rest) float64 { return r.Arc }},
	{key: "axial", unit: metre, meaning: "place of the centre: axial", num: func(r *Rest) float64 { return r.Place.Z }},
	{key: "height", unit: metre, meaning: "place of the centre: height above that deck", num: func(r *Rest) float64 { return r.Place.Height }},
	{key: "spinward", unit: degree, meaning: "place of the centre: angle from spinward zero", num: func(r *Rest) float64 { return frame.WrapAngle(r.Place.Phi) }},
	{key: "impacts", meaning: "number of impacts", num: func(r *Rest) float64 { return float64(r.Impacts) }},
	{key: "path", unit: metre, meaning: "way of the centre relative to the habitat", num: func(r *Rest) float64 { return r.Path }},
	{key: "slid", unit: metre, meaning: "part of the way that it slid or rolled", num: func(r *Rest) float64 { return r.Slid }},
	{key: "speed", unit: speedUnit, meaning: "speed at the end, relative to the habitat", num: func(r *Rest) float64 { return r.Speed }},
	{key: "story", meaning: "the track in words", text: func(r *Rest) string { return r.Story }},
}

// eventColumns are those of impacts/NAME.csv.
var eventColumns = []column[Event]{
	{key: "time", unit: second, meaning: "time from the release", num: func(e *Event) float64 { return e.Time }},
	{key: "event", meaning: "impact; leaves: it passes the outer end of a passage outward", text: func(e *Event) string { return e.Kind }},
	{key: "surface", meaning: "surface touched, or passage left", text: func(e *Event) string { return e.Surface }},
	{key: "deck", meaning: "deck beneath", text: func(e *Event) string { return e.Deck }},
	{key: "spinward", unit: metre, meaning: "place of the centre: arc on that deck", num: func(e *Event) float64 { return e.Arc }},
	{key: "axial", unit: metre, meaning: "place of the centre: axial", num: func(e *Event) float64 { return e.Place.Z }},
	{key: "height", unit: metre, meaning: "place of the centre: height above that deck", num: func(e *Event) float64 { return e.Place.Height }},
	{key: "speed", unit: speedUnit, meaning: "speed of the centre relative to the surface", num: func(e *Event) float64 { return e.Speed }},
	{key: "normal_speed", unit: speedUnit, meaning: "part of the speed along the surface's normal", num: func(e *Event) float64 { return e.NormalSpeed }},
	{key: "incidence", unit: degree, meaning: "angle between velocity and normal, 0 head-on", num: func(e *Event) float64 { return e.Incidence }},
	{key: "energy", unit: joule, meaning: "half mass times speed squared, without spin", num: func(e *Event) float64 { return e.Energy }},
	{key: "normal_energy", unit: joule, meaning: "half mass times normal speed squared", num: func(e *Event) float64 { return e.Normal }},
}

// clearanceColumns are those of clearance.csv.
var clearanceColumns = []column[Clearance]{
	{key: "name", meaning: "release or crew path", text: func(c *Clearance) string { return c.Name }},
	{key: "surface", meaning: "surface approached", text: func(c *Clearance) string { return c.Surface }},
	{key: "clearance", unit: metre, meaning: "least gap between the body and the surface; 0 where it was touched, negative where a person's outline reaches into it",
		num: func(c *Clearance) float64 { return c.Gap }},
	{key: "time", unit: second, meaning: "time of the closest approach, from the release or the start of the path", num: func(c *Clearance) float64 { return c.Time }},
}

// sampleColumns are those of tracks/NAME.csv.
var sampleColumns = []column[Sample]{
	{key: "time", unit: second, meaning: "time from the release", num: func(s *Sample) float64 { return s.Time }},
	{key: "phase", meaning: "what the body does: flight, slide, roll or rest", text: func(s *Sample) string { return s.Phase }},
	{key: "spinward", unit: metre, meaning: "arc on the deck beneath the start, not wrapped; on a flat floor the straight length from its middle", num: func(s *Sample) float64 { return s.Arc }},
	{key: "axial", unit: metre, meaning: "axial place of the centre; on a flat floor from its middle", num: func(s *Sample) float64 { return s.Axial }},
	{key: "height", unit: metre, meaning: "height of the centre above the deck beneath the start", num: func(s *Sample) float64 { return s.Height }},
	{key: "offset", unit: metre, meaning: "arc gone round since the release on the deck beneath it, spinward positive", num: func(s *Sample) float64 { return s.Offset }},
	{key: "v_spinward", unit: speedUnit, meaning: "velocity relative to the habitat, spinward", num: func(s *Sample) float64 { return s.VSpinward }},
	{key: "v_axial", unit: speedUnit, meaning: "velocity relative to the habitat, axial", num: func(s *Sample) float64 { return s.VAxial }},
	{key: "v_up", unit: speedUnit, meaning: "velocity relative to the habitat, toward the axis", num: func(s *Sample) float64 { return s.VUp }},
	{key: "x", unit: metre, meaning: "habitat frame: outward through spinward zero", num: func(s *Sample) float64 { return s.Local.Pos.X }},
	{key: "y", unit: metre, meaning: "habitat frame: spinward at spinward zero", num: func(s *Sample) float64 { return s.Local.Pos.Y }},
	{key: "z", unit: metre, meaning: "habitat frame: axial", num: func(s *Sample) float64 { return s.Local.Pos.Z }},
	{key: "inertial_x", unit: metre, meaning: "inertial frame, which coincides with the habitat frame at time 0 of the scenario", num: func(s *Sample) float64 { return s.Inertial.Pos.X }},
	{key: "inertial_y", unit: metre, meaning: "inertial frame", num: func(s *Sample) float64 { return s.Inertial.Pos.Y }},
	{key: "inertial_z", unit: metre, meaning: "inertial frame", num: func(s *Sample) float64 { return s.Inertial.Pos.Z }},
	{key: "inertial_vx", unit: speedUnit, meaning: "inertial velocity", num: func(s *Sample) float64 { return s.Inertial.Vel.X }},
	{key: "inertial_vy", unit: speedUnit, meaning: "inertial velocity", num: func(s *Sample) float64 { return s.Inertial.Vel.Y }},
	{key: "inertial_vz", unit: speedUnit, meaning: "inertial velocity", num: func(s *Sample) float64 { return s.Inertial.Vel.Z }},
	{key: "a_centrifugal", unit: accelUnit, meaning: "magnitude of the centrifugal acceleration", num: func(s *Sample) float64 { return s.Centrifugal }},
	{key: "a_coriolis", unit: accelUnit, meaning: "magnitude of the Coriolis acceleration", num: func(s *Sample) float64 { return s.Coriolis }},
	{key: "a_euler", unit: accelUnit, meaning: "magnitude of the Euler acceleration", num: func(s *Sample) float64 { return s.Euler }},
	{key: "a_drag", unit: accelUnit, meaning: "magnitude of the acceleration by drag", num: func(s *Sample) float64 { return s.Drag }},
}

// crewColumns are those of crew/NAME.csv.
var crewColumns = []column[Load]{
	{key: "time", unit: second, meaning: "time from the start of the path", num: func(l *Load) float64 { return l.Time }},
	{key: "leg", meaning: "number and kind of the leg", text: func(l *Load) string { return l.Leg }},
	{key: "along", unit: metre, meaning: "way of the feet along the path", num: func(l *Load) float64 { return l.Feet.Along }},
	{key: "spinward", unit: metre, meaning: "arc of the feet on the deck beneath the start, not wrapped", num: func(l *Load) float64 { return l.Arc }},
	{key: "axial", unit: metre, meaning: "axial place of the feet", num: func(l *Load) float64 { return l.Axial }},
	{key: "height", unit: metre, meaning: "height of the feet above the deck beneath the start", num: func(l *Load) float64 { return l.Height }},
	{key: "gravity_feet", unit: gravity, meaning: "apparent gravity at the feet, magnitude", num: func(l *Load) float64 { return l.GravityFeet }},
	{key: "gravity_waist", unit: gravity, meaning: "apparent gravity at the waist, magnitude", num: func(l *Load) float64 { return l.GravityWaist }},
	{key: "gravity_head", unit: gravity, meaning: "apparent gravity at the head, magnitude", num: func(l *Load) float64 { return l.GravityHead }},
	{key: "tilt_spinward", unit: degree, meaning: "angle from the deck's normal at which a plumb bob at the waist hangs spinward", num: func(l *Load) float64 { return l.TiltSpinward }},
	{key: "tilt_axial", unit: degree, meaning: "angle from the deck's normal at which a plumb bob at the waist hangs toward +axial", num: func(l *Load) float64 { return l.TiltAxial }},
	{key: "weight", unit: newton, meaning: "force of the person, with what is carried, on the structure along the deck's normal, at the waist", num: func(l *Load) float64 { return l.Weight }},
	{key: "side_spinward", unit: newton, meaning: "sideways force of the person on the structure, spinward positive", num: func(l *Load) float64 { return l.SideSpinward }},
	{key: "side_axial", unit: newton, meaning: "sideways force of the person on the structure, +axial positive", num: func(l *Load) float64 { return l.SideAxial }},
	{key: "friction_demand", meaning: "sideways force by weight; empty where there is no weight", num: func(l *Load) float64 { return l.FrictionDemand }},
	{key: "head_cross", unit: radPerSec2, meaning: "cross-coupled angular acceleration at the head: |spin x rate of the head|", num: func(l *Load) float64 { return l.HeadCross }},
	{key: "gravity_difference", unit: gravity, meaning: "apparent gravity at the feet less that at the head", num: func(l *Load) float64 { return l.GravityDifference }},
	{key: "a_coriolis", unit: accelUnit, meaning: "magnitude of the Coriolis acceleration at the waist", num: func(l *Load) float64 { return l.Coriolis }},
	{key: "a_euler", unit: accelUnit, meaning: "magnitude of the Euler acceleration at the waist", num: func(l *Load) float64 { return l.Euler }},
	{key: "tilt_rate_spinward", unit: degreeRate, meaning: "rate at which the tilt spinward changes", num: func(l *Load) float64 { return l.TiltRateSpinward }},
	{key: "tilt_rate_axial", unit: degreeRate, meaning: "rate at which the axial tilt changes", num: func(l *Load) float64 { return l.TiltRateAxial }},
	{key: "along_ladder", unit: newton, partly: true, meaning: "force on the ladder along it, toward its foot; empty off ladders", num: func(l *Load) float64 { return l.AlongLadder }},
	{key: "pull", unit: newton, partly: true, meaning: "force that pulls the person away from the ladder in front; negative: into it; empty off ladders", num: func(l *Load) float64 { return l.Pull }},
	{key: "gravity_carried", unit: gravity, meaning: "apparent gravity at what is carried; empty without", num: func(l *Load) float64 { return l.GravityCarried }},
	{key: "carried", unit: newton, meaning: "force of what is carried on the person; empty without", num: func(l *Load) float64 { return l.ForceCarried }},
	{key: "power", unit: watt, meaning: "power of the support's force on the person and the load: that of climbing", num: func(l *Load) float64 { return l.Power }},
	{key: "work", unit: joule, meaning: "its work since the start of the path", num: func(l *Load) float64 { return l.Work }},
	{key: "cross_spinward", unit: radPerSec2, meaning: "spinward part of the cross-coupled angular acceleration at the head", num: func(l *Load) float64 { return l.CrossSpinward }},
	{key: "cross_axial", unit: radPerSec2, meaning: "axial part of it", num: func(l *Load) float64 { return l.CrossAxial }},
	{key: "cross_up", unit: radPerSec2, meaning: "upward part of it", num: func(l *Load) float64 { return l.CrossUp }},
}

// deckColumns are those of decks.csv.
var deckColumns = []column[DeckFigure]{
	{key: "deck", meaning: "name of the deck", text: func(d *DeckFigure) string { return d.Deck }},
	{key: "radius", unit: metre, meaning: "distance of its surface from the axis", num: func(d *DeckFigure) float64 { return d.Radius }},
	{key: "gravity", unit: gravity, meaning: "apparent gravity at rest on it", num: func(d *DeckFigure) float64 { return d.Gravity }},
	{key: "speed", unit: speedUnit, meaning: "speed of its surface, spinward positive", num: func(d *DeckFigure) float64 { return d.Speed }},
	{key: "coriolis_per_speed", unit: perSecond, meaning: "Coriolis acceleration for each m/s across the axis: twice the spin rate", num: func(d *DeckFigure) float64 { return d.Coriolis }},
	{key: "drop_1m_offset", unit: metre, meaning: "deck offset of a point dropped from 1 m above it in vacuum, spinward positive; empty where the axis is nearer", num: func(d *DeckFigure) float64 { return d.Drop }},
	{key: "walk_run", unit: speedUnit, meaning: "speed at which a person of 1.75 m changes from walking to running at rest gravity: Froude number 0.5", num: func(d *DeckFigure) float64 { return WalkRunSpeed(d.Gravity) }},
	{key: "last_gravity", unit: gravity, later: true, meaning: "apparent gravity at rest on it after the last change of the spin", num: func(d *DeckFigure) float64 { return d.LastGravity }},
	{key: "last_speed", unit: speedUnit, later: true, meaning: "speed of its surface after the last change, spinward positive", num: func(d *DeckFigure) float64 { return d.LastSpeed }},
	{key: "last_coriolis_per_speed", unit: perSecond, later: true, meaning: "Coriolis acceleration for each m/s across the axis, after the last change", num: func(d *DeckFigure) float64 { return d.LastCoriolis }},
	{key: "last_drop_1m_offset", unit: metre, later: true, meaning: "deck offset of a point dropped from 1 m above it in vacuum, after the last change; empty without spin", num: func(d *DeckFigure) float64 { return d.LastDrop }},
}

// verdictColumns are those of limits.csv.
var verdictColumns = []column[Verdict]{
	{key: "limit", meaning: "name of the limit", text: func(v *Verdict) string { return v.Limit }},
	{key: "of", meaning: "what it judges; of several the worst", text: func(v *Verdict) string { return v.Of }},
	{key: "measure", meaning: "table and column that it judges", text: func(v *Verdict) string { return v.Measure }},
	{key: "value", meaning: "the value judged, in the unit of the row; of a series the worst", num: func(v *Verdict) float64 { return v.Value }},
	{key: "min", meaning: "least value allowed", num: func(v *Verdict) float64 { return v.Min }},
	{key: "max", meaning: "greatest value allowed", num: func(v *Verdict) float64 { return v.Max }},
	{key: "unit", meaning: "unit of value, min and max", text: func(v *Verdict) string { return v.Unit }},
	{key: "verdict", meaning: "held, near (beyond the warning level) or broken", text: func(v *Verdict) string { return v.Verdict }},
	{key: "at", unit: second, meaning: "time of the value judged, from the release or the start of the path", num: func(v *Verdict) float64 { return v.At }},
	{key: "source", meaning: "where the limit comes from, in the project's words", text: func(v *Verdict) string { return v.Source }},
	{key: "found", meaning: "what was found, in words, where it is no number", text: func(v *Verdict) string { return v.Found }},
	{key: "note", meaning: "what makes the verdict doubtful: the numerical error of a landing", text: func(v *Verdict) string { return v.Note() }},
}
