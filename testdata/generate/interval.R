# Writes interval/interval.json: the parts of the ghost-studentised interval
# that need no resampling (curve share, v, D, kappa, SE) and the second
# interval of its hull (I2), for the columns and cutoffs of spec.csv.
# Base R only; interval.py recomputes every number another way.
# Run from testdata:  Rscript generate/interval.R

spec <- read.csv("generate/spec.csv", stringsAsFactors = FALSE)
more <- read.csv("generate/interval_spec.csv", stringsAsFactors = FALSE)
stopifnot(identical(spec[1:2], more[1:2]))
weights <- c(0.8, 1.2, 1.5)
other_levels <- c(0.90, 0.99)
with_other_levels <- c("pima.age", "mathexam.tests", "cd4.baseline")

central <- function(x, r) mean((x - mean(x))^r)

# A curve read at d: either fitted to x (sampling variation and all) or given.
fitted_curve <- function(x) list(mean = mean(x), sd = sd(x), given = FALSE)
given_curve <- function(mean, sd) list(mean = mean, sd = sd, given = TRUE)

# The influence h(y) of one score y on P(X >= d), and its variance times n.
influence_at <- function(x, curve, d) {
  z <- (d - curve$mean) / curve$sd
  f <- if (curve$given) 0 else dnorm(z)
  a <- f / curve$sd
  b <- f * z / (2 * curve$sd^2)
  list(z = z, a = a, b = b, share = pnorm(z, lower.tail = FALSE))
}
h_of <- function(x, a, b) {
  m2 <- central(x, 2)
  function(y) a * (y - mean(x)) + b * ((y - mean(x))^2 - m2)
}
variance_of_share <- function(x, a, b) {
  n <- length(x); m2 <- central(x, 2)
  n / (n - 1) * (a^2 * m2 + 2 * a * b * central(x, 3) + b^2 * (central(x, 4) - m2^2))
}

# D, p~, kappa and SE for the curve share minus w times the counted share of
# `beyond`, with one ghost of influence g on each side.
ghost_terms <- function(x, beyond, h, g, v, w = 1) {
  n <- length(x); k <- sum(beyond); A <- sum(h(x)[beyond])
  D <- (A + g) / (k + 1) - (g - A) / (n - k + 1)
  p <- (k + 2) / (n + 4)
  raw <- w^2 - 2 * w * D
  floor <- -0.95 * v / (p * (1 - p))
  kappa <- max(raw, floor)
  list(n = n, k = k, v = v, D = D, p_tilde = p, kappa = kappa, floored = raw < floor,
       SE = sqrt((v + kappa * p * (1 - p)) / n))
}

# The two roots of (y-p)^2 = V + lambda y(1-y), the lower with its own V and
# the upper with its own; outside 0..1 the term in lambda is left out.
root <- function(p, V, lambda, upper) {
  if (!upper && p^2 <= V) return(p - sqrt(V))
  if (upper && (1 - p)^2 <= V) return(p + sqrt(V))
  sign <- if (upper) 1 else -1
  # in y - p the quadratic loses no digits where p is near 0 or 1
  discriminant <- lambda^2 + 4 * lambda * p * (1 - p) + 4 * (1 + lambda) * V
  if (discriminant < 0 || 1 + lambda < 0.05) {
    fallbacks <<- fallbacks + 1
    return(p + sign * sqrt(max(0, V + lambda * p * (1 - p))))
  }
  if (V + lambda * p * (1 - p) < 0) wrong_side <<- wrong_side + 1
  p + (lambda * (1 - 2 * p) + sign * sqrt(discriminant)) / (2 * (1 + lambda))
}
fallbacks <- 0; wrong_side <- 0; asked <- 0

# I2, as a proportion, for the curve share minus w times the counted share.
second_interval <- function(e, t, curve, at, w = 1) {
  asked <<- asked + 1
  if (curve$given) {
    low <- high <- at$share
  } else {
    zeta <- asinh(at$z / sqrt(2))
    se <- sqrt(e$v / e$n) / (dnorm(at$z) * sqrt(2 + at$z^2))
    low <- pnorm(sqrt(2) * sinh(zeta + t * se), lower.tail = FALSE)
    high <- pnorm(sqrt(2) * sinh(zeta - t * se), lower.tail = FALSE)
  }
  p <- e$k / e$n; lambda <- t^2 * e$kappa / (w^2 * e$n)
  c(at$share - w * root(p, (at$share - low)^2 / w^2, lambda, TRUE),
    at$share - w * root(p, (high - at$share)^2 / w^2, lambda, FALSE))
}

