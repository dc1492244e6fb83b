package main

// hand is a running worker as the crew sees it.
type hand interface {
	// post sends a request, and with it what the page only passes on.
	post(r request, with ...parcel)
	// stop ends the worker at once, whatever it is doing.
	stop()
}

// crew are the workers of the page, which work as one: the lead does what the
// desk asks, and where it finds that there is much to do, others help it. What
// they make goes into one answer, which is the same for any number of them.
// Its methods are called on the page's one thread.
type crew struct {
	start   func(receive func(reply, []parcel)) hand
	most    int         // workers, the lead among them
	receive func(reply) // what the lead says to the desk

	lead    *mate
	helpers []*mate
	round   *round
	rounds  int
}

// mate is a worker of the crew and its part in the round.
type mate struct {
	hand
	in   bool // has a maker, and can be given blocks
	due  int  // portions that it was given and hasn't made
	made bool // some blocks of this round
	next int  // blocks that make a good portion for it
}

// round is the sharing of one score's replicates.
type round struct {
	share       // From is the first block that nobody was given
	id      int // tells what is said in it from what was said before
	made    int // blocks, by all together
	wanting int // parts of helpers that are still to come
	parts   []parcel
}

// ahead is how many portions each worker is given before it has made the first
// of them, so that none waits while the page is busy.
const ahead = 2

// newCrew is a crew of one; the others begin when they are needed.
func newCrew(start func(receive func(reply, []parcel)) hand, most int, receive func(reply)) *crew {
	c := &crew{start: start, most: max(1, most), receive: receive}
	c.lead = c.mate(c.heard)
	return c
}

func (c *crew) mate(heard func(*mate, reply, []parcel)) *mate {
	m := &mate{}
	m.hand = c.start(func(r reply, with []parcel) { heard(m, r, with) })
	return m
}

// post asks the lead.
func (c *crew) post(r request, with *file) {
	c.round = nil
	r.Helpers = c.most - 1
	if with == nil {
		c.lead.post(r)
	} else {
		c.lead.post(r, with.blob)
	}
}

// stop ends all workers.
func (c *crew) stop() {
	c.lead.stop()
	for _, m := range c.helpers {
		m.stop()
	}
}

// heard takes in what the lead says.
func (c *crew) heard(m *mate, r reply, with []parcel) {
	switch r.Kind {
	case sayShare:
		s, err := decoded[share](r)
		if err != nil || len(with) != 1 {
			c.receive(reply{Kind: sayBroken, Error: "it had work to share and didn't say what"})
			return
		}
		c.share(s, with[0])
	case askBlocks:
		c.delivered(m, r)
	default:
		if r.Kind != sayProgress {
			c.round = nil // done, or failed
		}
		c.receive(r)
	}
}

// share begins a round, with as many helpers as there can be.
func (c *crew) share(s share, order parcel) {
	c.rounds++
	c.round = &round{share: s, id: c.rounds, made: s.From}
	for len(c.helpers) < min(c.most, s.Workers)-1 {
		c.helpers = append(c.helpers, c.mate(c.heardHelper))
	}
	for i, m := range c.helpers {
		m.in, m.due, m.made, m.next = false, 0, false, s.Portion
		if i < s.Workers-1 {
			m.post(request{ID: c.round.id, Kind: askMaker}, order)
		}
	}
	c.lead.in, c.lead.due, c.lead.made, c.lead.next = true, 0, false, s.Portion
	c.deal(c.lead)
}

// heardHelper takes in what a helper says. One that can't go on takes its
// blocks with it: then the answer can't be had.
func (c *crew) heardHelper(m *mate, r reply, with []parcel) {
	switch {
	case r.Kind == sayBroken || r.Error != "":
		c.receive(reply{Kind: sayBroken, Error: r.Error})
	case c.round == nil || r.ID != c.round.id: // of a round that is over
	case r.Kind == askMaker:
		m.in = true
		c.deal(m)
	case r.Kind == askBlocks:
		c.delivered(m, r)
	case r.Kind == askPart:
		c.round.parts = append(c.round.parts, with...)
		c.round.wanting--
		c.merge()
	}
}

// delivered notes a portion that was made and gives out another, or has the
// parts brought together when it was the last.
func (c *crew) delivered(m *mate, r reply) {
	if c.round == nil || r.ID != c.round.id {
		return
	}
	p, err := decoded[portion](r)
	if err != nil {
		c.receive(reply{Kind: sayBroken, Error: err.Error()})
		return
	}
	m.due--
	m.made, m.next = true, p.Next
	c.round.made += p.Made
	c.deal(m)
	if c.round.made < c.round.Blocks {
		return
	}
	for _, m := range c.helpers {
		if m.made {
			c.round.wanting++
			m.post(request{ID: c.round.id, Kind: askPart})
		}
	}
	c.merge()
}

// deal gives a worker what it should have to do: towards the end less and
// less, so that all are done at about the same time.
func (c *crew) deal(m *mate) {
	for r := c.round; m.in && m.due < ahead && r.From < r.Blocks; m.due++ {
		blocks := max(1, min(m.next, (r.Blocks-r.From)/(ahead*(1+len(c.helpers)))))
		m.post(request{ID: r.id, Kind: askBlocks, From: r.From, To: r.From + blocks, Made: r.made})
		r.From += blocks
	}
}

// merge hands the parts to the lead once all are there.
func (c *crew) merge() {
	if c.round.wanting == 0 {
		c.lead.post(request{ID: c.round.id, Kind: askMerge}, c.round.parts...)
		c.round = nil
	}
}
