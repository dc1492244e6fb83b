# Writes interval/norms.json: the interval of the gap under a given curve, its
# mean and SD known or estimated from norm_n people, at four levels, for the
# columns and cutoffs of spec.csv and the curves and stretches of
# interval_spec.csv. Base R only; interval.py recomputes every number another way.
# Run from testdata:  Rscript generate/norms.R

spec <- read.csv("generate/spec.csv", stringsAsFactors = FALSE)
more <- read.csv("generate/interval_spec.csv", stringsAsFactors = FALSE)
stopifnot(identical(spec[1:2], more[1:2]))
levels <- c(0.8, 0.9, 0.95, 0.99)
norm_people <- c(NA, 20, 870)

# Limits of the counted share: Clopper and Pearson's, by R's own test.
counted_limits <- function(k, n, level) as.numeric(binom.test(k, n, conf.level = level)$conf.int)

# Limits of the z of the true curve, by Johnson and Welch's approximation of
# the noncentral t distribution.
z_limits <- function(z, n, level) {
  q <- qnorm(1 - (1 - level) / 2)
  z * (1 - 1 / (4 * (n - 1))) + c(-1, 1) * q * sqrt(1 / n + z^2 / (2 * (n - 1)))
}
# The same from the distribution itself, integrated over the norms' SD: R's own
# pt loses digits where the noncentrality is large.
exact_z_limits <- function(z, n, level) {
  miss <- (1 - level) / 2; df <- n - 1
  ends <- sqrt(c(qchisq(1e-15, df), qchisq(1e-15, df, lower.tail = FALSE)) / df)
  below <- function(ncp) integrate(function(s) dchisq(df * s^2, df) * 2 * df * s * pnorm(sqrt(n) * (z * s - ncp)),
    ends[1], ends[2], rel.tol = 1e-10, subdivisions = 1000)$value
  limit <- function(p) uniroot(function(ncp) below(ncp) - p, z + c(-1, 1) * 12 * (1 + abs(z)) / sqrt(n), tol = 1e-11)$root
  c(limit(1 - miss), limit(miss))
}

# MOVER: the limits of N - w S, from those of both.
together <- function(N, N_limits, S, S_limits, w)
  c(N - w * S - sqrt((N - N_limits[1])^2 + w^2 * (S_limits[2] - S)^2),
    N - w * S + sqrt((N_limits[2] - N)^2 + w^2 * (S - S_limits[1])^2))

# The standard error that the band's studentised gaps are scaled by.
se_points <- function(variance, k, n, w) {
  p <- (k + 2) / (n + 4)
  100 * sqrt(variance + w^2 * p * (1 - p) / n)
}
norm_variance <- function(by_mean, by_sd, n0) if (is.na(n0)) 0 else by_mean^2 / n0 + by_sd^2 / (2 * (n0 - 1))

at_cutoff <- function(x, step, cutoff, side, half, mean, sd, n0, w) {
  strict <- side %in% c(">", "<="); lower <- side %in% c("<=", "<")
  n <- length(x); k <- sum(switch(side, ">=" = x >= cutoff, ">" = x > cutoff, "<=" = x <= cutoff, "<" = x < cutoff))
  z <- (cutoff + half * (if (strict) step else -step) / 2 - mean) / sd
  N <- pnorm(z, lower.tail = lower)
  limits <- sapply(levels, function(level) {
    N_limits <- if (is.na(n0)) c(N, N) else sort(pnorm(z_limits(z, n0, level), lower.tail = lower))
    100 * together(N, N_limits, k / n, counted_limits(k, n, level), w)
  })
  list(cutoff = cutoff, side = side, half_step = half == 1, norm_n = n0, weight = w, curve_share = N, counted = k,
       se_points = se_points(norm_variance(dnorm(z), z * dnorm(z), n0), k, n, w), low_points = limits[1, ], high_points = limits[2, ])
}

