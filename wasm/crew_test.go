package main

import (
	"encoding/json"
	"fmt"
	"sync"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"tailgap/core/ask"
	"tailgap/core/demo"
)

// fakeHand is a worker that does what the test says, when it says so.
type fakeHand struct {
	inbox   []handed
	got     []handed
	stopped bool
	receive func(reply, []parcel)
}

type handed struct {
	request
	with []parcel
}

func (h *fakeHand) post(r request, with ...parcel) {
	h.inbox, h.got = append(h.inbox, handed{r, with}), append(h.got, handed{r, with})
}

func (h *fakeHand) stop() { h.stopped = true }

// does is the worker's answer to what came first; name is its own.
func (h *fakeHand) does(name string) handed {
	m := h.inbox[0]
	h.inbox = h.inbox[1:]
	r := reply{ID: m.ID, Kind: m.Kind}
	var with []parcel
	switch m.Kind {
	case askBlocks:
		r.Data, _ = json.Marshal(portion{Made: m.To - m.From, Next: 7})
	case askPart:
		with = []parcel{name}
	}
	h.receive(r, with)
	return m
}

// gang is a crew in the hands of a test, and what it says to the desk.
type gang struct {
	*crew
	hands []*fakeHand
	said  []reply
}

func newGang(most int) *gang {
	g := &gang{}
	g.crew = newCrew(func(receive func(reply, []parcel)) hand {
		h := &fakeHand{receive: receive}
		g.hands = append(g.hands, h)
		return h
	}, most, func(r reply) { g.said = append(g.said, r) })
	return g
}

func (g *gang) shares(s share) {
	data, _ := json.Marshal(s)
	g.hands[0].receive(reply{Kind: sayShare, Data: data}, []parcel{"the order"})
}

// Whoever is how fast, every block is made once, by workers that have the
// order, and the lead gets the parts of all who made some.
func TestCrewSharesEveryBlockOnce(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		most := rapid.IntRange(1, 5).Draw(t, "workers")
		g := newGang(most)
		g.post(request{ID: 3, Kind: askAnswer}, nil)
		assert.Equal(t, most-1, g.hands[0].inbox[0].Helpers)
		g.hands[0].inbox = nil
		started := 1
		for range rapid.IntRange(1, 3).Draw(t, "scores") {
			s := share{From: rapid.IntRange(1, 5).Draw(t, "from"), Portion: rapid.IntRange(1, 20).Draw(t, "portion")}
			s.Workers = rapid.IntRange(1, 6).Draw(t, "room")
			s.Blocks = s.From + rapid.IntRange(1, 200).Draw(t, "blocks")
			g.shares(s)
			started = max(started, min(most, s.Workers))
			require.Len(t, g.hands, started)
			times, parts := make([]int, s.Blocks), map[string]bool{}
			for g.round != nil {
				var busy []int
				for i, h := range g.hands {
					if len(h.inbox) > 0 {
						busy = append(busy, i)
					}
				}
				require.NotEmpty(t, busy, "nobody has anything to do, and it isn't done")
				i := rapid.SampledFrom(busy).Draw(t, "who")
				name := fmt.Sprint("part ", i)
				m := g.hands[i].does(name)
				assert.LessOrEqual(t, len(g.hands[i].inbox), ahead+1)
				if m.Kind == askBlocks {
					assert.Less(t, i, s.Workers, "there is no room for it")
				}
				for block := m.From; block < m.To; block++ {
					times[block]++
					parts[name] = parts[name] || i > 0
				}
				assert.LessOrEqual(t, m.To-m.From, max(s.Portion, 7))
			}
			for block, n := range times {
				if block < s.From {
					assert.Zero(t, n)
				} else {
					assert.Equal(t, 1, n, "block %d", block)
				}
			}
			lead := g.hands[0]
			require.Len(t, lead.inbox, 1)
			assert.Equal(t, askMerge, lead.inbox[0].Kind)
			for _, p := range lead.inbox[0].with {
				assert.True(t, parts[p.(string)], p)
				delete(parts, p.(string))
			}
			delete(parts, "part 0")
			assert.Empty(t, parts, "parts that were forgotten")
			lead.inbox = nil
		}
		g.hands[0].receive(reply{ID: 3, Kind: askAnswer}, nil)
		assert.Equal(t, []reply{{ID: 3, Kind: askAnswer}}, g.said)
		g.stop()
		for _, h := range g.hands {
			assert.True(t, h.stopped)
		}
	})
}

func TestCrewStartsHelpersOnlyForWorkToShare(t *testing.T) {
	g := newGang(4)
	f := &file{name: "scores.csv", blob: "its bytes"}
	g.post(request{ID: 1, Kind: askColumns}, f)
	assert.Equal(t, []parcel{"its bytes"}, g.hands[0].inbox[0].with)
	g.hands[0].receive(reply{ID: 1, Kind: sayProgress}, nil)
	g.hands[0].receive(reply{ID: 1, Kind: askColumns}, nil)
	assert.Len(t, g.said, 2)
	assert.Len(t, g.hands, 1)

	g.shares(share{From: 1, Blocks: 100, Portion: 5, Workers: 9})
	assert.Len(t, g.hands, 4)
	assert.Equal(t, []parcel{"the order"}, g.hands[3].inbox[0].with)
	assert.Equal(t, askMaker, g.hands[3].inbox[0].Kind)
	assert.Len(t, g.said, 2, "the desk need not know")
}

