package resample

// largest keeps the k largest of the values it is offered, in a buffer of
// twice that size: when the buffer is full, the smaller half is thrown away
// by selection. So a high quantile of many replicates needs neither all of
// them nor a sort, and does not depend on the order they came in.
type largest struct {
	values []float64 // at most 2k
	k      int
	floor  float64 // every value below it is out; values are not negative
}

func newLargest(k int) largest {
	return largest{k: k, floor: 0}
}

func (l *largest) offer(x float64) {
	if x < l.floor {
		return
	}
	if len(l.values) == 2*l.k {
		l.shrink()
		if x < l.floor {
			return
		}
	}
	if l.values == nil {
		l.values = make([]float64, 0, 2*l.k) // to grow into it would take several times the memory
	}
	l.values = append(l.values, x)
}

func (l *largest) offerAll(values []float64) {
	for _, x := range values {
		l.offer(x)
	}
}

// shrink keeps the k largest, the smallest of them first.
func (l *largest) shrink() {
	if len(l.values) <= l.k {
		return
	}
	at := len(l.values) - l.k
	selectNth(l.values, at)
	copy(l.values, l.values[at:])
	l.values = l.values[:l.k]
	l.floor = l.values[0]
}

// least is the k-th largest of everything offered; to have offered fewer is a
// mistake of the caller.
func (l *largest) least() float64 {
	l.shrink()
	selectNth(l.values, 0)
	return l.values[0]
}

// selectNth reorders x so that x[n] is the value it would have if x were
// sorted, nothing before it is larger and nothing after it smaller (Hoare
// 1961, with the median of three as pivot).
func selectNth(x []float64, n int) {
	low, high := 0, len(x)-1
	for low < high {
		pivot := medianOfThree(x[low], x[(low+high)/2], x[high])
		i, j := low, high
		for i <= j {
			for x[i] < pivot {
				i++
			}
			for x[j] > pivot {
				j--
			}
			if i <= j {
				x[i], x[j] = x[j], x[i]
				i++
				j--
			}
		}
		switch {
		case n <= j:
			high = j
		case n >= i:
			low = i
		default:
			return
		}
	}
}

func medianOfThree(a, b, c float64) float64 {
	return max(min(a, b), min(max(a, b), c))
}
