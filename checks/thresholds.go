package checks

import (
	"fmt"
	"sync"

	"dregs/recipe"
	"dregs/rulesets"
)

// Thresholds are the limits and levels that a ruleset sets. What each is for
// stands beside its value in the standard ruleset.
type Thresholds struct {
	HazeGPerL      float64
	BloomGPerL     float64
	ZoneSparing    float64
	ZoneSoluble    float64
	FeedIndex      float64
	DissolveMargin float64
	AirGPerL       float64
	ImbalanceNote  float64
	ImbalanceAlarm float64
	GasLitres      float64
	Levels         map[string]recipe.Level
}

// places joins the names of the rulesets to the fields; factor turns the unit of
// the dimension into that of the field.
func (t *Thresholds) places() map[string]place {
	const gPerKg = 1000
	return map[string]place{
		"haze":              {&t.HazeGPerL, gPerKg},
		"bloom":             {&t.BloomGPerL, gPerKg},
		"zone_sparing":      {&t.ZoneSparing, 1},
		"zone_soluble":      {&t.ZoneSoluble, 1},
		"feed_index":        {&t.FeedIndex, 1},
		"dissolve_margin":   {&t.DissolveMargin, 1},
		"air_solid":         {&t.AirGPerL, gPerKg},
		"imbalance_note":    {&t.ImbalanceNote, 1},
		"imbalance_caution": {&t.ImbalanceAlarm, 1},
		"gas":               {&t.GasLitres, 1},
	}
}

type place struct {
	field  *float64
	factor float64
}

func thresholds(set *rulesets.Set) *Thresholds {
	t := &Thresholds{Levels: set.Levels}
	places := t.places()
	for name, limit := range set.Limits {
		at, ok := places[name]
		if !ok {
			panic(fmt.Sprintf("limit %s of the standard ruleset belongs to no rule", name)) // the file is part of the program
		}
		*at.field = limit.Value * at.factor
	}
	return t
}

// Standard are the limits of the standard ruleset. They are shared and not to be
// changed.
var Standard = sync.OnceValue(func() *Thresholds { return thresholds(rulesets.Standard()) })

// ReadThresholds is the standard ruleset, changed by files in their order: a later
// one goes before an earlier. With problems there are no thresholds.
func ReadThresholds(paths ...string) (*Thresholds, []recipe.Problem) {
	if len(paths) == 0 {
		return Standard(), nil
	}
	set := rulesets.Standard()
	var problems []recipe.Problem
	for _, path := range paths {
		problems = append(problems, set.Load(path, Codes())...)
	}
	if len(problems) > 0 {
		return nil, problems
	}
	return thresholds(set), nil
}

// level is that of a finding under the ruleset. What a rule made less of than its
// usual level, such as a trace of solid, is not raised again.
func (t *Thresholds) level(f *Finding) recipe.Level {
	level, ok := t.Levels[f.Code]
	if !ok {
		return f.Level
	}
	if rule, ok := Lookup(f.Code); ok && f.Level < rule.Level {
		return min(f.Level, level)
	}
	return level
}
