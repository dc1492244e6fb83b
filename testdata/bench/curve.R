# The gap at every threshold, 10,000 bootstrap samples, by boot::boot, with a
# statistic that returns the gap alone (no standard errors): seconds of the
# plain vectorised way to write it, and of the fastest of three that count
# first. Run from testdata/bench:  Rscript curve.R
library(boot)
x <- read.csv("scores.csv")$score
low <- min(x); values <- low:max(x); n <- length(x); k <- length(values)
beyond <- function(counts) rev(cumsum(rev(counts)))

plain <- function(x, i) {
  y <- x[i]
  pnorm(values, mean(y), sd(y), lower.tail = FALSE) - colMeans(outer(y, values, ">="))
}
by_index <- function(x, i) {
  y <- x[i]
  m <- mean(y); s <- sqrt(sum((y - m)^2) / (n - 1))
  pnorm(values, m, s, lower.tail = FALSE) - beyond(tabulate(y - low + 1L, k)) / n
}
by_counts <- function(x, i) { # moments from the count table
  counts <- tabulate(x[i] - low + 1L, k)
  m <- sum(counts * values) / n
  s <- sqrt(sum(counts * (values - m)^2) / (n - 1))
  pnorm(values, m, s, lower.tail = FALSE) - beyond(counts) / n
}
place <- x - low + 1L
ordered <- order(place); ends <- cumsum(tabulate(place, k))
by_frequency <- function(x, f) {
  total <- c(0, cumsum(f[ordered]))
  counts <- diff(c(0, total[ends + 1]))
  m <- sum(counts * values) / n
  s <- sqrt(sum(counts * (values - m)^2) / (n - 1))
  pnorm(values, m, s, lower.tail = FALSE) - beyond(counts) / n
}
seconds <- function(run) { gc(); system.time(run())[["elapsed"]] }
ways <- c(
  index = seconds(function() boot(x, by_index, 10000)),
  counts = seconds(function() boot(x, by_counts, 10000)),
  frequency = seconds(function() boot(x, by_frequency, 10000, stype = "f"))
)
cat(seconds(function() boot(x, plain, 10000)), names(which.min(ways)), min(ways), "\n")
