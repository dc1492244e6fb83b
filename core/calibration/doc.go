// Package calibration finds out, by simulation from populations whose every
// share is known, how often the intervals and bands hold what they promise,
// how wide they are, and how often a verdict is wrong.
//
// A cell is one population, one sample size and one cutoff. In each of many
// samples the interval, the band and the verdicts are made just as for a
// user's scores, and held against the truth:
//
//   - coverage: the part of the samples in which the interval holds the true
//     gap; the misses on either side are counted apart;
//   - width: the interval's mean width over the oracle's, which knows the true
//     sampling SD of the gap and takes 2·z of it;
//   - false holds and false fails: the part of the samples in which the verdict
//     is "holds", or "fails", when the tolerance is the true gap itself, to
//     either side, so that it may just as well be either;
//   - the band's coverage: the part of the samples in which it holds the true
//     gap at every threshold of the sweep;
//   - false trust: the part of the samples with a threshold in the trusted
//     range at which the true gap is beyond the tolerance.
package calibration