# One cutoff on one side. The lower sides are the complements of the upper
# ones: "< c" of ">= c", "<= c" of "> c".
at_cutoff <- function(x, step, cutoff, side, half, curve, level, w = 1) {
  strict <- side %in% c(">", "<="); lower <- side %in% c("<=", "<")
  beyond <- if (strict) x > cutoff else x >= cutoff
  d <- cutoff + half * (if (strict) step else -step) / 2
  at <- influence_at(x, curve, d)
  h <- h_of(x, at$a, at$b)
  v <- if (curve$given) 0 else variance_of_share(x, at$a, at$b)
  e <- ghost_terms(x, beyond, h, h(cutoff), v, w)
  t <- qt(1 - (1 - level) / 2, e$n - 1)
  before <- fallbacks
  I2 <- second_interval(e, t, curve, at, w)
  S <- e$k / e$n; N <- at$share
  u <- (x - mean(x)) / sd(x)          # influence value as published, not centred: u^2-1
  influence <- dnorm(at$z) * (u + at$z / 2 * (u^2 - 1)) - (beyond - S)
  if (lower) {              # 1-N - w(1-S) = (1-w) - (N - wS)
    I2 <- (1 - w) - rev(I2); S <- (e$n - e$k) / e$n; N <- pnorm(at$z)
  }
  gap <- N - w * S
  list(cutoff = cutoff, side = side, half_step = half == 1, level = level, z = at$z,
       curve_share = N, counted = if (lower) e$n - e$k else e$k, counted_share = S, gap_points = 100 * gap,
       v = e$v, D = e$D, p_tilde = if (lower) 1 - e$p_tilde else e$p_tilde, kappa = e$kappa, kappa_floored = e$floored,
       se_points = 100 * e$SE, t = t,
       i2_low_points = 100 * I2[1], i2_high_points = 100 * I2[2], i2_fallback_roots = fallbacks - before,
       takes_hull = min(e$k, e$n - e$k) < 10,
       influence_se_points = 100 * sqrt(mean(influence^2) / e$n))
}

at_stretch <- function(x, step, from, to, half, curve, level) {
  inside <- x >= from & x <= to
  lo <- influence_at(x, curve, from - half * step / 2); hi <- influence_at(x, curve, to + half * step / 2)
  a <- lo$a - hi$a; b <- lo$b - hi$b
  h <- h_of(x, a, b)
  v <- if (curve$given) 0 else variance_of_share(x, a, b)
  e <- ghost_terms(x, inside, h, (h(from) + h(to)) / 2, v)
  t <- qt(1 - (1 - level) / 2, e$n - 1)
  S <- e$k / e$n; N <- lo$share - hi$share
  list(from = from, to = to, half_step = half == 1, level = level, z_from = lo$z, z_to = hi$z,
       curve_share = N, counted = e$k, counted_share = S, gap_points = 100 * (N - S),
       v = e$v, D = e$D, p_tilde = e$p_tilde, kappa = e$kappa, kappa_floored = e$floored,
       se_points = 100 * e$SE, t = t)
}

