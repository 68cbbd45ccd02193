package main

import (
	"strings"

	"flankwright/inspect"
	"flankwright/involute"
)

// The form of a tooth beside its flanks: how it is thinned, what its root is cut
// by, and how its tip ends.

// form reads thinning, root, and the keys of the tip into a specification.
func (j *job) form(g *gear, s *involute.Spec) error {
	thinning, asked, err := g.settings.word("thinning", "infeed", "flanks")
	if err != nil {
		return err
	}
	if thinning == "flanks" {
		s.Thinning = involute.FlanksOnly
	}
	if s.Mill.Diameter, err = g.settings.endMill("root"); err != nil {
		return err
	}
	if s.Mill.Diameter > 0 && asked && thinning == "infeed" {
		return bad("thinning", g.settings.vals["thinning"], "a milled root is not cut by feeding a gear cutter deeper; its flanks alone are moved: thinning = \"flanks\"")
	}
	if s.TipChamfer, _, err = g.settings.length("tip_chamfer"); err != nil {
		return err
	}
	if s.TipRound, _, err = g.settings.positive("tip_round"); err != nil {
		return err
	}
	if s.TipRound > 0 && s.TipChamfer > 0 {
		return bad("tip_round", g.settings.vals["tip_round"], "and tip_chamfer both shape the tip's corners; keep one")
	}
	s.Relief, err = g.settings.relief("relief")
	return err
}

// tip reads how the tip diameter is found.
func (j *job) tip(g *gear, s *involute.Spec) (err error) {
	if s.TipDiameter, _, err = g.settings.positive("tip_diameter"); err != nil {
		return err
	}
	word, _, err := g.settings.word("tip", "full", "shortened", "topped")
	if err != nil {
		return err
	}
	g.shortened, s.Topped = word == "shortened", word == "topped"
	if word != "" && s.TipDiameter != 0 {
		return bad("tip", g.settings.vals["tip"], "%q and tip_diameter say different things; give one of them", word)
	}
	if s.Topped && s.Mill.Diameter > 0 {
		return bad("tip", g.settings.vals["tip"], "\"topped\" is done by a gear cutter that cuts root and tip at once; an end mill leaves the blank's tip")
	}
	return nil
}

// endMill reads a root: "generated" (0), { end_mill = "2mm" } or "end mill 2mm".
func (s settings) endMill(key string) (mm float64, err error) {
	v, ok := s.vals[key]
	if !ok {
		return 0, nil
	}
	text, isText := asText(v)
	if isText && strings.EqualFold(strings.TrimSpace(text), "generated") {
		return 0, nil
	}
	if t, isTable := v.content.(*table); isTable {
		sub, err := s.inline(key, t)
		if err != nil {
			return 0, err
		}
		mm, ok, err := sub.positive("end_mill")
		if err == nil && !ok {
			err = bad(key, v, "needs the end mill's diameter: { end_mill = \"2mm\" }")
		}
		return mm, err
	}
	size, ok := cutWords(text, "end", "mill")
	if mm, err = inspect.ParseLength(size, s.bare(v)); !isText || !ok || err != nil || mm <= 0 {
		return 0, bad(key, v, "is \"generated\", or cut by an end mill of a diameter: { end_mill = \"2mm\" } in a job, \"end mill 2mm\" as a flag")
	}
	return mm, nil
}

// cutWords returns what follows some words at the start of a text.
func cutWords(text string, words ...string) (rest string, ok bool) {
	fields := strings.Fields(strings.NewReplacer("end_mill", "end mill", "end-mill", "end mill").Replace(strings.ToLower(text)))
	if len(fields) <= len(words) {
		return "", false
	}
	for i, w := range words {
		if !strings.EqualFold(fields[i], w) {
			return "", false
		}
	}
	return strings.Join(fields[len(words):], " "), true
}

// relief reads a tip relief: { amount = "0.02mm", start = "51mm", form = "linear" }
// or "0.02mm from 51mm parabolic".
func (s settings) relief(key string) (r involute.ReliefSpec, err error) {
	v, ok := s.vals[key]
	if !ok {
		return r, nil
	}
	const how = "needs the amount at the tip and the diameter where it starts: { amount = \"0.02mm\", start = \"51mm\", form = \"linear\" } in a job, \"0.02mm from 51mm linear\" as a flag"
	if t, isTable := v.content.(*table); isTable {
		sub, err := s.inline(key, t)
		if err != nil {
			return r, err
		}
		form, _, err := sub.word("form", "linear", "parabolic")
		if err != nil {
			return r, err
		}
		var hasAmount, hasStart bool
		r.Parabolic = form == "parabolic"
		if r.Amount, hasAmount, err = sub.positive("amount"); err != nil {
			return r, err
		}
		if r.Start, hasStart, err = sub.positive("start"); err == nil && !(hasAmount && hasStart) {
			err = bad(key, v, how)
		}
		return r, err
	}
	text, isText := asText(v)
	amount, rest, ok := strings.Cut(text, " from ")
	start, isParabolic := strings.CutSuffix(strings.TrimSpace(rest), "parabolic")
	start = strings.TrimSuffix(start, "linear")
	r.Parabolic = isParabolic
	var err1, err2 error
	r.Amount, err1 = inspect.ParseLength(amount, s.bare(v))
	r.Start, err2 = inspect.ParseLength(start, s.bare(v))
	if !isText || !ok || err1 != nil || err2 != nil || r.Amount <= 0 || r.Start <= 0 {
		return r, bad(key, v, how)
	}
	return r, nil
}