at_stretch <- function(x, step, from, to, half, mean, sd, n0) {
  n <- length(x); k <- sum(x >= from & x <= to)
  z <- (c(from - half * step / 2, to + half * step / 2) - mean) / sd
  N <- if (z[1] > 0) pnorm(z[1], lower.tail = FALSE) - pnorm(z[2], lower.tail = FALSE) else pnorm(z[2]) - pnorm(z[1])
  variance <- norm_variance(dnorm(z[1]) - dnorm(z[2]), z[1] * dnorm(z[1]) - z[2] * dnorm(z[2]), n0)
  limits <- sapply(levels, function(level) {
    N_limits <- if (is.na(n0)) c(N, N) else plogis(qlogis(N) + c(-1, 1) * qt(1 - (1 - level) / 2, n0 - 1) * sqrt(variance) / (N * (1 - N)))
    100 * together(N, N_limits, k / n, counted_limits(k, n, level), 1)
  })
  list(from = from, to = to, half_step = half == 1, norm_n = n0, curve_share = N, counted = k,
       se_points = se_points(variance, k, n, 1), low_points = limits[1, ], high_points = limits[2, ])
}

one_column <- function(row) {
  s <- spec[row, ]; g <- more[row, ]
  x <- read.csv(file.path("open", paste0(s$dataset, ".csv")))[[s$column]]
  x <- x[!is.na(x)]
  step <- if (is.na(s$step)) 0 else s$step
  half <- if (is.na(s$step)) 0 else 1
  cutoffs <- list(); stretches <- list()
  for (n0 in norm_people) {
    for (cutoff in unlist(s[c("c1", "c3", "c5")], use.names = FALSE)) for (side in c(">=", "<="))
      cutoffs <- c(cutoffs, list(at_cutoff(x, step, cutoff, side, half, g$given_mean, g$given_sd, n0, 1)))
    for (side in c(">", "<"))
      cutoffs <- c(cutoffs, list(at_cutoff(x, step, s$c4, side, 0, g$given_mean, g$given_sd, n0, if (side == ">") 1.2 else 0.8)))
    ends <- as.numeric(strsplit(g$stretch1, "..", fixed = TRUE)[[1]])
    stretches <- c(stretches, list(at_stretch(x, step, ends[1], ends[2], half, g$given_mean, g$given_sd, n0)))
  }
  list(dataset = s$dataset, column = s$column, step = s$step, n = length(x), mean = g$given_mean, sd = g$given_sd,
       cutoffs = cutoffs, stretches = stretches)
}

distribution <- list()
for (n in c(5, 20, 50, 150)) for (z in c(-3, -1, 0, 0.5, 2, 3)) for (level in levels) {
  exact <- exact_z_limits(z, n, level)
  distribution <- c(distribution, list(list(norm_n = n, z = z, level = level, low = exact[1], high = exact[2])))
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
value <- function(v) {
  if (is.character(v)) return(paste0("\"", v, "\""))
  if (is.logical(v) && !is.na(v)) return(if (v) "true" else "false")
  if (length(v) > 1) return(paste0("[", paste(vapply(v, number, ""), collapse = ","), "]"))
  number(v)
}
line <- function(r) paste0("{", paste0("\"", names(r), "\":", vapply(r, value, ""), collapse = ","), "}")
lines_of <- function(records) paste0("  ", vapply(records, line, ""), collapse = ",\n")
column_json <- function(c) {
  head <- line(c[!names(c) %in% c("cutoffs", "stretches")])
  paste0(substr(head, 1, nchar(head) - 1), ",\n \"cutoffs\": [\n", lines_of(c$cutoffs), "],\n \"stretches\": [\n", lines_of(c$stretches), "]}")
}
columns <- lapply(seq_len(nrow(spec)), one_column)
writeLines(paste0("{\"made_by\": \"generate/norms.R\", \"r\": \"", R.version$major, ".", R.version$minor, "\", \"levels\": ", value(levels),
  ",\n\"columns\": [\n", paste(vapply(columns, column_json, ""), collapse = ",\n"), "\n],\n\"noncentral_t\": [\n", lines_of(distribution), "]}"), "interval/norms.json")
