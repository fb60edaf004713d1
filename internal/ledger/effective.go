package ledger

// Effective returns the rulings in force, in the order given; undos are not among
// them. The rule:
//
//   - An undo takes back the ruling it names, unless the undo itself is taken back.
//     So the undo of an undo is a redo, chains go on as long as they like, and a
//     ruling undone twice stays undone until both undos are taken back.
//   - A ruling stands only while its leader, the ruling that With names, stands:
//     undoing the leader takes back all that were made with it, and the leaders of
//     leaders count. Undoing one that was led takes back that one alone. With means
//     nothing on an undo; the leader may be an undo, though, so that a ruling which
//     replaces another goes when the other comes back.
//   - A ruling may refer only to one that comes before it. References to later
//     rulings, to itself and to rulings not given mean nothing. A ruling given
//     twice, by its ID, counts once, at its first place; zero IDs name nothing and
//     are all different.
//
// The rule asks only what came before what between a ruling and those it refers
// to, so that ledgers can be merged in any order that keeps references pointing
// back. It takes O(n) time and space and does not change its argument.
func Effective(rulings []Ruling) []Ruling {
	at := make(map[ID]int, len(rulings))
	back := make([]bool, len(rulings)) // taken back, or a repetition
	for i := range rulings {
		id := rulings[i].ID
		if id.IsZero() {
			continue
		}
		if _, twice := at[id]; twice {
			back[i] = true
			continue
		}
		at[id] = i
	}
	earlier := func(id ID, i int) (int, bool) {
		j, ok := at[id]
		return j, ok && j < i
	}
	// Backwards: only a later undo takes a ruling back, so that when an undo's turn
	// comes it is settled whether it stands.
	for i := len(rulings) - 1; i >= 0; i-- {
		if rulings[i].Act != Undo || back[i] {
			continue
		}
		if j, ok := earlier(rulings[i].Undoes, i); ok {
			back[j] = true
		}
	}
	// Forwards: a leader comes first, and is settled before those it leads.
	var force []Ruling
	for i := range rulings {
		if rulings[i].Act == Undo {
			continue
		}
		if j, ok := earlier(rulings[i].With, i); ok && back[j] {
			back[i] = true
		}
		if !back[i] {
			force = append(force, rulings[i])
		}
	}
	return force
}
