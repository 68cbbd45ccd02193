package main

// hands returns +1 for right and −1 for left for every gear: its own word; else
// the opposite of a mate whose hand is known; else the shared word, or right,
// for the first gear that nothing decides, which is said to be assumed.
func (j *job) hands() (hands []float64, assumed []bool, err error) {
	hands = make([]float64, len(j.request.gears))
	assumed = make([]bool, len(j.request.gears))
	for i, g := range j.request.gears {
		word, ok, err := settings{vals: g.own}.word("hand", "right", "left")
		if err != nil {
			return nil, nil, err
		}
		if ok {
			hands[i] = handSign(word)
		}
	}
	for {
		j.spreadHands(hands)
		free := -1
		for i, h := range hands {
			if h == 0 {
				free = i
				break
			}
		}
		if free < 0 {
			return hands, assumed, nil
		}
		word, ok, err := j.request.gears[free].word("hand", "right", "left")
		if err != nil {
			return nil, nil, err
		}
		hands[free], assumed[free] = handSign(word), !ok
	}
}

func handSign(word string) float64 {
	if word == "left" {
		return -1
	}
	return 1
}

// spreadHands gives every gear that meshes with a known one the opposite hand.
func (j *job) spreadHands(hands []float64) {
	for changed := true; changed; {
		changed = false
		for _, m := range j.request.meshes {
			a, b, err := j.meshGears(m)
			if err != nil {
				continue // said when the mesh is read
			}
			switch {
			case hands[a] == 0 && hands[b] != 0:
				hands[a], changed = -hands[b], true
			case hands[b] == 0 && hands[a] != 0:
				hands[b], changed = -hands[a], true
			}
		}
	}
}
