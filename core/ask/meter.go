package ask

// meter tells progress, but only what is new.
type meter struct {
	progress    Progress
	done, total int
}

func newMeter(progress Progress, total int) *meter {
	return &meter{progress: progress, total: total}
}

func (m *meter) tell(done int) {
	if done = min(done, m.total); done <= m.done {
		return
	}
	m.done = done
	if m.progress != nil {
		m.progress(done, m.total)
	}
}

// from is a teller of a part of the work, which counts from zero.
func (m *meter) from(start int) func(done int) {
	return func(done int) { m.tell(start + done) }
}
