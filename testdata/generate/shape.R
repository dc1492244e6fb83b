# Writes shape/shape.json: what the shape of the scores does to the gap at a
# cutoff, for the columns and cutoffs of spec.csv, row by row and by the
# definitions alone: parts of the gap, and the gap without some of the people
# or with heaps spread. Base R only; shares nothing with the project's code.
# Run from testdata:  Rscript generate/shape.R

spec <- read.csv("generate/spec.csv", stringsAsFactors = FALSE)

# What is at or above a point when each score is spread evenly over its step.
spread_share <- function(x, point, step) {
  if (is.na(step)) return(mean(x >= point - 1e-9))
  mean(pmin(1, pmax(0, (x + step / 2 - point) / step)))
}
curve_share <- function(x, point) pnorm((point - mean(x)) / sd(x), lower.tail = FALSE)

# The gap at x >= cutoff, the curve read at the cutoff itself.
gap <- function(x, cutoff) curve_share(x, cutoff) - mean(x >= cutoff - 1e-9)

parts <- function(x, cutoff, step) {
  point <- if (is.na(step)) cutoff else cutoff - step / 2
  counted <- mean(x >= cutoff - 1e-9)
  mirrored <- spread_share(2 * mean(x) - x, point, step)
  list(gap = gap(x, cutoff),
       half_step = curve_share(x, cutoff) - curve_share(x, point),
       asymmetry = (mirrored - counted) / 2,
       rest = curve_share(x, point) - (counted + mirrored) / 2)
}

# The rows farthest from the mean of all go first.
without_farthest <- function(x, people) x[-order(-abs(x - mean(x)))[seq_len(people)]]

# Weighted versions, for heaps that are spread.
weighted_gap <- function(value, weight, cutoff) {
  n <- sum(weight)
  m <- sum(weight * value) / n
  s <- sqrt(sum(weight * (value - m)^2) / (n - 1))
  pnorm((cutoff - m) / s, lower.tail = FALSE) - sum(weight[value >= cutoff - 1e-9]) / n
}
heaps_spread <- function(x, step, steps) {
  grid <- seq(min(x), max(x), by = step)
  count <- sapply(grid, function(g) sum(abs(x - g) < step / 4))
  weight <- count
  spacing <- steps * step
  for (i in which(count > 0 & abs(grid / spacing - round(grid / spacing)) < 1e-6)) {
    distance <- abs(seq_along(grid) - i)
    share <- ifelse(distance * 2 < steps, 1, ifelse(distance * 2 == steps, 0.5, 0))
    around <- share; around[i] <- 0
    surplus <- count[i] - sum(around * count) / sum(around)
    weight[i] <- weight[i] - surplus
    weight <- weight + surplus * share / sum(share)
  }
  list(value = grid, weight = weight)
}

# n times the variance of skewness and kurtosis, by their influence functions.
influence <- function(x) {
  u <- (x - mean(x)) / sqrt(mean((x - mean(x))^2))
  g <- mean(u^3); b <- mean(u^4)
  list(skewness = g, kurtosis = b,
       skewness_variance = mean((u^3 - 3 * u - g - 1.5 * g * (u^2 - 1))^2),
       kurtosis_variance = mean((u^4 - 4 * g * u - 2 * b * u^2 + b)^2))
}

number <- function(v) sprintf("%.17g", v)
object <- function(l) paste0("{", paste0('"', names(l), '":', sapply(l, function(v) if (is.character(v)) v else number(v)), collapse = ","), "}")
columns <- c()
for (i in seq_len(nrow(spec))) {
  s <- spec[i, ]
  x <- read.csv(paste0("open/", s$dataset, ".csv"))[[s$column]]
  x <- x[!is.na(x)]
  hundredth <- ceiling(length(x) / 100)
  at <- c()
  for (cutoff in unlist(s[paste0("c", 1:5)])) {
    one <- c(list(cutoff = cutoff), parts(x, cutoff, s$step), list(
      without_lowest = gap(x[x > min(x)], cutoff), without_highest = gap(x[x < max(x)], cutoff),
      without_farthest = gap(without_farthest(x, 1), cutoff), without_hundredth = gap(without_farthest(x, hundredth), cutoff)))
    if (!is.na(s$step)) for (steps in c(5, 10)) {
      h <- heaps_spread(x, s$step, steps)
      one[[paste0("spread_", steps)]] <- weighted_gap(h$value, h$weight, cutoff)
    }
    at <- c(at, object(one))
  }
  columns <- c(columns, object(c(list(dataset = paste0('"', s$dataset, '"'), column = paste0('"', s$column, '"'),
    step = if (is.na(s$step)) "null" else number(s$step)), influence(x),
    list(cutoffs = paste0("[\n  ", paste(at, collapse = ",\n  "), "]")))))
}
dir.create("shape", showWarnings = FALSE)
writeLines(paste0('{"made_by":"generate/shape.R","r":"', R.version$major, ".", R.version$minor, '","columns":[\n', paste(columns, collapse = ",\n"), "]}"), "shape/shape.json")
