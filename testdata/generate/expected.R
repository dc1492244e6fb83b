# Computes the R side of expected/.  Run: Rscript generate/expected.R   (run from testdata)
# Writes one raw JSON per column to $REFS_RAW (default raw); expected_scipy.py adds scipy/statsmodels and writes expected/.
suppressMessages({library(boot);library(nortest);library(tseries);library(fBasics);library(e1071);library(jsonlite)})
raw <- Sys.getenv("REFS_RAW","raw"); dir.create(raw, recursive=TRUE, showWarnings=FALSE)
SEED <- 20240501L; R <- 20000L
spec <- read.csv("generate/spec.csv", stringsAsFactors=FALSE)
args <- commandArgs(TRUE); part <- if (length(args)==2) as.integer(args) else c(1L,1L)   # k of K, to split over cores
safe <- function(e) tryCatch(e, error=function(err) NULL)

one <- function(ds, col, step, cuts) {
  v <- read.csv(file.path("open", paste0(ds,".csv")))[[col]]
  miss <- sum(is.na(v)); x <- v[!is.na(v)]; n <- length(x); m <- mean(x); s <- sd(x)
  d <- x-m; m2 <- mean(d^2); m3 <- mean(d^3); m4 <- mean(d^4)
  g1 <- m3/m2^1.5; g2 <- m4/m2^2-3
  G1 <- g1*sqrt(n*(n-1))/(n-2); G2 <- (n-1)/((n-2)*(n-3))*((n+1)*g2+6)
  stopifnot(all.equal(g1, e1071::skewness(x,type=1)), all.equal(G1, e1071::skewness(x,type=2)),
            all.equal(g2, e1071::kurtosis(x,type=1)), all.equal(G2, e1071::kurtosis(x,type=2)))
  sw <- if (n<=5000) shapiro.test(x) else NULL
  ad <- nortest::ad.test(x); li <- nortest::lillie.test(x); jb <- tseries::jarque.bera.test(x)
  dg <- safe(fBasics::dagoTest(x)@test)
  tests <- list(
    shapiro_wilk = list(W=if(is.null(sw)) NA else unname(sw$statistic), p=if(is.null(sw)) NA else sw$p.value),
    anderson_darling = list(A2=unname(ad$statistic), A2_star=unname(ad$statistic)*(1+0.75/n+2.25/n^2), p=ad$p.value),
    lilliefors = list(D=unname(li$statistic), p=li$p.value),
    jarque_bera = list(JB=unname(jb$statistic), p=unname(jb$p.value)),
    dagostino_k2 = list(K2=if(is.null(dg)) NA else unname(dg$statistic["Chi2 | Omnibus"]), p=if(is.null(dg)) NA else unname(dg$p.value["Omnibus  Test"]),
                        Zskew=if(is.null(dg)) NA else unname(dg$statistic["Z3  | Skewness"]), Zkurt=if(is.null(dg)) NA else unname(dg$statistic["Z4  | Kurtosis"])))
  h <- if (is.na(step)) 0 else step/2; hascc <- !is.na(step)
  K <- length(cuts)
  # statistic vector, percentage points, normal share minus observed share:
  # ge_raw[1..K], le_raw[1..K], then (if the column has a step) ge_cc[1..K], le_cc[1..K]
  st <- function(dat, i) {
    y <- dat[i]; mm <- mean(y); ss <- sd(y); nn <- length(y)
    oge <- vapply(cuts, function(c) sum(y>=c), 0)/nn; ole <- vapply(cuts, function(c) sum(y<=c), 0)/nn
    r <- c(pnorm(cuts,mm,ss,lower.tail=FALSE)-oge, pnorm(cuts,mm,ss)-ole)
    if (hascc) r <- c(r, pnorm(cuts-h,mm,ss,lower.tail=FALSE)-oge, pnorm(cuts+h,mm,ss)-ole)
    100*r
  }
  set.seed(SEED, kind="Mersenne-Twister", normal.kind="Inversion", sample.kind="Rejection")
  b <- boot(x, st, R=R)
  # leave-one-out values, once for all statistics
  J <- t(vapply(seq_len(n), function(k) st(x, seq_len(n)[-k]), numeric(length(b$t0))))
  u <- (x-m)/s
  labs <- rep(c("ge_raw","le_raw", if(hascc) c("ge_cc","le_cc")), each=K)
  getci <- function(j, ci) {
    t <- b$t[,j]; t0 <- b$t0[j]; k <- (j-1) %% K + 1; lab <- labs[j]
    L <- mean(J[,j])-J[,j]                       # Efron & Tibshirani (1993) eq. 14.15, centred at the jackknife mean
    a <- sum(L^3)/(6*sum(L^2)^1.5); w <- qnorm(mean(t<t0))
    Lu <- t0-J[,j]; a_unc <- sum(Lu^3)/(6*sum(Lu^2)^1.5)  # what boot::empinf(type="jack") gives (centred at t0)
    pc <- safe(boot.ci(b, conf=.95, type="perc", index=j)$percent[4:5])
    bc <- safe(suppressWarnings(boot.ci(b, conf=.95, type="bca", index=j, L=L)$bca[4:5]))
    cc <- grepl("_cc", lab); ge <- grepl("^ge", lab)
    q <- if (cc) (if (ge) cuts[k]-h else cuts[k]+h) else cuts[k]; zq <- (q-m)/s
    IFn <- dnorm(zq)*(u+zq*(u^2-1)/2)            # influence of one point on P(X>=q) under the fitted normal
    IFo <- (if (ge) x>=cuts[k] else x<=cuts[k]); IF <- (if(ge) IFn else -IFn) - (IFo-mean(IFo))
    o <- list(est_pp=unname(t0), boot_se_pp=sd(t), boot_bias_pp=mean(t)-t0, delta_se_pp=100*sqrt(mean(IF^2)/n),
      percentile95=if(is.null(pc)) NULL else pc, bca95=if(is.null(bc)) NULL else bc, bca_z0=if (is.finite(w)) w else NA, bca_a=if(is.finite(a)) a else NA, bca_a_uncentred=if(is.finite(a_unc)) a_unc else NA,
      ties_t_eq_t0=sum(t==t0))
    if (n<=300 && lab=="ge_raw") { bd <- safe(suppressWarnings(boot.ci(b, conf=.95, type="bca", index=j)$bca[4:5])); o$bca95_boot_default_L_regression <- bd }
    o
  }
  cutout <- lapply(seq_len(K), function(k) {
    c0 <- cuts[k]; xg <- sum(x>=c0); xl <- sum(x<=c0); z <- (c0-m)/s
    cp <- function(k) as.numeric(binom.test(k,n)$conf.int); wi <- function(k) as.numeric(suppressWarnings(prop.test(k,n,correct=FALSE)$conf.int))
    nge <- pnorm(c0,m,s,lower.tail=FALSE); nle <- pnorm(c0,m,s)
    o <- list(cutoff=c0, z=z, count_ge=xg, count_le=xl, observed_ge=xg/n, observed_le=xl/n,
      clopper_pearson95_ge=cp(xg), clopper_pearson95_le=cp(xl), wilson95_ge=wi(xg), wilson95_le=wi(xl),
      normal_ge_raw=nge, normal_le_raw=nle, diff_pp_ge_raw=100*(nge-xg/n), diff_pp_le_raw=100*(nle-xl/n))
    if (hascc) { ngc <- pnorm(c0-h,m,s,lower.tail=FALSE); nlc <- pnorm(c0+h,m,s)
      o <- c(o, list(normal_ge_cc=ngc, normal_le_cc=nlc, diff_pp_ge_cc=100*(ngc-xg/n), diff_pp_le_cc=100*(nlc-xl/n))) }
    bl <- list(); for (j in which(((seq_along(labs)-1) %% K + 1)==k)) bl[[labs[j]]] <- getci(j)
    o$bootstrap_normal_minus_observed <- bl; o
  })
  res <- list(dataset=ds, column=col, step=if(hascc) step else NA, half_step=if(hascc) h else NA,
    R=list(version=R.version.string, boot=as.character(packageVersion("boot")), nortest=as.character(packageVersion("nortest")),
      tseries=as.character(packageVersion("tseries")), fBasics=as.character(packageVersion("fBasics")), e1071=as.character(packageVersion("e1071"))),
    bootstrap_settings=list(R=R, seed=SEED, rng="Mersenne-Twister / Inversion / Rejection", sim="ordinary", units="percentage points, normal minus observed",
      bca_L="jackknife, centred: mean(theta_(-i)) - theta_(-i)", quantile="boot:::norm.inter, rank (R+1)*alpha"),
    summary=list(n=n, missing=miss, min=min(x), max=max(x), distinct=length(unique(x)), mean=m, sd=s, sd_pop=sqrt(m2), median=median(x),
      skew_g1=g1, skew_G1=G1, exkurt_g2=g2, exkurt_G2=G2),
    tests=tests, cutoffs=cutout)
  writeLines(toJSON(res, auto_unbox=TRUE, digits=I(17), na="null", null="null"), file.path(raw, paste0(ds,".",col,".json")))
  cat(ds, col, n, "done\n")
}
for (r in seq_len(nrow(spec))) if (r %% part[2] == part[1] %% part[2]) with(spec[r,], one(dataset, column, step, c(c1,c2,c3,c4,c5)))