// When the lead gives up, its helpers are given nothing more.
func TestCrewEndsTheRoundWithTheLead(t *testing.T) {
	g := newGang(2)
	g.post(request{ID: 9, Kind: askAnswer}, nil)
	g.shares(share{From: 1, Blocks: 1000, Portion: 5, Workers: 9})
	helper := g.hands[1]
	helper.does("")
	require.Len(t, helper.inbox, ahead)
	g.hands[0].receive(reply{ID: 9, Kind: askAnswer, Error: "the program failed at this"}, nil)
	helper.does("")
	assert.Len(t, helper.inbox, ahead-1)
	assert.Equal(t, []reply{{ID: 9, Kind: askAnswer, Error: "the program failed at this"}}, g.said)
}

// A helper's trouble is the whole crew's: its blocks are lost.
func TestCrewSaysWhenAHelperFails(t *testing.T) {
	for name, r := range map[string]reply{
		"it panicked":  {ID: 1, Kind: askBlocks, Error: "the program failed at this"},
		"it has ended": {Kind: sayBroken, Error: "its program came to an end"},
		"no maker":     {ID: 1, Kind: askMaker, Error: "these bytes are no order"},
	} {
		g := newGang(2)
		g.post(request{ID: 9, Kind: askAnswer}, nil)
		g.shares(share{From: 1, Blocks: 100, Portion: 5, Workers: 9})
		g.hands[1].receive(r, nil)
		assert.Equal(t, []reply{{Kind: sayBroken, Error: r.Error}}, g.said, name)
	}
	g := newGang(2)
	g.hands[0].receive(reply{Kind: sayShare}, nil)
	require.Len(t, g.said, 1)
	assert.Equal(t, sayBroken, g.said[0].Kind, "nothing to share")
}

func TestDeskSaysWhenAHelperFails(t *testing.T) {
	d := newTried()
	g := newGang(2)
	d.start = func(receive func(reply)) thread {
		g.receive = receive
		return g.crew
	}
	d.ask()
	g.shares(share{From: 1, Blocks: 100, Portion: 5, Workers: 9})
	g.hands[1].receive(reply{Kind: sayBroken, Error: "out of memory"}, nil)
	assert.Contains(t, d.trouble[atWork], "out of memory")
	assert.Nil(t, d.running)
	assert.True(t, g.hands[0].stopped)
	assert.True(t, g.hands[1].stopped)
}

// office is a crew of real benches, each on a goroutine of its own.
type office struct {
	events chan func() // what happens on the page's one thread
	desks  sync.WaitGroup
}

// deskHand is one of the office's benches, and its line to the crew.
type deskHand struct {
	office   *office
	messages chan message
	receive  func(reply, []parcel)
	made     int
}

func (h *deskHand) post(r request, with ...parcel) {
	m := message{request: r}
	for _, p := range with {
		m.parcels = append(m.parcels, p.([]byte))
	}
	h.messages <- m
}

func (h *deskHand) stop() { close(h.messages) }

func (h *deskHand) hear() message { return <-h.messages }

func (h *deskHand) say(r reply, parcels ...[]byte) {
	with := make([]parcel, len(parcels))
	for i, p := range parcels {
		with[i] = p
	}
	if r.Kind == askBlocks {
		h.made++
	}
	h.office.events <- func() { h.receive(r, with) }
}

// answers has a crew of so many answer the question; the clock makes every
// look at it take a moment, so that there is always enough to share.
func answers(t *testing.T, most int, question ask.Question) (text string, hands []*deskHand) {
	t.Helper()
	o := &office{events: make(chan func(), 1000)}
	start := func(receive func(reply, []parcel)) hand {
		h := &deskHand{office: o, messages: make(chan message, 1000), receive: receive}
		hands = append(hands, h)
		looked := time.Unix(0, 0)
		b := &bench{now: func() time.Time { looked = looked.Add(10 * time.Millisecond); return looked }}
		o.desks.Go(func() {
			for m := range h.messages {
				r, parcels := b.serve(m, h)
				h.say(r, parcels...)
			}
		})
		return h
	}
	var final *reply
	c := newCrew(start, most, func(r reply) {
		if r.Kind != sayProgress {
			final = &r
		}
	})
	c.post(request{ID: 1, Kind: askAnswer, Demo: true, Question: &question}, nil)
	for final == nil {
		(<-o.events)()
	}
	c.stop()
	o.desks.Wait()
	require.Empty(t, final.Error)
	return string(final.Data), hands
}

func TestAnyCrewGivesTheSameAnswer(t *testing.T) {
	question := demo.Question()
	question.Scores = append(question.Scores, "words_per_minute")
	question.Replicates = 6000
	alone, hands := answers(t, 1, question)
	require.Len(t, hands, 1)
	for _, most := range []int{2, 5} {
		together, hands := answers(t, most, question)
		assert.Equal(t, alone, together, "%d workers", most)
		require.Len(t, hands, most)
		for i, h := range hands {
			t.Logf("worker %d of %d made %d portions", i+1, most, h.made)
		}
		assert.Positive(t, hands[1].made)
	}
}