pick <- function(record, fields) record[fields]
one_column <- function(row) {
  s <- spec[row, ]; g <- more[row, ]
  x <- read.csv(file.path("open", paste0(s$dataset, ".csv")))[[s$column]]
  missing <- sum(is.na(x)); x <- x[!is.na(x)]; n <- length(x)
  step <- if (is.na(s$step)) 0 else s$step
  halves <- if (is.na(s$step)) 0 else 0:1
  cutoffs <- unlist(s[c("c1", "c2", "c3", "c4", "c5")], use.names = FALSE)
  fitted <- fitted_curve(x); given <- given_curve(g$given_mean, g$given_sd)
  g1 <- central(x, 3) / central(x, 2)^1.5; g2 <- central(x, 4) / central(x, 2)^2 - 3

  each <- function(sides, levels, make)
    do.call(c, lapply(levels, function(level) do.call(c, lapply(cutoffs, function(cutoff)
      do.call(c, lapply(sides, function(side) lapply(halves, function(half) make(cutoff, side, half, level))))))))
  sides <- c(">=", ">", "<=", "<")
  fit <- function(cutoff, side, half, level) at_cutoff(x, step, cutoff, side, half, fitted, level)
  levels <- c(0.95, if (paste(s$dataset, s$column, sep = ".") %in% with_other_levels) other_levels)

  known <- each(c(">=", "<="), 0.95, function(cutoff, side, half, level)
    list(pick(at_cutoff(x, step, cutoff, side, half, given, level),
      c("cutoff", "side", "half_step", "level", "z", "curve_share", "counted", "counted_share", "gap_points", "v", "kappa",
        "p_tilde", "se_points", "t", "i2_low_points", "i2_high_points", "takes_hull"))))
  known <- do.call(c, known)

  combination <- function(w) each(c(">=", if (w == 1.2) "<="), 0.95, function(cutoff, side, half, level) {
    r <- at_cutoff(x, step, cutoff, side, half, fitted, level, w)
    names(r)[names(r) == "gap_points"] <- "difference_points"
    list(c(list(weight = w), pick(r, c("cutoff", "side", "half_step", "level", "curve_share", "counted_share", "difference_points",
      "v", "D", "p_tilde", "kappa", "kappa_floored", "se_points", "t", "i2_low_points", "i2_high_points",
      "i2_fallback_roots"))))
  })
  combined <- do.call(c, lapply(weights, function(w) do.call(c, combination(w))))

  ends <- strsplit(unlist(g[c("stretch1", "stretch2", "stretch3")], use.names = FALSE), "..", fixed = TRUE)
  stretches <- do.call(c, lapply(ends, function(e) lapply(halves, function(half)
    at_stretch(x, step, as.numeric(e[1]), as.numeric(e[2]), half, fitted, 0.95))))

  list(dataset = s$dataset, column = s$column, step = if (is.na(s$step)) NA else s$step,
       n = n, missing = missing, min = min(x), max = max(x), distinct = length(unique(x)),
       mean = mean(x), sd = sd(x), m2 = central(x, 2), m3 = central(x, 3), m4 = central(x, 4),
       skewness = g1, excess_kurtosis = g2,
       adjusted_skewness = g1 * sqrt(n * (n - 1)) / (n - 2),
       adjusted_excess_kurtosis = (n - 1) / ((n - 2) * (n - 3)) * ((n + 1) * g2 + 6),
       cutoffs = each(sides, levels, fit), stretches = stretches,
       given_curve = list(mean = g$given_mean, sd = g$given_sd, cutoffs = known),
       combinations = combined)
}

# JSON with one record a line and every number in the fewest digits, 15 to 17,
# that read back as the same number.
number <- function(x) {
  if (is.na(x)) return("null")
  for (digits in 15:17) {
    text <- sprintf("%.*g", digits, x)
    if (as.numeric(text) == x) break
  }
  text
}
value <- function(v) if (is.character(v)) paste0("\"", v, "\"") else if (isTRUE(v)) "true" else if (isFALSE(v)) "false" else number(v)
line <- function(r) {
  if (!is.list(r)) return(value(r))
  paste0("{", paste0("\"", names(r), "\":", vapply(r, value, ""), collapse = ","), "}")
}
lines_of <- function(records, indent) paste0(indent, vapply(records, line, ""), collapse = ",\n")
column_json <- function(c) {
  scalars <- substring(line(c[!names(c) %in% c("cutoffs", "stretches", "given_curve", "combinations")]), 2)
  scalars <- substr(scalars, 1, nchar(scalars) - 1)
  paste0("{", scalars, ",\n \"cutoffs\": [\n", lines_of(c$cutoffs, "  "), "],\n \"stretches\": [\n", lines_of(c$stretches, "  "),
    "],\n \"given_curve\": {\"mean\":", line(c$given_curve$mean), ",\"sd\":", line(c$given_curve$sd), ",\"cutoffs\": [\n", lines_of(c$given_curve$cutoffs, "  "),
    "]},\n \"combinations\": [\n", lines_of(c$combinations, "  "), "]}")
}
columns <- lapply(seq_len(nrow(spec)), one_column)
dir.create("interval", showWarnings = FALSE)
writeLines(paste0("{\"made_by\": \"generate/interval.R\", \"r\": ", line(paste(R.version$major, R.version$minor, sep = ".")),
  ",\n\"columns\": [\n", paste(vapply(columns, column_json, ""), collapse = ",\n"), "\n]}"), "interval/interval.json")
cat("asked for I2", asked, "times; fallback", fallbacks, "roots; root on the wrong side", wrong_side, "\n")
