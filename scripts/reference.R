#!/usr/bin/env Rscript
# Remakes the reference results of tests/reference with R: every NN-topic.json but
# 12-distributions.json (scripts/reference-distributions.py, 60-digit arithmetic)
# and 14-weak-library.json (points picked from the same arithmetic where common
# libraries fail). Generator vectors come from scripts/reference-random.py.
#
# Usage: Rscript scripts/reference.R [folder]
#   folder   where datasets/, nist-anova.json and rng-vectors.json lie and the
#            JSON files are written; tests/reference unless given.
# Made with R 4.2.2 and the packages loaded below at the versions every JSON
# names (Debian 12: r-base-core r-recommended r-cran-survival r-cran-cmprsk
# r-cran-etm r-cran-lme4 r-cran-lmertest r-cran-epi r-cran-jsonlite
# r-cran-geepack r-cran-sandwich r-cran-epitools r-cran-psych r-cran-quantreg).
# Each figure that has a published value or a second implementation is checked
# against it on the way; a failing check stops the script. Tests never need R.

args <- commandArgs(TRUE)
own <- sub("^--file=", "", grep("^--file=", commandArgs(FALSE), value = TRUE)[1])
here <- normalizePath(if (length(args)) args[1] else file.path(dirname(own), "..", "tests", "reference"))

## ============================================================ helpers: JSON writer and estimators that R has no exact call for
suppressPackageStartupMessages({
  library(stats); library(survival); library(cmprsk); library(etm); library(MASS); library(boot)
  library(nlme); library(lme4); library(lmerTest); library(geepack); library(sandwich)
  library(epitools); library(psych); library(Epi); library(quantreg); library(jsonlite)
})
options(digits = 15, warn = 1, contrasts = c("contr.treatment", "contr.poly"))
RNGkind("Mersenne-Twister", "Inversion", "Rejection")

## ---------------------------------------------------------------- JSON writer (15 to 17 significant digits)
A <- function(x) structure(list(x), class = "arr")          # force a JSON array
num1 <- function(x) {
  if (is.na(x)) return("null")
  if (is.infinite(x)) return(if (x > 0) "\"Infinity\"" else "\"-Infinity\"")
  if (is.integer(x) || (x == round(x) && abs(x) < 1e15)) return(sprintf("%.0f", x))
  rdig(x)
}
rdig <- function(x) { s <- sprintf("%.15g", x); if (as.numeric(s) != x) { s <- sprintf("%.16g", x); if (as.numeric(s) != x) s <- sprintf("%.17g", x) }; s }   # shortest of 15-17 digits that reads back to the same double
rtcol <- function(v) if (is.double(v) && is.null(attr(v, "class"))) ifelse(is.na(v), NA, vapply(v, function(z) if (is.na(z)) "" else if (is.infinite(z)) as.character(z) else if (z == round(z) && abs(z) < 1e15) sprintf("%.0f", z) else rdig(z), "")) else v
wcsv <- function(df, f, na = "") write.csv(as.data.frame(lapply(df, rtcol), check.names = FALSE), f, row.names = FALSE, quote = FALSE, na = na)
str1 <- function(s) if (is.na(s)) "null" else as.character(jsonlite::toJSON(s, auto_unbox = TRUE))
js <- function(x, ind = 0) {
  sp <- strrep(" ", ind + 1)
  if (inherits(x, "arr")) { v <- x[[1]]
    if (is.list(v)) return(paste0("[", paste(vapply(v, js, "", ind = ind + 1), collapse = ","), "]"))
    return(paste0("[", paste(vapply(seq_along(v), function(i) js(unname(v[i])), ""), collapse = ","), "]")) }
  if (is.null(x)) return("null")
  if (is.data.frame(x)) x <- lapply(as.list(x), A)
  if (is.factor(x)) x <- as.character(x)
  if (is.matrix(x)) return(paste0("[", paste(vapply(seq_len(nrow(x)), function(i) js(A(unname(x[i, ]))), ""), collapse = ","), "]"))
  if (is.list(x)) {
    if (is.null(names(x))) return(paste0("[", paste(vapply(x, js, "", ind = ind + 1), collapse = ","), "]"))
    return(paste0("{\n", paste0(sp, vapply(names(x), str1, ""), ": ", vapply(x, js, "", ind = ind + 1), collapse = ",\n"), "\n", strrep(" ", ind), "}"))
  }
  if (!is.null(names(x)) ) return(paste0("{", paste0(vapply(names(x), str1, ""), ": ", vapply(seq_along(x), function(i) js(unname(x[i])), ""), collapse = ", "), "}"))
  if (length(x) != 1) return(js(A(x)))
  if (is.logical(x)) return(if (is.na(x)) "null" else if (x) "true" else "false")
  if (is.numeric(x)) return(num1(x))
  str1(x)
}
.st <- new.env()
topic_begin <- function(topic, title) { .st$topic <- topic; .st$title <- title; .st$cases <- list() }
add <- function(id, estimand, data, expected, call = NULL, params = NULL, source, rel = 1e-9, abs = 1e-12,
                tol_over = NULL, checks = NULL, note = NULL) {
  if (id %in% vapply(.st$cases, function(z) z$id, "")) stop("duplicate id ", id)
  z <- list(id = id, estimand = estimand, dataset = data)
  if (!is.null(params)) z$params <- params
  if (!is.null(call)) z$call <- call
  z$expected <- expected
  z$tolerance <- c(list(rel = rel, abs = abs), if (!is.null(tol_over)) list(override = tol_over))
  z$source <- source
  if (!is.null(checks)) z$checks <- checks
  if (!is.null(note)) z$note <- note
  .st$cases[[length(.st$cases) + 1]] <- z
  invisible(expected)
}
versions <- function() {
  p <- c("survival","cmprsk","etm","MASS","boot","nlme","lme4","lmerTest","geepack","sandwich","epitools","psych","Epi","quantreg")
  c(list(R = R.version.string), setNames(lapply(p, function(q) as.character(packageVersion(q))), p))
}
topic_end <- function(dir) {
  o <- list(topic = .st$topic, title = .st$title, versions = versions(), count = length(.st$cases),
            cases = A(.st$cases))
  f <- file.path(dir, paste0(.st$topic, ".json")); writeLines(js(o), f, useBytes = TRUE)
  invisible(jsonlite::fromJSON(f, simplifyVector = FALSE))     # must parse
  cat(sprintf("%-34s %3d cases %8d bytes\n", basename(f), length(.st$cases), file.size(f)))
}
chk <- function(what, got, want, tol) {           # a check against a published or second-implementation figure
  ok <- all(abs(got - want) <= tol)
  if (!isTRUE(ok)) stop("CHECK FAILED: ", what, " got ", paste(signif(got, 10), collapse = " "), " want ", paste(want, collapse = " "))
  list(what = what, got = unname(as.numeric(got)), want = unname(as.numeric(want)), tol = tol, ok = TRUE)
}
root <- function(f, lo, hi, ...) {                # bisection to the last bit
  fl <- f(lo); fh <- f(hi); if (fl == 0) return(lo); if (fh == 0) return(hi); stopifnot(sign(fl) != sign(fh))
  for (i in 1:2000) { m <- (lo + hi)/2; if (m == lo || m == hi) break; fm <- f(m); if (fm == 0) return(m)
    if (sign(fm) == sign(fl)) { lo <- m; fl <- fm } else { hi <- m } }
  (lo + hi)/2 }

## ---------------------------------------------------------------- proportions
wilson <- function(x, n, conf = .95) { z <- qnorm(1 - (1 - conf)/2); p <- x/n
  c(estimate = p, lower = if (x == 0) 0 else (p + z^2/(2*n) - z*sqrt(p*(1-p)/n + z^2/(4*n^2)))/(1 + z^2/n),
    upper = if (x == n) 1 else (p + z^2/(2*n) + z*sqrt(p*(1-p)/n + z^2/(4*n^2)))/(1 + z^2/n)) }
clopper <- function(x, n, conf = .95) { a <- 1 - conf
  c(estimate = x/n, lower = if (x == 0) 0 else qbeta(a/2, x, n - x + 1), upper = if (x == n) 1 else qbeta(a/2, x + 1, n - x, lower.tail = FALSE)) }
newcombe <- function(x1, n1, x2, n2, conf = .95) { w1 <- wilson(x1, n1, conf); w2 <- wilson(x2, n2, conf); d <- x1/n1 - x2/n2
  c(estimate = d, lower = unname(d - sqrt((w1[1]-w1[2])^2 + (w2[3]-w2[1])^2)), upper = unname(d + sqrt((w1[3]-w1[1])^2 + (w2[1]-w2[2])^2))) }
rr_log <- function(x1, n1, x2, n2, conf = .95) { z <- qnorm(1 - (1-conf)/2); rr <- (x1/n1)/(x2/n2); se <- sqrt(1/x1 - 1/n1 + 1/x2 - 1/n2)
  c(estimate = rr, se_log = se, lower = exp(log(rr) - z*se), upper = exp(log(rr) + z*se)) }
or_wald <- function(a, b, c, d, conf = .95) { z <- qnorm(1 - (1-conf)/2); o <- (a*d)/(b*c); se <- sqrt(1/a+1/b+1/c+1/d)
  c(estimate = o, se_log = se, lower = exp(log(o) - z*se), upper = exp(log(o) + z*se)) }
# Fisher: conditional distribution of cell a given margins under odds ratio w (non-central hypergeometric), in logs
nch <- function(a, b, c, d) { m <- a + b; n <- c + d; k <- a + c; lo <- max(0, k - n); hi <- min(k, m); s <- lo:hi; list(s = s, lg = dhyper(s, m, n, k, log = TRUE), x = a) }
nchp <- function(h, w) { if (w == 0) return(as.numeric(h$s == min(h$s))); if (is.infinite(w)) return(as.numeric(h$s == max(h$s))); v <- h$lg + h$s*log(w); v <- exp(v - max(v)); v/sum(v) }
fisher2 <- function(a, b, c, d, conf = .95) {
  h <- nch(a, b, c, d); p0 <- nchp(h, 1); al <- 1 - conf; x <- a
  px <- p0[h$s == x]; p <- sum(p0[p0 <= px*(1 + 1e-7)])                       # R's rule with relative slack 1e-7
  up <- function(w) sum(nchp(h, w)[h$s >= x]); dn <- function(w) sum(nchp(h, w)[h$s <= x])
  lw <- if (x == min(h$s)) 0 else exp(root(function(l) up(exp(l)) - al/2, -60, 60))
  hg <- if (x == max(h$s)) Inf else exp(root(function(l) dn(exp(l)) - al/2, -60, 60))
  est <- if (x == min(h$s)) 0 else if (x == max(h$s)) Inf else exp(root(function(l) sum(h$s*nchp(h, exp(l))) - x, -60, 60))
  midl <- min(1, 2*min(sum(p0[h$s > x]) + px/2, sum(p0[h$s < x]) + px/2))
  upm <- function(w) { q <- nchp(h, w); sum(q[h$s > x]) + q[h$s == x]/2 }; dnm <- function(w) { q <- nchp(h, w); sum(q[h$s < x]) + q[h$s == x]/2 }
  lwm <- if (x == min(h$s)) 0 else exp(root(function(l) upm(exp(l)) - al/2, -60, 60))
  hgm <- if (x == max(h$s)) Inf else exp(root(function(l) dnm(exp(l)) - al/2, -60, 60))
  c(p_two_sided_minlike = min(1, p), p_less = sum(p0[h$s <= x]), p_greater = sum(p0[h$s >= x]), p_midp_two_sided = midl,
    or_conditional_mle = est, or_exact_lower = lw, or_exact_upper = hg, or_midp_lower = lwm, or_midp_upper = hgm) }
pearson22 <- function(a, b, c, d) { m <- matrix(c(a, b, c, d), 2, byrow = TRUE); u <- suppressWarnings(chisq.test(m, correct = FALSE)); y <- suppressWarnings(chisq.test(m, correct = TRUE))
  c(chisq = unname(u$statistic), p = u$p.value, chisq_yates = unname(y$statistic), p_yates = y$p.value) }
# stratified 2x2: columns a (exposed cases) b (exposed non-cases) c (unexposed cases) d (unexposed non-cases)
mh <- function(T, conf = .95) { z <- qnorm(1 - (1-conf)/2); a <- T[,1]; b <- T[,2]; c <- T[,3]; d <- T[,4]; n <- a+b+c+d
  k <- n > 0; a <- a[k]; b <- b[k]; c <- c[k]; d <- d[k]; n <- n[k]
  R <- a*d/n; S <- b*c/n; or <- sum(R)/sum(S); P <- (a+d)/n; Q <- (b+c)/n
  vlo <- sum(P*R)/(2*sum(R)^2) + sum(P*S + Q*R)/(2*sum(R)*sum(S)) + sum(Q*S)/(2*sum(S)^2)
  n1 <- a+b; n0 <- c+d; m1 <- a+c; m0 <- b+d
  E <- n1*m1/n; V <- ifelse(n > 1, n1*n0*m1*m0/(n^2*(n-1)), 0)
  cs <- (sum(a) - sum(E))^2/sum(V); csc <- max(0, abs(sum(a) - sum(E)) - 0.5)^2/sum(V)
  rr <- sum(a*n0/n)/sum(c*n1/n); vlr <- sum((m1*n1*n0 - a*c*n)/n^2)/(sum(a*n0/n)*sum(c*n1/n))
  W <- n1*n0/n; rd <- sum((a*n0 - c*n1)/n)/sum(W)
  Pk <- (n1^2*c - n0^2*a + n1*n0*(n0-n1)/2)/n^2; Qk <- (a*(n0-c) + c*(n1-a))/(2*n)      # Sato 1989
  vrd <- (rd*sum(Pk) + sum(Qk))/sum(W)^2
  # Breslow-Day with and without Tarone
  bd <- 0; Ea <- Va <- numeric(length(a))
  for (i in seq_along(a)) { if (abs(or - 1) < 1e-14) Ai <- m1[i]*n1[i]/n[i] else { q2 <- 1 - or; q1 <- n0[i] - m1[i] + or*(n1[i] + m1[i]); q0 <- -or*n1[i]*m1[i]
      dd <- sqrt(q1^2 - 4*q2*q0); rts <- c((-q1 + dd)/(2*q2), (-q1 - dd)/(2*q2)); Ai <- rts[rts >= max(0, m1[i]-n0[i]) - 1e-9 & rts <= min(n1[i], m1[i]) + 1e-9][1] }
    Ea[i] <- Ai; Va[i] <- 1/(1/Ai + 1/(n1[i]-Ai) + 1/(m1[i]-Ai) + 1/(n0[i]-m1[i]+Ai)) }
  bd <- sum((a-Ea)^2/Va); tar <- bd - (sum(a)-sum(Ea))^2/sum(Va); df <- length(a) - 1
  c(cmh = cs, cmh_p = pchisq(cs, 1, lower.tail = FALSE), cmh_corrected = csc, cmh_corrected_p = pchisq(csc, 1, lower.tail = FALSE),
    or_mh = or, or_se_log = sqrt(vlo), or_lower = exp(log(or) - z*sqrt(vlo)), or_upper = exp(log(or) + z*sqrt(vlo)),
    rr_mh = rr, rr_se_log = sqrt(vlr), rr_lower = exp(log(rr) - z*sqrt(vlr)), rr_upper = exp(log(rr) + z*sqrt(vlr)),
    rd_mh = rd, rd_se = sqrt(vrd), rd_lower = rd - z*sqrt(vrd), rd_upper = rd + z*sqrt(vrd),
    breslow_day = bd, breslow_day_tarone = tar, bd_df = df, bd_p = pchisq(bd, df, lower.tail = FALSE), tarone_p = pchisq(tar, df, lower.tail = FALSE)) }

## ---------------------------------------------------------------- rates
garwood <- function(x, T = 1, conf = .95, per = 1) { a <- 1 - conf
  c(rate = x/T*per, lower = (if (x == 0) 0 else qgamma(a/2, x))/T*per, upper = qgamma(a/2, x + 1, lower.tail = FALSE)/T*per) }
midp_poisson <- function(x, T = 1, conf = .95, per = 1) { a <- 1 - conf
  lo <- if (x == 0) 0 else root(function(m) ppois(x, m, lower.tail = FALSE) + dpois(x, m)/2 - a/2, 1e-12, x + 1)
  hi <- root(function(m) ppois(x - 1, m) + dpois(x, m)/2 - a/2, max(x, 1e-9), 10*(x + 10))
  c(lower = lo/T*per, upper = hi/T*per) }
rate_ratio <- function(x1, T1, x2, T2, conf = .95) { z <- qnorm(1 - (1-conf)/2); a <- 1 - conf; n <- x1 + x2; rr <- (x1/T1)/(x2/T2); se <- sqrt(1/x1 + 1/x2)
  tr <- function(p) if (p >= 1) Inf else (p/(1-p))*T2/T1
  cp <- if (n == 0) c(NA, 0, 1) else clopper(x1, n, conf); p0 <- T1/(T1+T2)
  ml <- if (n == 0 || x1 == 0) 0 else root(function(p) pbinom(x1, n, p, lower.tail = FALSE) + dbinom(x1, n, p)/2 - a/2, 1e-300, 1 - 1e-16)
  mu <- if (n == 0 || x1 == n) 1 else root(function(p) pbinom(x1 - 1, n, p) + dbinom(x1, n, p)/2 - a/2, 1e-300, 1 - 1e-16)
  if (x1 == n && n > 0) mu <- 1
  lt <- pbinom(x1, n, p0); ut <- pbinom(x1 - 1, n, p0, lower.tail = FALSE); px <- dbinom(x1, n, p0)
  dd <- dbinom(0:n, n, p0); pml <- sum(dd[dd <= px*(1 + 1e-7)])
  rd <- x1/T1 - x2/T2; serd <- sqrt(x1/T1^2 + x2/T2^2)
  c(ratio = rr, exact_lower = tr(cp[[2]]), exact_upper = tr(cp[[3]]), midp_lower = tr(ml), midp_upper = tr(mu),
    p_exact_central = min(1, 2*min(lt, ut)), p_exact_minlike = min(1, pml), p_midp = min(1, 2*min(lt - px/2, ut - px/2)),
    se_log = se, wald_lower = if (x1 > 0 && x2 > 0) exp(log(rr) - z*se) else NA, wald_upper = if (x1 > 0 && x2 > 0) exp(log(rr) + z*se) else NA,
    p_wald = if (x1 > 0 && x2 > 0) 2*pnorm(-abs(log(rr))/se) else NA,
    diff = rd, diff_se = serd, diff_lower = rd - z*serd, diff_upper = rd + z*serd) }

## ---------------------------------------------------------------- Kaplan-Meier
km_at <- function(time, status, at, start = NULL, weights = NULL) {   # value of the curve at given times, three CI kinds
  S <- if (is.null(start)) Surv(time, status) else Surv(start, time, status)
  f <- survfit(S ~ 1, conf.type = "log-log"); fl <- survfit(S ~ 1, conf.type = "log"); fp <- survfit(S ~ 1, conf.type = "plain")
  s <- summary(f, times = at, extend = TRUE); sl <- summary(fl, times = at, extend = TRUE); sp <- summary(fp, times = at, extend = TRUE)
  list(time = A(at), n_risk = A(s$n.risk), surv = A(s$surv), se_greenwood = A(s$std.err), loglog_lower = A(s$lower), loglog_upper = A(s$upper),
       log_lower = A(sl$lower), log_upper = A(sl$upper), plain_lower = A(sp$lower), plain_upper = A(sp$upper)) }
km_steps <- function(time, status, start = NULL) {                    # every event time
  S <- if (is.null(start)) Surv(time, status) else Surv(start, time, status)
  f <- survfit(S ~ 1, conf.type = "log-log"); fl <- survfit(S ~ 1, conf.type = "log"); e <- f$n.event > 0
  list(time = A(f$time[e]), n_risk = A(f$n.risk[e]), n_event = A(f$n.event[e]), surv = A(f$surv[e]), se_greenwood = A((f$surv*f$std.err)[e]),
       loglog_lower = A(f$lower[e]), loglog_upper = A(f$upper[e]), log_lower = A(fl$lower[e]), log_upper = A(fl$upper[e]), nelson_aalen = A(f$cumhaz[e]), nelson_aalen_se = A(f$std.chaz[e])) }
km_q <- function(time, status, p = c(.25, .5, .75), start = NULL) {
  S <- if (is.null(start)) Surv(time, status) else Surv(start, time, status)
  f <- quantile(survfit(S ~ 1, conf.type = "log-log"), p); fl <- quantile(survfit(S ~ 1, conf.type = "log"), p)
  list(p = A(p), time = A(unname(f$quantile)), loglog_lower = A(unname(f$lower)), loglog_upper = A(unname(f$upper)), log_lower = A(unname(fl$lower)), log_upper = A(unname(fl$upper))) }
rmst <- function(time, status, tau, conf = .95) {
  f <- survfit(Surv(time, status) ~ 1); k <- f$n.event > 0 & f$time <= tau; t <- f$time[k]; d <- f$n.event[k]; n <- f$n.risk[k]; s <- f$surv[k]
  g <- c(0, t, tau); ss <- c(1, s); ar <- diff(g)*ss; est <- sum(ar); A_i <- rev(cumsum(rev(ar)))[-1]       # area right of each event time
  v <- sum(ifelse(n > d, A_i^2*d/(n*(n-d)), 0)); z <- qnorm(1 - (1-conf)/2)
  c(tau = tau, rmst = est, se = sqrt(v), lower = est - z*sqrt(v), upper = est + z*sqrt(v)) }
logrank <- function(time, status, group, strata = NULL, rho = 0) { st__ <- strata; strata <- survival::strata
  g <- factor(group); fit <- if (is.null(st__)) survdiff(Surv(time, status) ~ g, rho = rho) else survdiff(Surv(time, status) ~ g + strata(st__), rho = rho)
  o <- if (is.matrix(fit$obs)) rowSums(fit$obs) else fit$obs; e <- if (is.matrix(fit$exp)) rowSums(fit$exp) else fit$exp
  df <- sum(e > 0) - 1; sc <- seq_along(levels(g)); oe <- o - e; tr <- sum(sc*oe)^2/as.numeric(t(sc) %*% fit$var %*% sc)
  list(groups = A(levels(g)), n = A(as.numeric(table(g))), observed = A(unname(o)), expected = A(unname(e)), variance = unname(fit$var), chisq = fit$chisq, df = df,
       p = pchisq(fit$chisq, df, lower.tail = FALSE), trend_chisq_scores_1_to_k = tr, trend_p = pchisq(tr, 1, lower.tail = FALSE)) }

## ---------------------------------------------------------------- competing risks (Aalen-Johansen, single transient state)
cif <- function(time, cause, at, k = 1, start = NULL, conf = .95) {      # cause 0 = censored
  z <- qnorm(1 - (1-conf)/2); ut <- sort(unique(time[cause != 0])); o <- order(time); n <- length(time)
  nr <- sapply(ut, function(u) if (is.null(start)) sum(time >= u) else sum(time >= u & start < u)); d1 <- sapply(ut, function(u) sum(time == u & cause == k)); d <- sapply(ut, function(u) sum(time == u & cause != 0))
  S <- cumprod(1 - d/nr); Sm <- c(1, S)[seq_along(S)]; F <- cumsum(Sm*d1/nr)
  # variance: multinomial (Greenwood-type) increments; equals the delta form of Marubini & Valsecchi 1995
  m <- t(sapply(at, function(u) { i <- which(ut <= u); if (!length(i)) return(c(0, 0)); Ft <- F[max(i)]
    a <- Ft - F[i]; ni <- nr[i]; di <- d[i]; d1i <- d1[i]; s0 <- Sm[i]
    c(Ft, sum(ifelse(ni > di, a^2*di/(ni*(ni-di)), 0)) + sum(s0^2*(ni-d1i)*d1i/ni^3) - 2*sum(a*s0*d1i/ni^2)) }))
  list(est = m[,1], var = m[,2]) }
cif_ci <- function(F, v, conf = .95) { z <- qnorm(1 - (1-conf)/2); e <- z*sqrt(v)/(F*log(F)); lo <- F^exp(-e); hi <- F^exp(e)
  lo[F == 0] <- 0; hi[F == 0] <- 0; list(lower = pmin(lo, hi), upper = pmax(lo, hi)) }

## ---------------------------------------------------------------- interval-censored NPMLE, interval (L,R] ; exact L==R allowed
turnbull_sets <- function(L, R) {
  # order points so that R=v comes before L=v for (L,R]; an exact time v acts as (v-,v]
  ex <- L == R
  pt <- rbind(data.frame(v = L, typ = ifelse(ex, 0, 2), isL = TRUE), data.frame(v = R, typ = 1, isL = FALSE))
  # at value v: exact-left (0) < any right (1) < open-left (2)
  pt <- unique(pt[order(pt$v, pt$typ), ]); n <- nrow(pt); k <- which(pt$isL[-n] & !pt$isL[-1])
  data.frame(q = pt$v[k], qt = pt$typ[k], p = pt$v[k+1]) }
npmle <- function(L, R, w = rep(1, length(L)), tol = 1e-13) {
  s <- turnbull_sets(L, R); m <- nrow(s); n <- length(L); ex <- L == R
  M <- matrix(0, n, m)
  for (j in 1:m) { if (s$qt[j] == 0) M[, j] <- (L < s$q[j] & R >= s$q[j]) | (ex & L == s$q[j]) else M[, j] <- (!ex) & L <= s$q[j] & R >= s$p[j] }
  W <- sum(w); p <- rep(1/m, m); ll <- function(p) sum(w*log(M %*% p))
  em <- function(p) { f <- as.vector(M %*% p); p*as.vector(crossprod(M, w/f))/W }
  for (it in 1:3000) p <- em(p)
  act <- p > 1e-9; p[!act] <- 0; p <- p/sum(p)
  for (outer in 1:200) {
    for (it in 1:200) {                                             # Newton on the support, sum-to-one by Lagrange; gradient/hessian of sum w log f - W(sum p -1)
      B <- M[, act, drop = FALSE]; f <- as.vector(B %*% p[act]); g <- as.vector(crossprod(B, w/f)) - W
      H <- crossprod(B*(sqrt(w)/f)); d <- tryCatch(solve(H, g), error = function(e) MASS::ginv(H) %*% g); d <- as.vector(d)
      st <- 1; q <- p[act] + d; if (any(q < 0)) { st <- min((p[act]/-d)[d < 0 & q < 0])*0.9999 }
      old <- p[act]; p[act] <- p[act] + st*d; if (max(abs(p[act] - old)) < 1e-16) break
      if (any(p[act] < 1e-11)) { z <- which(act)[p[act] < 1e-11]; p[z] <- 0; act[z] <- FALSE } }
    p <- p/sum(p); f <- as.vector(M %*% p); g <- as.vector(crossprod(M, w/f)); j <- which.max(g)
    if (g[j] <= W*(1 + tol)) break
    if (!act[j]) { act[j] <- TRUE; p[j] <- 1e-6; p <- p/sum(p) } else { for (it in 1:50) p <- em(p) } }
  f <- as.vector(M %*% p); g <- as.vector(crossprod(M, w/f))
  B <- M[, p > 0, drop = FALSE]
  list(sets = s, p = p, loglik = sum(w*log(f)), kkt_gap = (max(g) - W)/W, kkt_support = max(abs(g[p > 1e-8] - W))/W, unique = qr(B)$rank == ncol(B)) }
npmle_out <- function(L, R, w = rep(1, length(L)), at = NULL) {
  o <- npmle(L, R, w); k <- o$p > 1e-10; S <- 1 - cumsum(o$p)
  stopifnot(o$kkt_gap < 1e-10)
  r <- list(left = A(o$sets$q[k]), right = A(o$sets$p[k]), exact_point = A(o$sets$qt[k] == 0), mass = A(o$p[k]), n_candidate_sets = nrow(o$sets), loglik = o$loglik, kkt_gap = max(0, o$kkt_gap), unique = o$unique)
  if (!is.null(at)) r$survival_at <- list(time = A(at), lower = A(sapply(at, function(u) 1 - sum(o$p[o$sets$q < u | (o$sets$qt == 0 & o$sets$q <= u)]))), upper = A(sapply(at, function(u) 1 - sum(o$p[o$sets$p <= u]))))
  r }

## ---------------------------------------------------------------- interval-censored parametric AFT / PH fit, Newton with numeric check
ic_surv <- function(L, R) { l <- ifelse(L <= 0, NA, L); r <- ifelse(is.infinite(R), NA, R); Surv(l, r, type = "interval2") }
ic_fit <- function(L, R, X = NULL, dist = c("weibull", "exponential"), names = NULL) {
  dist <- match.arg(dist); d <- data.frame(L = L, R = R); y <- ic_surv(L, R)
  f <- if (is.null(X)) survreg(y ~ 1, dist = dist, control = list(rel.tolerance = 1e-15, maxiter = 200)) else survreg(y ~ X, dist = dist, control = list(rel.tolerance = 1e-15, maxiter = 200))
  # second implementation: direct log-likelihood on (mu, beta, log sigma), Newton with complex-free analytic gradient
  Z <- if (is.null(X)) matrix(1, length(L), 1) else cbind(1, as.matrix(X)); q <- ncol(Z)
  S <- function(t, mu, s) ifelse(t <= 0, 1, ifelse(is.infinite(t), 0, exp(-exp((log(t) - mu)/s))))
  nll <- function(th) { s <- if (dist == "weibull") exp(th[q+1]) else 1; mu <- as.vector(Z %*% th[1:q])
    ex <- L == R; v <- numeric(length(L)); v[!ex] <- log(S(L, mu, s) - S(R, mu, s))[!ex]
    if (any(ex)) { u <- (log(L) - mu)/s; v[ex] <- (u - exp(u) - log(s) - log(L))[ex] }
    -sum(v) }
  th <- c(coef(f), if (dist == "weibull") log(f$scale)); o <- optim(th, nll, method = "BFGS", control = list(reltol = 1e-16, maxit = 500))
  stopifnot(abs(o$value + f$loglik[length(f$loglik)]) < 1e-6 || any(L == R))   # survreg's loglik of exact times is of time (it adds the log-time Jacobian)
  z <- qnorm(.975); V <- vcov(f); k <- length(coef(f)); sig <- f$scale; nm <- if (k == 1) character(0) else if (is.null(names)) paste0("x", seq_len(k-1)) else names
  r <- list(dist = dist, intercept = unname(coef(f)[1]), loglik = -nll(th), scale_sigma = sig, weibull_shape = 1/sig, baseline_scale_lambda = unname(exp(coef(f)[1])))
  if (k > 1) r$aft_coef <- setNames(as.list(unname(coef(f)[-1])), nm); r$vcov_intercept_coef_logsigma <- unname(V)
  r$se <- sqrt(diag(unname(V)))
  if (k > 1) { lh <- -coef(f)[-1]/sig; gr <- lapply(2:k, function(j) { g <- numeric(nrow(V)); g[j] <- -1/sig; if (dist == "weibull") g[nrow(V)] <- coef(f)[j]/sig; g })
    seh <- sapply(gr, function(g) sqrt(as.numeric(t(g) %*% V %*% g)))
    r$log_hr <- setNames(as.list(unname(lh)), nm); r$log_hr_se <- setNames(as.list(unname(seh)), nm); r$hr <- setNames(as.list(unname(exp(lh))), nm)
    r$hr_lower <- setNames(as.list(unname(exp(lh - z*seh))), nm); r$hr_upper <- setNames(as.list(unname(exp(lh + z*seh))), nm)
    f0 <- survreg(y ~ 1, dist = dist, control = list(rel.tolerance = 1e-15, maxiter = 200)); lr <- 2*(f$loglik[2] - f0$loglik[length(f0$loglik)]); r$lrt_vs_null <- c(chisq = lr, df = k-1, p = pchisq(lr, k-1, lower.tail = FALSE)) }
  attr(r, "fit") <- f; r }
strip <- function(r) { attr(r, "fit") <- NULL; r }

## ---------------------------------------------------------------- Cox
cox_out <- function(f, zph = TRUE, at = NULL, newdata = NULL) {
  z <- qnorm(.975); b <- coef(f); rob <- !is.null(f$naive.var); V <- if (rob) f$naive.var else f$var; se <- sqrt(diag(V)); s <- summary(f)
  r <- list(n = f$n, n_event = f$nevent, coef = as.list(b), se = setNames(as.list(se), names(b)), vcov = unname(V), hr = as.list(exp(b)),
            hr_lower = setNames(as.list(exp(b - z*se)), names(b)), hr_upper = setNames(as.list(exp(b + z*se)), names(b)),
            loglik_null = f$loglik[1], loglik = f$loglik[2])
  lr <- 2*diff(f$loglik); df <- length(b); wt <- as.numeric(t(b) %*% solve(V) %*% b); sc <- f$score
  r$lrt <- c(chisq = lr, df = df, p = pchisq(lr, df, lower.tail = FALSE)); r$wald <- c(chisq = wt, df = df, p = pchisq(wt, df, lower.tail = FALSE)); r$score <- c(chisq = sc, df = df, p = pchisq(sc, df, lower.tail = FALSE))
  if (rob) { sr <- sqrt(diag(f$var)); r$robust_se <- setNames(as.list(sr), names(b)); r$robust_vcov <- unname(f$var); r$robust_hr_lower <- setNames(as.list(exp(b - z*sr)), names(b)); r$robust_hr_upper <- setNames(as.list(exp(b + z*sr)), names(b)) 
    wr <- as.numeric(t(b) %*% solve(f$var) %*% b); r$robust_wald <- c(chisq = wr, df = df, p = pchisq(wr, df, lower.tail = FALSE)) }
  if (zph) { r$ph_test_score <- lapply(setNames(nm = c("km", "identity", "rank", "log")), function(tr) { q <- cox.zph(f, transform = tr, terms = FALSE)$table; list(rows = A(rownames(q)), chisq = A(unname(q[,1])), df = A(unname(q[,2])), p = A(unname(q[,3]))) })
    r$ph_test_classic <- lapply(setNames(nm = c("km", "identity", "rank", "log")), function(tr) zph_classic(f, tr)) }
  if (!is.null(at)) { h <- basehaz(f, centered = FALSE); if (is.null(h$strata)) r$baseline_cumhaz_x0 <- list(time = A(at), cumhaz = A(sapply(at, function(u) { k <- h$time <= u; if (any(k)) max(h$hazard[k]) else 0 }))) }
  if (!is.null(newdata)) { sf <- survfit(f, newdata = newdata, conf.type = "log-log"); q <- summary(sf, times = at, extend = TRUE); r$predicted <- list(newdata = as.list(newdata), time = A(at), surv = A(as.vector(q$surv)), se = A(as.vector(q$std.err)), loglog_lower = A(as.vector(q$lower)), loglog_upper = A(as.vector(q$upper))) }
  r }
# Grambsch & Therneau 1994 approximation (survival < 3.0): scaled Schoenfeld residuals, average variance
zph_classic <- function(f, transform) {
  sr <- resid(f, "schoenfeld"); sr <- as.matrix(sr); V <- if (!is.null(f$naive.var)) f$naive.var else f$var; tt <- as.numeric(if (is.null(rownames(sr))) names(resid(f, "schoenfeld")) else rownames(sr))
  nd <- nrow(sr); g <- switch(transform, identity = tt, rank = rank(tt), log = log(tt), km = { y <- f$y; if (is.null(y)) y <- model.response(model.frame(f)); kf <- survfit(y ~ 1, timefix = FALSE); kf2 <- c(1, kf$surv); approx(c(0, kf$time), 1 - kf2, tt, method = "constant", f = 0)$y; 
      e <- kf$n.event > 0; ut <- kf$time[e]; Sl <- c(1, kf$surv[e])[seq_along(ut)]; 1 - Sl[match(tt, ut)] })
  if (any(!is.finite(g))) return(NULL)
  gc <- g - mean(g); test <- as.vector(gc %*% sr); sc <- sr %*% V*nd
  ch <- as.vector((gc %*% sc)^2/(diag(V)*nd*sum(gc^2))); gl <- as.numeric(test %*% V %*% test)*nd/sum(gc^2)
  rho <- apply(sc, 2, function(u) cor(g, u)); df <- length(coef(f))
  list(rows = A(c(names(coef(f)), "GLOBAL")), rho = A(c(rho, NA)), chisq = A(c(ch, gl)), p = A(c(pchisq(ch, 1, lower.tail = FALSE), pchisq(gl, df, lower.tail = FALSE)))) }

## ---------------------------------------------------------------- linear mixed model, random intercept and slope: exact REML/ML by scoring on the analytic score
lmm_exact <- function(y, X, Z, id, REML = TRUE, start, slope = TRUE, maxit = 200) {
  id <- factor(id, levels = unique(id)); n <- length(y); p <- ncol(X); q <- ncol(Z)
  idx <- split(seq_len(n), id); ones <- outer(as.integer(id), as.integer(id), "==")
  bas <- list(); nm <- c()
  for (i in 1:q) for (j in 1:i) { B <- if (i == j) Z[,i] %o% Z[,i] else Z[,i] %o% Z[,j] + Z[,j] %o% Z[,i]; bas[[length(bas)+1]] <- B*ones; nm <- c(nm, paste0("g", i, j)) }
  bas[[length(bas)+1]] <- diag(n); nm <- c(nm, "sigma2"); th <- start; lp <- NULL
  for (it in 1:maxit) { V <- Reduce(`+`, Map(`*`, bas, th)); C <- chol(V); Vi <- chol2inv(C); XV <- crossprod(X, Vi); A0 <- XV %*% X; Ai <- solve(A0); P <- Vi - crossprod(XV, Ai %*% XV); Py <- P %*% y
    ll <- -sum(log(diag(C))) - (if (REML) as.numeric(determinant(A0)$modulus)/2 else 0) - as.numeric(crossprod(y, Py))/2 - (n - (if (REML) p else 0))/2*log(2*pi)
    Q <- if (REML) P else Vi; QB <- lapply(bas, function(B) Q %*% B)
    sc <- sapply(seq_along(bas), function(k) -0.5*sum(diag(QB[[k]])) + 0.5*as.numeric(crossprod(Py, bas[[k]] %*% Py)))
    BPy <- sapply(bas, function(B) B %*% Py); AI <- 0.5*crossprod(BPy, P %*% BPy)
    FI <- outer(seq_along(bas), seq_along(bas), Vectorize(function(a, b) 0.5*sum(QB[[a]]*t(QB[[b]]))))
    d <- solve(if (it < 6) FI else AI, sc); st <- 1; ok <- function(t) { G <- matrix(0, q, q); k <- 0; for (i in 1:q) for (j in 1:i) { k <- k+1; G[i,j] <- G[j,i] <- t[k] }; t[length(t)] > 0 && all(eigen(G, only.values = TRUE)$values > 0) }
    while (!ok(th + st*d)) st <- st/2
    thn <- th + st*d; if (max(abs(thn - th)/pmax(1e-8, abs(th))) < 1e-13) { th <- thn; break }; th <- thn }
  V <- Reduce(`+`, Map(`*`, bas, th)); Vi <- chol2inv(chol(V)); XV <- crossprod(X, Vi); Ai <- solve(XV %*% X); b <- as.vector(Ai %*% XV %*% y)
  G <- matrix(0, q, q); k <- 0; for (i in 1:q) for (j in 1:i) { k <- k+1; G[i,j] <- G[j,i] <- th[k] }
  re <- t(sapply(levels(id), function(l) { r <- idx[[l]]; as.vector(G %*% t(Z[r, , drop = FALSE]) %*% (Vi[r, r] %*% (y[r] - X[r, , drop = FALSE] %*% b))) })); if (q == 1) re <- t(re)
  list(theta = setNames(th, nm), beta = b, vcov = Ai, G = G, sigma2 = th[[length(th)]], loglik = ll, ranef = re, iter = it, score = max(abs(sc))) }
lmm_out <- function(formula, data, id, X, Z, REML = TRUE, full = TRUE, satt = TRUE) {
  f <- lme4::lmer(formula, data, REML = REML, control = lme4::lmerControl(optimizer = "nloptwrap", optCtrl = list(xtol_abs = 1e-10, ftol_abs = 1e-12, maxeval = 5000)))
  vc <- as.data.frame(lme4::VarCorr(f)); G0 <- as.matrix(lme4::VarCorr(f)[[1]]); y <- model.response(model.frame(f)); q <- ncol(Z)
  st <- c(); for (i in 1:q) for (j in 1:i) st <- c(st, G0[i, j]); st <- c(st, sigma(f)^2)
  e <- lmm_exact(y, X, Z, id, REML, st); nm <- names(fixef(f))
  z <- qnorm(.975); se <- sqrt(diag(e$vcov))
  r <- list(reml = REML, loglik = e$loglik, deviance_minus2loglik = -2*e$loglik, fixed = setNames(as.list(e$beta), nm), se = setNames(as.list(se), nm), vcov_fixed = unname(e$vcov),
            wald_lower = setNames(as.list(e$beta - z*se), nm), wald_upper = setNames(as.list(e$beta + z*se), nm), G = unname(e$G), residual_variance = e$sigma2)
  if (q == 2) r$correlation <- e$G[1,2]/sqrt(e$G[1,1]*e$G[2,2])
  r$blup <- list(id = A(as.character(unique(id))), intercept = A(unname(e$ranef[,1]))); if (q == 2) r$blup$slope <- A(unname(e$ranef[,2]))
  if (satt) { g <- suppressMessages(lmerTest::lmer(formula, data, REML = REML, control = lme4::lmerControl(optimizer = "nloptwrap", optCtrl = list(xtol_abs = 1e-10, ftol_abs = 1e-12, maxeval = 5000)))); q2 <- coef(summary(g)); r$satterthwaite_df <- setNames(as.list(unname(q2[, "df"])), nm) }
  attr(r, "lme4_dev") <- c(lme4 = -2*as.numeric(logLik(f)), exact = -2*e$loglik, score = e$score, iter = e$iter); r }

## ---------------------------------------------------------------- Theil-Sen
theil_sen <- function(x, y, conf = .95) {
  ij <- combn(length(x), 2); dx <- x[ij[2,]] - x[ij[1,]]; dy <- y[ij[2,]] - y[ij[1,]]; s <- sort((dy/dx)[dx != 0]); N <- length(s)
  b <- median(s); n <- length(x); z <- qnorm(1 - (1-conf)/2)
  S <- sum(sign(dx)*sign(dy)); tx <- table(x); ty <- table(y)
  v0 <- n*(n-1)*(2*n+5); vt <- sum(tx*(tx-1)*(2*tx+5)); vu <- sum(ty*(ty-1)*(2*ty+5))
  v <- (v0 - vt - vu)/18 + sum(tx*(tx-1))*sum(ty*(ty-1))/(2*n*(n-1)) + (if (n > 2) sum(tx*(tx-1)*(tx-2))*sum(ty*(ty-1)*(ty-2))/(9*n*(n-1)*(n-2)) else 0)
  C <- z*sqrt(v); r1 <- (N - C)/2; r2 <- (N + C)/2
  # Sen 1968 / Gilbert 1987: limits are the M1-th and (M2+1)-th ordered slopes, linear interpolation between order statistics
  at <- function(r) { if (r < 1) return(s[1]); if (r > N) return(s[N]); lo <- floor(r); hi <- ceiling(r); s[lo] + (r - lo)*(s[hi] - s[lo]) }
  m1 <- floor(r1); m2 <- floor(r2) + 1      # integer rule
  sg <- sqrt(v); zz <- if (S > 0) (S-1)/sg else if (S < 0) (S+1)/sg else 0
  c(slope = b, n_slopes = N, intercept_median_residual = median(y - b*x), intercept_median_medians = median(y) - b*median(x), kendall_S = S, var_S_tie_corrected = v, C_alpha = C,
    rank_lower = r1, rank_upper = r2 + 1, lower_interpolated = at(r1), upper_interpolated = at(r2 + 1), mk_z = zz, mk_p = 2*pnorm(-abs(zz))) }

## ---------------------------------------------------------------- reliability
bland_altman <- function(a, b, conf = .95) { d <- a - b; n <- length(d); m <- mean(d); s <- sd(d); z <- qnorm(.975); t <- qt(1 - (1-conf)/2, n-1); se <- s/sqrt(n); sel <- s*sqrt(1/n + z^2/(2*(n-1))); sel86 <- sqrt(3*s^2/n)
  # Carkeet 2015 exact two-sided-each-limit CI: lower/upper noncentral t
  kl <- qt((1-conf)/2, n-1, ncp = z*sqrt(n))/sqrt(n); ku <- qt(1-(1-conf)/2, n-1, ncp = z*sqrt(n))/sqrt(n)
  lo <- m - z*s; hi <- m + z*s
  c(n = n, bias = m, sd_diff = s, bias_se = se, bias_lower = m - t*se, bias_upper = m + t*se, loa_lower = lo, loa_upper = hi, loa_se = sel,
    loa_lower_ci_lo = lo - t*sel, loa_lower_ci_hi = lo + t*sel, loa_upper_ci_lo = hi - t*sel, loa_upper_ci_hi = hi + t*sel,
    loa_se_1986_approx = sel86, exact_loa_lower_ci_lo = m - ku*s, exact_loa_lower_ci_hi = m - kl*s, exact_loa_upper_ci_lo = m + kl*s, exact_loa_upper_ci_hi = m + ku*s,
    prop_bias_slope = unname(coef(lm(d ~ I((a+b)/2)))[2]), corr_diff_mean = cor(d, (a+b)/2)) }
anova2 <- function(m) { n <- nrow(m); k <- ncol(m); g <- mean(m); r <- rowMeans(m); c <- colMeans(m); ssr <- k*sum((r-g)^2); ssc <- n*sum((c-g)^2); sst <- sum((m-g)^2); sse <- sst - ssr - ssc; ssw <- sst - ssr
  e <- sweep(sweep(m, 1, r), 2, c) + g; sse <- sum(e^2); ssw <- sum((m - r)^2)
  list(n = n, k = k, MSR = ssr/(n-1), MSC = ssc/(k-1), MSE = sse/((n-1)*(k-1)), MSW = ssw/(n*(k-1))) }
icc <- function(m, conf = .95) { a <- anova2(m); n <- a$n; k <- a$k; al <- 1 - conf; R <- a$MSR; C <- a$MSC; E <- a$MSE; W <- a$MSW
  i11 <- (R-W)/(R+(k-1)*W); F0 <- R/W; fl <- F0/qf(1-al/2, n-1, n*(k-1)); fu <- F0*qf(1-al/2, n*(k-1), n-1); c11 <- c((fl-1)/(fl+k-1), (fu-1)/(fu+k-1)); c1k <- c(1-1/fl, 1-1/fu)
  i31 <- (R-E)/(R+(k-1)*E); F3 <- R/E; gl <- F3/qf(1-al/2, n-1, (n-1)*(k-1)); gu <- F3*qf(1-al/2, (n-1)*(k-1), n-1); c31 <- c((gl-1)/(gl+k-1), (gu-1)/(gu+k-1)); c3k <- c(1-1/gl, 1-1/gu)
  i21 <- (R-E)/(R+(k-1)*E+k*(C-E)/n); fj <- C/E
  vn <- (k-1)*(n-1)*(k*i21*fj + n*(1+(k-1)*i21) - k*i21)^2; vd <- (n-1)*k^2*i21^2*fj^2 + (n*(1+(k-1)*i21) - k*i21)^2; v <- vn/vd
  f1 <- qf(1-al/2, n-1, v); f2 <- qf(1-al/2, v, n-1)
  L <- n*(R - f1*E)/(f1*(k*C + (k*n-k-n)*E) + n*R); U <- n*(f2*R - E)/(k*C + (k*n-k-n)*E + n*f2*R)
  i2k <- (R-E)/(R+(C-E)/n); i1k <- (R-W)/R; i3k <- (R-E)/R; s2 <- (C-E)/n
  sb <- function(r) k*r/(1+(k-1)*r)
  list(anova = c(n = n, k = k, ms_rows = R, ms_cols = C, ms_error = E, ms_within = W),
       icc_1_1 = c(estimate = i11, lower = c11[1], upper = c11[2]), icc_2_1_A1 = c(estimate = i21, lower = L, upper = U, satterthwaite_v = v), icc_3_1_C1 = c(estimate = i31, lower = c31[1], upper = c31[2]),
       icc_1_k = c(estimate = i1k, lower = c1k[1], upper = c1k[2]), icc_2_k_Ak = c(estimate = i2k, lower = sb(L), upper = sb(U)), icc_3_k_Ck = c(estimate = i3k, lower = c3k[1], upper = c3k[2]),
       f_test_rows = c(F = F3, df1 = n-1, df2 = (n-1)*(k-1), p = pf(F3, n-1, (n-1)*(k-1), lower.tail = FALSE)),
       f_test_cols = c(F = fj, df1 = k-1, df2 = (n-1)*(k-1), p = pf(fj, k-1, (n-1)*(k-1), lower.tail = FALSE)),
       sem_consistency = sqrt(E), sem_agreement = sqrt(E + max(0, s2)), sdc95_consistency = qnorm(.975)*sqrt(2)*sqrt(E), sdc95_agreement = qnorm(.975)*sqrt(2)*sqrt(E + max(0, s2)),
       sem_consistency_ci = c(lower = sqrt((n-1)*(k-1)*E/qchisq(1-al/2, (n-1)*(k-1))), upper = sqrt((n-1)*(k-1)*E/qchisq(al/2, (n-1)*(k-1)))),
       variance_between_columns = s2, variance_between_rows = (R-E)/k) }
tem <- function(a, b) { d <- a - b; n <- length(d); t <- sqrt(sum(d^2)/(2*n)); c(n = n, tem_dahlberg = t, tem_relative_percent = 100*t/mean(c(a, b)), tem_bias_free = sd(d)/sqrt(2), reliability_R = 1 - t^2/var(c(a, b))) }

## ---------------------------------------------------------------- GLM output
glm_out <- function(f, hc = FALSE, cl = NULL, profile = FALSE) { z <- qnorm(.975); b <- coef(f); V <- vcov(f); se <- sqrt(diag(V)); nm <- names(b)
  r <- list(coef = as.list(b), se = setNames(as.list(se), nm), vcov = unname(V), exp_coef = as.list(exp(b)), exp_lower = setNames(as.list(exp(b-z*se)), nm), exp_upper = setNames(as.list(exp(b+z*se)), nm),
            loglik = as.numeric(logLik(f)), deviance = f$deviance, null_deviance = f$null.deviance, df_residual = f$df.residual, aic = AIC(f), pearson_chisq = sum(resid(f, "pearson")^2))
  if (hc) { r$hc0_se <- setNames(as.list(sqrt(diag(sandwich::vcovHC(f, "HC0")))), nm) }
  if (!is.null(cl)) { G <- length(unique(cl)); v <- sandwich::vcovCL(f, cluster = cl, type = "HC0", cadjust = FALSE); r$cluster_se_uncorrected <- setNames(as.list(sqrt(diag(v))), nm); r$cluster_se_G_over_Gminus1 <- setNames(as.list(sqrt(diag(v)*G/(G-1))), nm); r$n_clusters <- G }
  if (profile) { ci <- suppressMessages(confint(f)); r$profile_lower <- setNames(as.list(unname(ci[,1])), nm); r$profile_upper <- setNames(as.list(unname(ci[,2])), nm) }
  r }
tight <- glm.control(epsilon = 1e-15, maxit = 100)
# block form for many subjects: same scoring, never forms the n x n matrix
lmm_block <- function(y, X, Z, id, REML = TRUE, start, maxit = 100) {
  id <- as.character(id); u <- unique(id); idx <- lapply(u, function(l) which(id == l)); p <- ncol(X); q <- ncol(Z); n <- length(y); nb <- q*(q+1)/2 + 1; th <- start
  Bk <- function(Zi, k) { if (k == nb) return(diag(nrow(Zi))); i <- 1; while (i*(i+1)/2 < k) i <- i + 1; j <- k - i*(i-1)/2; if (i == j) Zi[,i] %o% Zi[,i] else Zi[,i] %o% Zi[,j] + Zi[,j] %o% Zi[,i] }
  Gm <- function(t) { G <- matrix(0, q, q); k <- 0; for (i in 1:q) for (j in 1:i) { k <- k+1; G[i,j] <- G[j,i] <- t[k] }; G }
  BB <- lapply(idx, function(r) lapply(1:nb, function(k) Bk(Z[r, , drop = FALSE], k)))
  Vi_all <- function(th) lapply(idx, function(r) { Zi <- Z[r, , drop = FALSE]; chol2inv(chol(Zi %*% Gm(th) %*% t(Zi) + diag(th[nb], length(r)))) })
  for (it in 1:maxit) { Vi <- Vi_all(th)
    A <- matrix(0, p, p); xy <- numeric(p); for (s in seq_along(idx)) { r <- idx[[s]]; Xi <- X[r, , drop = FALSE]; W <- Vi[[s]] %*% Xi; A <- A + crossprod(Xi, W); xy <- xy + crossprod(W, y[r]) }
    Ai <- solve(A); b <- as.vector(Ai %*% xy); e <- as.vector(y - X %*% b); Py <- numeric(n); for (s in seq_along(idx)) Py[idx[[s]]] <- Vi[[s]] %*% e[idx[[s]]]
    sc <- numeric(nb); T <- lapply(1:nb, function(k) matrix(0, p, p)); BP <- matrix(0, n, nb); FI <- matrix(0, nb, nb)
    for (s in seq_along(idx)) { r <- idx[[s]]; W <- Vi[[s]] %*% X[r, , drop = FALSE]; VB <- lapply(BB[[s]], function(B) Vi[[s]] %*% B); for (k in 1:nb) { B <- BB[[s]][[k]]; sc[k] <- sc[k] - .5*sum(diag(VB[[k]])); T[[k]] <- T[[k]] + crossprod(W, B %*% W); BP[r, k] <- B %*% Py[r]; for (l in 1:k) FI[k, l] <- FI[l, k] <- FI[k, l] + .5*sum(VB[[k]]*t(VB[[l]])) } }
    for (k in 1:nb) { if (REML) sc[k] <- sc[k] + .5*sum(Ai*T[[k]]); sc[k] <- sc[k] + .5*sum(Py*BP[,k]) }
    Pv <- function(v) { o <- numeric(n); xv <- numeric(p); for (s in seq_along(idx)) { r <- idx[[s]]; o[r] <- Vi[[s]] %*% v[r]; xv <- xv + crossprod(X[r, , drop = FALSE], o[r]) }; m <- as.vector(Ai %*% xv); for (s in seq_along(idx)) { r <- idx[[s]]; o[r] <- o[r] - Vi[[s]] %*% (X[r, , drop = FALSE] %*% m) }; o }
    PB <- sapply(1:nb, function(k) Pv(BP[,k])); AI <- .5*crossprod(BP, PB); d <- solve(if (it < 5) FI else AI, sc); st <- 1
    while (th[nb] + st*d[nb] <= 0 || any(eigen(Gm(th + st*d), only.values = TRUE)$values <= 0)) st <- st/2
    thn <- th + st*d; done <- max(abs(thn - th)/pmax(1e-8, abs(th))) < 1e-12; th <- thn; if (done) break }
  Vi <- Vi_all(th); ld <- 0; A <- matrix(0, p, p); xy <- numeric(p); for (s in seq_along(idx)) { r <- idx[[s]]; ld <- ld - as.numeric(determinant(Vi[[s]])$modulus); Xi <- X[r, , drop = FALSE]; W <- Vi[[s]] %*% Xi; A <- A + crossprod(Xi, W); xy <- xy + crossprod(W, y[r]) }
  Ai <- solve(A); b <- as.vector(Ai %*% xy); e <- as.vector(y - X %*% b); qf <- 0; re <- t(sapply(seq_along(idx), function(s) { r <- idx[[s]]; w <- Vi[[s]] %*% e[r]; qf <<- qf + sum(w*e[r]); as.vector(Gm(th) %*% crossprod(Z[r, , drop = FALSE], w)) })); if (q == 1) re <- t(re)
  ll <- -.5*(ld + qf + (n - if (REML) p else 0)*log(2*pi) + (if (REML) as.numeric(determinant(A)$modulus) else 0))
  list(theta = th, beta = b, vcov = Ai, G = Gm(th), sigma2 = th[nb], loglik = ll, ranef = re, iter = it, score = max(abs(sc)), ids = u) }
# independent form of the score PH test: rows split at event times, x*g(t) added, score at (beta, 0); rank = rank among all observation times
zph_split <- function(d, tv, ev, vars, transform) {
  f <- coxph(as.formula(sprintf("Surv(%s,%s)~%s", tv, ev, paste(vars, collapse = "+"))), d, control = coxph.control(eps = 1e-14)); d$.t <- d[[tv]]; d$.e <- d[[ev]]; et <- sort(unique(d$.t[d$.e == 1]))
  s <- survSplit(Surv(.t, .e) ~ ., d, cut = et, start = "st", end = "en"); kf <- survfit(Surv(.t, .e) ~ 1, d); Sl <- c(1, kf$surv)[findInterval(s$en, kf$time, left.open = TRUE) + 1]
  G <- switch(transform, identity = s$en, log = log(s$en), rank = rank(d$.t)[match(s$en, d$.t)], km = 1 - Sl); G <- G - mean(G)
  one <- sapply(vars, function(v) { s$.x <- s[[v]]*G; coxph(as.formula(sprintf("Surv(st,en,.e)~%s+.x", paste(vars, collapse = "+"))), s, init = c(coef(f), 0), iter.max = 0)$score })
  for (v in vars) s[[paste0(".x", v)]] <- s[[v]]*G
  c(one, GLOBAL = coxph(as.formula(sprintf("Surv(st,en,.e)~%s+%s", paste(vars, collapse = "+"), paste0(".x", vars, collapse = "+"))), s, init = c(coef(f), 0*coef(f)), iter.max = 0)$score) }

D <- file.path(here, "datasets")
csv <- function(df, name, na = "") { wcsv(df, file.path(D, paste0(name, ".csv")), na); invisible(paste0("datasets/", name, ".csv")) }
SRC <- list(
 surv = "R package survival 3.5-3 (LGPL>=2), data sets as shipped", calc = "computed by this script",
 newc1 = "Newcombe RG. Stat Med 1998;17:857-872, Table I examples (values from memory; recomputed here)",
 newc2 = "Newcombe RG. Stat Med 1998;17:873-890, Table II examples (values from memory; recomputed here)")

## ============================================================ 01 proportions
topic_begin("01-proportions", "Proportions, differences, ratios, exact tests, stratified 2x2")
one <- function(x, n, conf = .95) list(wilson = wilson(x, n, conf), clopper_pearson = clopper(x, n, conf))
pub <- list(c(81,263,.2553,.3662,.2527,.3676), c(15,148,.0624,.1605,.0578,.1617), c(0,20,0,.1611,0,.1684), c(1,29,.0061,.1718,.0009,.1776))
for (v in pub) { e <- one(v[1], v[2])
  ck <- list(chk("Newcombe 1998a Table I, Wilson", e$wilson[2:3], v[3:4], 6e-5), chk("Newcombe 1998a Table I, Clopper-Pearson", e$clopper_pearson[2:3], v[5:6], 6e-5),
             chk("prop.test(correct=FALSE)", as.numeric(suppressWarnings(prop.test(v[1], v[2], correct = FALSE))$conf.int), e$wilson[2:3], 1e-12), chk("binom.test", as.numeric(binom.test(v[1], v[2])$conf.int), e$clopper_pearson[2:3], 1e-12))
  add(sprintf("prop-%d-%d", v[1], v[2]), "One proportion x/n with 95% Wilson score (no continuity correction) and Clopper-Pearson intervals", list(inline = c(x = v[1], n = v[2])), e, params = list(conf = .95), call = sprintf("prop.test(%d,%d,correct=FALSE); binom.test(%d,%d)", v[1], v[2], v[1], v[2]), source = SRC$newc1, checks = ck, rel = 1e-11) }
for (v in list(c(5,5), c(0,1), c(1,1), c(50,100), c(1,100000), c(3,7))) for (cf in c(.9, .99)) add(sprintf("prop-%d-%d-conf%d", v[1], v[2], round(100*cf)), "One proportion, other confidence levels and edges", list(inline = c(x = v[1], n = v[2])), one(v[1], v[2], cf), params = list(conf = cf), source = SRC$calc, rel = 1e-11,
    checks = list(chk("prop.test", as.numeric(suppressWarnings(prop.test(v[1], v[2], correct = FALSE, conf.level = cf))$conf.int), wilson(v[1], v[2], cf)[2:3], 1e-12), chk("binom.test", as.numeric(binom.test(v[1], v[2], conf.level = cf)$conf.int), clopper(v[1], v[2], cf)[2:3], 1e-12)))
nw <- list(a = c(56,70,48,80,.0524,.3339), b = c(9,10,3,10,.1705,.8090), c = c(6,7,2,7,.0582,.8062), d = c(5,56,0,29,-.0381,.1926), e = c(0,10,0,20,-.1611,.2775), f = c(0,10,0,10,-.2775,.2775), g = c(10,10,0,20,.6791,1), h = c(10,10,0,10,.6075,1))
for (k in names(nw)) { v <- nw[[k]]; e <- newcombe(v[1], v[2], v[3], v[4]); add(paste0("diff-newcombe-", k), "Difference of two independent proportions p1-p2, Newcombe hybrid score interval (method 10, no continuity correction)", list(inline = c(x1 = v[1], n1 = v[2], x2 = v[3], n2 = v[4])), list(newcombe = e), params = list(conf = .95), source = SRC$newc2, rel = 1e-11, checks = list(chk("Newcombe 1998b Table II, method 10", e[2:3], v[5:6], 6e-5))) }
two <- list(doll_trial = c(56,70,48,80), tea = c(3,4,1,4), rare = c(2,500,11,480), bresl = c(96,200,104,775), small = c(1,20,7,22))
for (k in names(two)) { v <- two[[k]]; a <- v[1]; b <- v[2]-v[1]; c <- v[3]; d <- v[4]-v[3]; f <- fisher2(a,b,c,d); m <- matrix(c(a,b,c,d),2,byrow=TRUE); ft <- fisher.test(m); fs <- fisher.test(m, alternative = "less")
  ew <- epitools::oddsratio.wald(matrix(c(d,c,b,a),2,byrow=TRUE)); er <- epitools::riskratio.wald(matrix(c(d,c,b,a),2,byrow=TRUE)); em <- epitools::oddsratio.midp(matrix(c(d,c,b,a),2,byrow=TRUE))
  ck <- list(chk("fisher.test p", f[1], ft$p.value, 1e-12), chk("fisher.test less p", f[2], fs$p.value, 1e-12), chk("fisher.test CI (R's own root is loose)", f[c("or_exact_lower","or_exact_upper")]/as.numeric(ft$conf.int), 1, 2e-2), chk("epitools OR Wald", or_wald(a,b,c,d)[c(1,3,4)], ew$measure[2,], 1e-9), chk("epitools RR Wald", rr_log(a,v[2],c,v[4])[c(1,3,4)], er$measure[2,], 1e-9), chk("epitools mid-P limits (loose)", f[c("or_midp_lower","or_midp_upper")]/em$measure[2,2:3], 1, 2e-2))
  add(paste0("two-", k), "2x2 table, row 1 exposed a/(a+b), row 2 unexposed c/(c+d): risk ratio with log (Katz) CI, odds ratio with Woolf CI, Fisher exact p (two-sided by summing tables not more probable, slack 1e-7), conditional MLE OR with exact and mid-P limits, Pearson and Yates chi-square, Newcombe difference", list(inline = c(a = a, b = b, c = c, d = d)),
      list(risk_ratio = rr_log(a, v[2], c, v[4]), odds_ratio = or_wald(a,b,c,d), fisher = f, chisq = pearson22(a,b,c,d), newcombe_difference = newcombe(v[1],v[2],v[3],v[4])), params = list(conf = .95), call = "fisher.test, chisq.test, epitools::*.wald, own bisection for limits", source = if (k == "tea") "Fisher 1935 tea-tasting layout" else SRC$calc, checks = ck, rel = 1e-9, note = "R's fisher.test limits and conditional OR are only accurate to about 1e-4 (uniroot default tolerance); the figures here are solved to the last bit.") }
job <- matrix(c(1,2,1,0, 3,3,6,1, 10,10,14,9, 6,7,12,11), 4, 4); add("fisher-rxc-job", "Fisher exact p for a 4x4 table (Agresti job satisfaction, rows given)", list(inline_rows = A(lapply(1:4, function(i) A(job[i,])))), c(p = fisher.test(job)$p.value), call = "fisher.test(job)", source = "Agresti A. Categorical Data Analysis 2002 p.57, as in R ?fisher.test", rel = 1e-7, checks = list(chk("R help page", fisher.test(job)$p.value, 0.7827, 5e-5)))
ucb <- as.data.frame(UCBAdmissions); csv(ucb, "ucbadmissions"); T <- t(sapply(levels(ucb$Dept), function(s) { g <- function(x, y) ucb$Freq[ucb$Dept==s & ucb$Gender==x & ucb$Admit==y]; c(g("Male","Admitted"), g("Male","Rejected"), g("Female","Admitted"), g("Female","Rejected")) }))
mt <- mantelhaen.test(UCBAdmissions, correct = FALSE); mtc <- mantelhaen.test(UCBAdmissions); e <- mh(T)
add("cmh-ucb", "Stratified 2x2 (Gender x Admit by Dept; exposed=Male, case=Admitted): Cochran-Mantel-Haenszel chi-square without and with 0.5 correction, MH odds ratio with Robins-Breslow-Greenland CI, MH risk ratio (Greenland-Robins), MH risk difference (Sato variance), Breslow-Day and Tarone-corrected homogeneity tests", list(file = "datasets/ucbadmissions.csv"), as.list(e), call = "mantelhaen.test(UCBAdmissions)", source = "R datasets::UCBAdmissions (Bickel, Hammel, O'Connell 1975)", checks = list(chk("mantelhaen.test", e[c("cmh","or_mh","or_lower","or_upper")], c(mt$statistic, mt$estimate, mt$conf.int), 1e-9), chk("mantelhaen.test corrected", e["cmh_corrected"], mtc$statistic, 1e-9)))
eso <- aggregate(cbind(ncases, ncontrols) ~ agegp + I(as.integer(alcgp) >= 3), data = esoph, FUN = sum); names(eso) <- c("agegp","alcohol_80plus","ncases","ncontrols"); eso$ncontrols <- eso$ncontrols; csv(eso, "esoph_alcohol")
T <- t(sapply(levels(eso$agegp), function(s) { q <- eso[eso$agegp==s,]; c(q$ncases[q$alcohol_80plus], q$ncontrols[q$alcohol_80plus], q$ncases[!q$alcohol_80plus], q$ncontrols[!q$alcohol_80plus]) })); e <- mh(T)
mt <- mantelhaen.test(array(apply(T, 1, function(v) matrix(v, 2, byrow = TRUE)), c(2,2,nrow(T))), correct = FALSE)
add("cmh-esoph", "As cmh-ucb: oesophageal cancer, alcohol >= 80 g/day (exposed) by six age strata, some strata with zero cells", list(file = "datasets/esoph_alcohol.csv"), as.list(e[!grepl("breslow|bd_|tarone", names(e))]), source = "R datasets::esoph (Breslow & Day 1980; version shipped with R 4.2.2)", checks = list(chk("mantelhaen.test", e[c("cmh","or_mh","or_lower","or_upper")], c(mt$statistic, mt$estimate, mt$conf.int), 1e-9)))
topic_end(here)

## ============================================================ 02 rates
topic_begin("02-rates", "Incidence rates, rate ratio and difference")
gw <- list(c(0,0,3.689), c(1,.0253,5.572), c(2,.2422,7.225), c(5,1.6235,11.668), c(10,4.7954,18.390), c(20,12.217,30.888), c(50,37.111,65.918), c(100,81.364,121.627))
for (v in gw) { e <- garwood(v[1]); add(sprintf("garwood-%d", v[1]), "Poisson count, exact (Garwood) 95% limits, and mid-P limits, person-time 1", list(inline = c(events = v[1], person_time = 1)), list(exact = e, midp = midp_poisson(v[1])), params = list(conf = .95, per = 1), call = sprintf("poisson.test(%d)$conf.int", v[1]), source = "Garwood F. Biometrika 1936;28:437-442; table values from memory (as in Ulm 1990)", rel = 1e-10, checks = list(chk("table", e[2:3], v[2:3], 1.1e-3), chk("poisson.test", as.numeric(poisson.test(v[1])$conf.int), e[2:3], 1e-9))) }
for (v in list(c(41,28010), c(15,19017), c(3,12.5), c(0,87.25), c(1234,98765.4))) for (cf in c(.9,.95)) add(sprintf("rate-%g-%g-%d", v[1], v[2], round(100*cf)), "Rate per 100 person-years, exact CI", list(inline = c(events = v[1], person_years = v[2])), list(exact = garwood(v[1], v[2], cf, 100), midp = midp_poisson(v[1], v[2], cf, 100)), params = list(conf = cf, per = 100), source = SRC$calc, rel = 1e-10)
rrs <- list(rothman_fluoroscopy = list(c(41,28010,15,19017), "Rothman KJ, Modern Epidemiology 1986 (breast cancer after fluoroscopy); also in epitools help"), eba1977 = list(c(11,800,21,3011), "R ?poisson.test example (lung cancer in Danish towns, Andersen 1977, as paraphrased in the help page)"), small = list(c(2,30.5,9,41.25), SRC$calc), equal = list(c(10,100,10,100), SRC$calc), one_zero = list(c(0,55,6,60), SRC$calc), other_zero = list(c(4,20,0,33), SRC$calc))
for (k in names(rrs)) { v <- rrs[[k]][[1]]; e <- rate_ratio(v[1], v[2], v[3], v[4]); p <- poisson.test(v[c(1,3)], v[c(2,4)]); ck <- list(chk("poisson.test CI", as.numeric(p$conf.int)[is.finite(p$conf.int)], e[c("exact_lower","exact_upper")][is.finite(p$conf.int)], 1e-8), chk("poisson.test p (minlike)", e["p_exact_minlike"], p$p.value, 1e-10))
  if (k == "rothman_fluoroscopy") { m <- epitools::rateratio.midp(c(v[3], v[1]), c(v[4], v[2])); w <- epitools::rateratio.wald(c(v[3], v[1]), c(v[4], v[2])); ck <- c(ck, list(chk("epitools mid-P (loose root)", m$measure[2,2:3]/e[c("midp_lower","midp_upper")], 1, 2e-3), chk("epitools Wald", w$measure[2,2:3], e[c("wald_lower","wald_upper")], 1e-9), chk("Rothman: ratio 1.86", e["ratio"], 1.86, 5e-3))) }
  add(paste0("rateratio-", k), "Rate ratio group1/group2: conditional exact (Clopper-Pearson on x1 given x1+x2) limits, mid-P limits, Wald on log; p-values (central exact = twice the smaller tail; minlike = R's rule; mid-P); rate difference Wald (per unit person-time)", list(inline = c(events1 = v[1], person_time1 = v[2], events2 = v[3], person_time2 = v[4])), as.list(e), params = list(conf = .95), call = "poisson.test(c(x1,x2), c(T1,T2)) + own", source = rrs[[k]][[2]], checks = ck, rel = 1e-9) }
br <- boot::breslow; br <- data.frame(age = br$age, smoke = br$smoke, person_years = br$n, deaths = br$y); f <- csv(br, "breslow_doctors"); sm <- br[br$smoke==1,]; ns <- br[br$smoke==0,]
W <- sm$person_years*ns$person_years/(sm$person_years+ns$person_years); Nt <- sm$person_years + ns$person_years; irr <- sum(sm$deaths*ns$person_years/Nt)/sum(ns$deaths*sm$person_years/Nt); m <- sm$deaths+ns$deaths
vl <- sum(m*sm$person_years*ns$person_years/Nt^2)/(sum(sm$deaths*ns$person_years/Nt)*sum(ns$deaths*sm$person_years/Nt)); z <- qnorm(.975)
add("mh-rate-ratio-doctors", "Mantel-Haenszel rate ratio smokers/non-smokers over five age strata, Greenland-Robins variance of its log", list(file = f), c(rate_ratio_mh = irr, se_log = sqrt(vl), lower = exp(log(irr)-z*sqrt(vl)), upper = exp(log(irr)+z*sqrt(vl))), source = "Doll & Hill 1966 via Breslow & Day 1987; R boot::breslow", checks = list(chk("textbook crude: 1.4247 MH ratio", irr, 1.4247, 5e-4)))
std <- sum((sm$deaths/sm$person_years)*Nt)/sum(Nt)*1e3; stdn <- sum((ns$deaths/ns$person_years)*Nt)/sum(Nt)*1e3
add("direct-standardised-doctors", "Directly age-standardised death rate per 1000 person-years (standard = total person-years), its Poisson variance", list(file = f), c(smokers = std, smokers_var = sum(sm$deaths/sm$person_years^2*(Nt/sum(Nt))^2)*1e6, nonsmokers = stdn, nonsmokers_var = sum(ns$deaths/ns$person_years^2*(Nt/sum(Nt))^2)*1e6), source = "as above", rel = 1e-10)
topic_end(here)

## ============================================================ 03 Kaplan-Meier
topic_begin("03-kaplan-meier", "Kaplan-Meier, quantiles, RMST, log-rank")
gh <- data.frame(treat = as.character(MASS::gehan$treat), time = MASS::gehan$time, status = MASS::gehan$cens); fg <- csv(gh, "freireich_6mp")
mp <- gh[gh$treat=="6-MP",]; e <- km_steps(mp$time, mp$status)
add("km-6mp-steps", "Kaplan-Meier at every event time with Greenwood SE of S, log-log and log 95% limits, Nelson-Aalen", list(file = fg, rows = "treat = 6-MP"), e, call = "survfit(Surv(time,status)~1, conf.type='log-log')", source = "Freireich et al. Blood 1963;21:699; R MASS::gehan", checks = list(chk("textbook S(6),S(7),S(10),S(13),S(16),S(22),S(23)", e$surv[[1]], c(.857,.807,.753,.690,.627,.538,.448), 6e-4)))
pl <- gh[gh$treat=="control",]; add("km-control-steps", "as km-6mp-steps, control arm: no censoring, heavy ties, curve reaches 0 (SE 0 and log-log limits undefined at S=0)", list(file = fg, rows = "treat = control"), km_steps(pl$time, pl$status), source = "as above")
for (k in c("6-MP","control")) { q <- gh[gh$treat==k,]; add(paste0("km-quantiles-", k), "Quartiles of event time: first time S(t) <= 1-p, midpoint of the flat part when S equals 1-p on it; limits by inverting the pointwise limits (null = not reached)", list(file = fg, rows = paste("treat =", k)), km_q(q$time, q$status), call = "quantile(survfit(...))", source = "as above")
  add(paste0("rmst-", k), "Restricted mean survival to tau with Greenwood-type variance (sum over events of A_i^2 d/(n(n-d)), term 0 when n=d)", list(file = fg, rows = paste("treat =", k)), as.list(rmst(q$time, q$status, 20)), call = "print(survfit, rmean=20)", source = "as above", checks = list(chk("survfit rmean", summary(survfit(Surv(time,status)~1, data=q), rmean=20)$table[c("rmean","se(rmean)")], rmst(q$time,q$status,20)[c("rmst","se")], 1e-10))) }
lrk <- logrank(gh$time, gh$status, gh$treat); add("logrank-6mp", "Two-group log-rank", list(file = fg), lrk, call = "survdiff(Surv(time,status)~treat)", source = "as above", checks = list(chk("textbook chi-square 16.79", lrk$chisq, 16.79, 6e-3)))
add("peto-6mp", "Peto-Peto (rho=1) weighted log-rank", list(file = fg), logrank(gh$time, gh$status, gh$treat, rho = 1), call = "survdiff(..., rho=1)", source = "as above")
ve <- survival::veteran; fv <- csv(ve, "veteran"); lu <- survival::lung; lu$status <- lu$status - 1; fl <- csv(lu[, c("inst","time","status","age","sex","ph.ecog","ph.karno","wt.loss")], "lung")
add("logrank-veteran-celltype", "Four-group log-rank with full variance matrix (order of levels: adeno, large, smallcell, squamous in alphabetical order) and trend", list(file = fv), logrank(ve$time, ve$status, as.character(ve$celltype)), call = "survdiff(Surv(time,status)~celltype)", source = "Kalbfleisch & Prentice 1980; survival::veteran")
k <- !is.na(lu$ph.ecog); add("logrank-lung-stratified", "Log-rank of sex stratified by ph.ecog; rows with missing ph.ecog dropped (n=227); strata with one group only contribute nothing", list(file = fl, rows = "ph.ecog not missing"), { z <- logrank(lu$time[k], lu$status[k], lu$sex[k], strata = lu$ph.ecog[k]); z }, call = "survdiff(Surv(time,status)~sex+strata(ph.ecog))", source = "Loprinzi 1994; survival::lung (status recoded 0/1)")
lr2 <- logrank(lu$time, lu$status, lu$sex); add("logrank-lung-sex", "Log-rank of sex", list(file = fl), lr2, source = "as above", checks = list(chk("survival vignette 10.3", lr2$chisq, 10.3, .05)))
at <- c(0,30,90,180,365,500,730,900,1022,1100); add("km-lung-at", "Curve at chosen times (t=0 gives 1; after the last time carries on); number at risk is those with time >= t", list(file = fl), km_at(lu$time, lu$status, at), call = "summary(survfit(...), times=, extend=TRUE)", source = "as above")
add("km-lung-median", "Median etc.", list(file = fl), km_q(lu$time, lu$status), source = "as above", checks = list(chk("survival docs: 310 (log: 285, 363)", unlist(lapply(km_q(lu$time, lu$status)[c("time","log_lower","log_upper")], function(v) v[[1]][2])), c(310,285,363), 0)))
for (s in 1:2) add(paste0("km-lung-median-sex", s), "Quantiles by sex", list(file = fl, rows = paste("sex =", s)), with(lu[lu$sex==s,], km_q(time, status)), source = "as above")
for (s in 1:2) add(paste0("rmst-lung-sex", s), "RMST at 365 and difference inputs", list(file = fl, rows = paste("sex =", s)), as.list(with(lu[lu$sex==s,], rmst(time, status, 365))), source = "as above")
ov <- survival::ovarian; fo <- csv(ov, "ovarian"); add("km-ovarian-steps", "Small data, upper quantiles not reached", list(file = fo), c(km_steps(ov$futime, ov$fustat), list(quantiles = km_q(ov$futime, ov$fustat))), source = "Edmunson 1979; survival::ovarian")
hp <- survival::heart; fh <- csv(hp, "heart_stanford"); add("km-left-truncated-heart", "Delayed entry: (start, stop] rows, at risk when start < t <= stop; curve of the whole data", list(file = fh), km_at(hp$stop, hp$event, c(1,5,20,50,100,300,600,1000,1500), start = hp$start), call = "survfit(Surv(start,stop,event)~1)", source = "Crowley & Hu 1977; survival::heart")
add("km-flat-median", "Four uncensored times 1,2,3,4: S = 0.5 exactly on [2,3): median is 2.5 by the midpoint convention", list(inline_rows = list(time = A(1:4), status = A(c(1,1,1,1)))), km_q(1:4, c(1,1,1,1)), source = SRC$calc, note = "floating point: 3/4*2/3 must be recognised as 0.5")
topic_end(here)

## ============================================================ 04 competing risks
topic_begin("04-competing-risks", "Cumulative incidence with competing event (Aalen-Johansen), Gray's test")
me <- MASS::Melanoma; me$cause <- c(1,0,2)[me$status]; fm <- csv(me[, c("time","cause","sex","age","year","thickness","ulcer")], "melanoma")
cif_case <- function(time, cause, at, k, start = NULL) { r <- cif(time, cause, at, k, start); ci <- cif_ci(r$est, r$var); o <- list(time = A(at), cuminc = A(r$est), var_greenwood = A(r$var), se_greenwood = A(sqrt(r$var)), loglog_lower = A(ci$lower), loglog_upper = A(ci$upper))
  if (is.null(start)) { q <- cuminc(time, cause); tp <- timepoints(q, at); i <- grep(paste0(" ", k, "$"), rownames(tp$est)); o$var_aalen_cmprsk <- A(unname(tp$var[i,])); stopifnot(max(abs(tp$est[i,] - r$est), na.rm = TRUE) < 1e-12) }
  o }
at <- c(0,185,500,1000,2000,3000,4000,5000,5565); ms <- summary(survfit(Surv(time, factor(cause)) ~ 1, data = me), times = at, extend = TRUE)
for (k in 1:2) { e <- cif_case(me$time, me$cause, at, k); add(paste0("cif-melanoma-cause", k), "Cumulative incidence of the cause at times; variance in two forms: var_greenwood (multinomial increments; = survival's multi-state SE^2 here and etm) and var_aalen_cmprsk (Aalen 1978 form used by cmprsk, slightly larger). log-log limits F^exp(-+z*se/(F log F)) use var_greenwood", list(file = fm), e, call = "cif(); cmprsk::cuminc; survfit(Surv(time,factor(cause))~1)", source = "Andersen et al. 1993 (melanoma in Denmark); R MASS::Melanoma (cause 1 melanoma death, 2 other death, 0 alive)", checks = list(chk("survival multi-state", ms$pstate[,k+1], e$cuminc[[1]], 1e-12), chk("survival SE^2", ms$std.err[,k+1]^2, e$var_greenwood[[1]], 1e-12))) }
gr <- cuminc(me$time, me$cause, me$ulcer)$Tests; add("gray-melanoma-ulcer", "Gray's K-sample test (rho=0) per cause, group = ulcer", list(file = fm), list(cause1 = c(chisq = gr[1,1], df = gr[1,3], p = gr[1,2]), cause2 = c(chisq = gr[2,1], df = gr[2,3], p = gr[2,2])), call = "cmprsk::cuminc(time,cause,ulcer)$Tests", source = "as above")
tg <- cut(me$thickness, c(-Inf,2,5,Inf), labels = FALSE); gr <- cuminc(me$time, me$cause, tg)$Tests; add("gray-melanoma-3groups", "Gray's test, three thickness groups (<=2, (2,5], >5 mm)", list(file = fm), list(cause1 = c(chisq = gr[1,1], df = gr[1,3], p = gr[1,2]), cause2 = c(chisq = gr[2,1], df = gr[2,3], p = gr[2,2])), source = "as above")
gr <- cuminc(me$time, me$cause, me$ulcer, strata = me$sex)$Tests; add("gray-melanoma-strata", "Gray's test for ulcer stratified by sex", list(file = fm), list(cause1 = c(chisq = gr[1,1], df = gr[1,3], p = gr[1,2]), cause2 = c(chisq = gr[2,1], df = gr[2,3], p = gr[2,2])), source = "as above")
tr <- survival::transplant; tr <- tr[tr$futime > 0, ]; tr$cause <- match(as.character(tr$event), c("censored","ltx","death","withdraw")) - 1; tr <- tr[, c("age","sex","abo","futime","cause")]; ft <- csv(tr, "transplant")
for (k in 1:3) add(paste0("cif-transplant-cause", k), "Three competing causes (1 transplant, 2 death, 3 withdrawal)", list(file = ft), cif_case(tr$futime, tr$cause, c(10,30,90,180,365,730,1500), k), source = "survival::transplant (rows with futime > 0)")
gr <- cuminc(tr$futime, tr$cause, tr$abo)$Tests; add("gray-transplant-abo", "Gray's test over four blood groups, three causes", list(file = ft), setNames(lapply(1:3, function(k) c(chisq = gr[k,1], df = gr[k,3], p = gr[k,2])), paste0("cause", 1:3)), source = "as above")
add("cif-sum-identity", "Identity: S_KM(all causes) + sum of CIFs = 1 at each time; and 1-KM (cause 1, others censored) exceeds the CIF", list(file = fm), { f <- summary(survfit(Surv(time, cause > 0) ~ 1, data = me), times = c(1000,3000)); g <- summary(survfit(Surv(time, cause == 1) ~ 1, data = me), times = c(1000,3000)); list(time = A(c(1000,3000)), all_cause_survival = A(f$surv), one_minus_km_cause1 = A(1 - g$surv)) }, source = "as above")
topic_end(here)

## ============================================================ 05 interval censored
topic_begin("05-interval-censored", "Turnbull NPMLE and parametric interval-censored fits; intervals are (left, right]")
co <- read.csv(file.path(D, "cosmesis.csv")); co$right[is.na(co$right)] <- Inf; stopifnot(sum(co$arm=="radiotherapy")==46, sum(co$arm!="radiotherapy")==48); fc <- "datasets/cosmesis.csv"; sc <- "Finkelstein & Wolfe. Biometrics 1985;41:933-945; counts 46/48 checked; typed from memory and equal, row for row as multisets, to the text in a public copy (MLEcens data)"
ra <- co[co$arm=="radiotherapy",]; rc <- co[co$arm!="radiotherapy",]; at <- c(4,6,12,18,24,30,36,42,48)
e <- npmle_out(ra$left, ra$right, at = at); add("npmle-cosmesis-rt", "NPMLE of onset time: support intervals (left,right], masses, log-likelihood; survival_at gives lower/upper S(t) (equal when t is not inside a support interval)", list(file = fc, rows = "arm = radiotherapy"), e, call = "own EM + Newton with Karush-Kuhn-Tucker check (gap < 1e-10)", source = sc, rel = 1e-8, abs = 1e-10, checks = list(chk("published masses (Fay & Shaw 2010 JSS 36(2), from memory)", e$mass[[1]], c(.0463,.0334,.0887,.0708,.0926,.0818,.1209,.4656), 6e-5)))
e <- npmle_out(rc$left, rc$right, at = at); add("npmle-cosmesis-rtct", "as above, chemotherapy arm", list(file = fc, rows = "arm = radiotherapy_chemo"), e, source = sc, rel = 1e-8, abs = 1e-10)
add("npmle-cosmesis-all", "as above, both arms pooled", list(file = fc), npmle_out(co$left, co$right, at = at), source = sc, rel = 1e-8, abs = 1e-10)
sv <- survfit(ic_surv(ra$left, ra$right) ~ 1); add("npmle-r-looseness", "For information: R's survfit(interval2) EM stops early; largest absolute difference from the converged NPMLE at the listed times", list(file = fc, rows = "arm = radiotherapy"), list(time = A(at), r_survfit = A(summary(sv, times = at, extend = TRUE)$surv)), source = sc, rel = 1e-3, abs = 1e-3, note = "use tolerance 1e-3 against survfit, 1e-8 against the NPMLE cases")
X <- as.integer(co$arm != "radiotherapy"); for (d in c("weibull","exponential")) { r <- ic_fit(co$left, co$right, X, d, "chemo"); ck <- NULL
  add(paste0("ic-", d, "-cosmesis"), "Interval-censored regression on arm (chemo=1): log T = intercept + coef*x + sigma*W (minimum extreme value); log hazard ratio = -coef/sigma with delta-method SE; (0,R] is left censored, (L,Inf) right censored", list(file = fc), strip(r), call = sprintf("survreg(Surv(l,r,type='interval2')~chemo, dist='%s')", d), source = sc, rel = 1e-7, abs = 1e-9, checks = ck)
  add(paste0("ic-", d, "-cosmesis-rt"), "No covariate, radiotherapy arm", list(file = fc, rows = "arm = radiotherapy"), strip(ic_fit(ra$left, ra$right, NULL, d)), source = sc, rel = 1e-7, abs = 1e-9) }
lv <- lu[, ]; r <- survreg(Surv(time, status) ~ sex + age, data = lu, dist = "weibull", control = list(rel.tolerance = 1e-15, maxiter = 200)); add("weibull-right-lung", "Right-censored Weibull regression on sex and age (same parameterisation; log-likelihood of time, not log time)", list(file = fl), list(intercept = r$coef[[1]], aft_coef = as.list(r$coef[-1]), scale_sigma = r$scale, loglik = r$loglik[2], vcov = unname(vcov(r)), se = A(sqrt(diag(vcov(r))))), call = "survreg(Surv(time,status)~sex+age)", source = SRC$surv, rel = 1e-7)
onset <- data.frame(id = 1:8, last_clear = c(0,3,6,6,12,0,9,12), first_swollen = c(3,6,NA,12,NA,6,12,NA)); fs <- csv(onset, "visits_small"); L <- onset$last_clear; R <- ifelse(is.na(onset$first_swollen), Inf, onset$first_swollen); add("npmle-visits-small", "Eight people seen at 3-monthly visits; missed visits widen intervals", list(file = fs), npmle_out(L, R, at = c(3,6,9,12)), source = "made up for this base", rel = 1e-8, abs = 1e-10)
topic_end(here)

## ============================================================ 06 Cox
topic_begin("06-cox", "Cox proportional hazards: Efron and Breslow ties, counting process, robust clustered SE, PH tests")
ctl <- coxph.control(eps = 1e-14, toler.chol = 1e-15, iter.max = 100)
g6 <- as.integer(gh$treat == "control"); f <- coxph(Surv(time, status) ~ g6, data = gh, ties = "efron", control = ctl); add("cox-6mp-efron", "Hazard ratio control vs 6-MP, Efron ties", list(file = fg, x = "g6 = 1 if treat is control"), cox_out(f, at = c(5,10,15,20), newdata = data.frame(g6 = 1)), call = "coxph(..., ties='efron')", source = "as Freireich", rel = 1e-8, checks = list(chk("textbook 1.572 (Efron)", coef(f), 1.572, 6e-4)))
f <- coxph(Surv(time, status) ~ g6, data = gh, ties = "breslow", control = ctl); add("cox-6mp-breslow", "Breslow ties", list(file = fg, x = "g6 = 1 if treat is control"), cox_out(f, at = c(5,10,15,20)), source = "as Freireich", rel = 1e-8, checks = list(chk("textbook 1.509 (Breslow)", coef(f), 1.509, 6e-4)))
f <- coxph(Surv(time, status) ~ age + sex + ph.ecog, data = lu, control = ctl); add("cox-lung", "age + sex + ph.ecog, complete cases (n=227), Efron; PH tests with four time transforms (score form as in survival >= 3.0, and the older 1994 approximation); rank = rank among all observation times (ties averaged) in the score form, among event rows in the 1994 form", list(file = fl, rows = "ph.ecog not missing"), cox_out(f, at = c(100,365,700), newdata = data.frame(age = 60, sex = 1, ph.ecog = 1)), call = "coxph(Surv(time,status)~age+sex+ph.ecog); cox.zph", source = SRC$surv, rel = 1e-7)
k2 <- complete.cases(lu[, c("inst","age","sex","ph.ecog")]); f <- coxph(Surv(time, status) ~ age + sex + ph.ecog, data = lu[k2,], cluster = inst, control = ctl); add("cox-lung-cluster-site", "as cox-lung with Lin-Wei sandwich SE clustered on inst (institution), no small-sample factor; row with missing inst dropped", list(file = fl, rows = "inst and ph.ecog not missing"), cox_out(f, zph = FALSE), call = "coxph(..., cluster=inst)", source = SRC$surv, rel = 1e-7)
f <- coxph(Surv(time, status) ~ age + sex + strata(ph.ecog), data = lu, control = ctl); add("cox-lung-strata", "Stratified by ph.ecog", list(file = fl, rows = "ph.ecog not missing"), cox_out(f, zph = FALSE), source = SRC$surv, rel = 1e-7)
ve$ct <- relevel(factor(ve$celltype), "squamous"); f <- coxph(Surv(time, status) ~ karno + ct + I(trt == 2), data = ve, control = ctl); names(f$coefficients) <- c("karno","ct_smallcell","ct_adeno","ct_large","trt2"); o <- cox_out(f, zph = FALSE); add("cox-veteran", "karno + celltype (reference squamous; order smallcell, adeno, large) + trt2", list(file = fv), o, source = SRC$surv, rel = 1e-7)
f <- coxph(Surv(start, stop, event) ~ age + year + surgery + I(as.integer(transplant) - 1), data = hp, control = ctl); names(f$coefficients) <- c("age","year","surgery","transplant"); o <- cox_out(f, zph = FALSE); add("cox-heart-timevarying", "Time-varying transplant status in (start, stop] rows", list(file = fh), o, call = "coxph(Surv(start,stop,event)~age+year+surgery+transplant)", source = SRC$surv, rel = 1e-7)
hp2 <- hp; hp2$tx <- as.integer(hp$transplant) - 1; f <- coxph(Surv(start, stop, event) ~ age + year + surgery + tx, data = hp2, cluster = id, control = ctl); add("cox-heart-cluster-id", "as above, sandwich SE clustered by person", list(file = fh), cox_out(f, zph = FALSE), source = SRC$surv, rel = 1e-7)
f <- coxph(Surv(futime, fustat) ~ age, data = ov, control = ctl); add("cox-ovarian", "age", list(file = fo), cox_out(f, at = c(200,400), newdata = data.frame(age = 55)), source = SRC$surv, rel = 1e-8)
f <- coxph(Surv(futime, fustat) ~ age + ecog.ps, data = ov, control = ctl); zc <- zph_classic(f, "km"); add("cox-ovarian-ecog-ph", "age + ecog.ps: PH tests in both forms. Time transforms: km = 1 - left-continuous Kaplan-Meier, identity, log; rank = rank among all observation times (ties averaged) in the score form, among event rows in the 1994 form", list(file = fo), cox_out(f), call = "coxph(Surv(futime,fustat)~age+ecog.ps); cox.zph", source = SRC$surv, rel = 1e-7, checks = list(chk("survival 2.x help page (from memory): rho -0.243 0.520, chisq 0.856 2.545 global 3.195", c(zc$rho[[1]][1:2], zc$chisq[[1]]), c(-.243,.520,.856,2.545,3.195), 6e-4), chk("score form by row splitting, km identity rank log", sapply(c("km","identity","rank","log"), function(tr) zph_split(ov, "futime", "fustat", c("age","ecog.ps"), tr)), sapply(c("km","identity","rank","log"), function(tr) cox.zph(f, transform = tr, terms = FALSE)$table[,1]), 1e-9)))
bl <- survival::bladder1; bl2 <- survival::bladder2; fb <- csv(bl2, "bladder2"); f <- coxph(Surv(start, stop, event) ~ rx + size + number + strata(enum), data = bl2, cluster = id, control = ctl); add("cox-bladder-wlw-type", "Recurrent events, stratified by event number, clustered by id (conditional model)", list(file = fb), cox_out(f, zph = FALSE), source = "Wei, Lin, Weissfeld 1989; survival::bladder2", rel = 1e-7)
topic_end(here)

## ============================================================ 15 Firth's penalised Cox regression
# No package: coxph itself gives log L and the inverse information at any fixed
# beta (iter.max = 0). log L + 1/2 log det I is raised by steps V g, g by central
# differences of the sixth order; limits and p by root finding on its profile.
topic_begin("15-firth-cox", "Cox regression by Firth's penalised likelihood: estimates, profile limits, penalised likelihood-ratio tests")
firth_out <- function(fm, d, ties = "efron") {
  held <- coxph.control(iter.max = 0, toler.chol = 1e-15)
  f0 <- suppressWarnings(coxph(fm, d, ties = ties, control = coxph.control(iter.max = 1), x = TRUE, model = TRUE)); run <- if (ncol(f0$y) == 3) agreg.fit else coxph.fit   # the fitters inside coxph: the same numbers, without reading the formula again
  st <- if (is.null(f0$strata)) NULL else as.integer(f0$model[[grep("^strata", names(f0$model))]])
  at <- function(b) { f <- suppressWarnings(run(f0$x, f0$y, st, NULL, b, held, NULL, ties, NULL)); list(pl = f$loglik[2] - .5*as.numeric(determinant(f$var)$modulus), V = f$var) }
  pl <- function(b) at(b)$pl
  nm <- names(coef(f0)); p <- length(nm); nl <- at(rep(0, p)); z <- qnorm(.975)
  grad <- function(b, V, free) sapply(free, function(j) { h <- .05*sqrt(V[j, j]); s <- function(k) { b[j] <- b[j] + k*h; pl(b) }; (45*(s(1) - s(-1)) - 9*(s(2) - s(-2)) + s(3) - s(-3))/(60*h) })
  top <- function(b, free) { if (!length(free)) return(b)
    for (i in 1:500) { o <- at(b); g <- grad(b, o$V, free); st <- as.vector(solve(solve(o$V)[free, free, drop = FALSE], g)); k <- 1
      repeat { nb <- b; nb[free] <- b[free] + k*st; if (k < 1e-4 || isTRUE(pl(nb) >= o$pl - 1e-9)) break; k <- k/2 }
      b <- nb; if (max(abs(k*st)/sqrt(diag(o$V))[free]) < 1e-9) return(b) }
    stop("no convergence") }
  b <- top(rep(0, p), seq_len(p)); o <- at(b); se <- sqrt(diag(o$V))
  sc <- sqrt(diag(nl$V)); nm_at <- b/sc + .3; for (i in 1:6) { by_nm <- suppressWarnings(optim(nm_at, function(u) { v <- -pl(u*sc); if (is.finite(v)) v else 1e6 }, control = list(reltol = 1e-15, maxit = 5000))); nm_at <- by_nm$par }
  ck <- chk("Nelder and Mead's search reaches the same maximum", c(-by_nm$value, by_nm$par*sc/se), c(o$pl, b/se), c(1e-8, rep(1e-3, p)))
  prof <- function(j, v) { u <- b + (v - b[j])*o$V[, j]/o$V[j, j]; u[j] <- v; pl(top(u, setdiff(seq_len(p), j))) }
  lim <- function(j, side) { g <- function(v) 2*(o$pl - prof(j, v)) - z^2; far <- b[j] + side*2*se[j]; while (g(far) < 0) far <- far + side*se[j]; uniroot(g, sort(c(b[j] + side*.5*se[j], far)), tol = 1e-11*se[j])$root }
  lo <- sapply(seq_len(p), lim, -1); hi <- sapply(seq_len(p), lim, 1); ch <- sapply(seq_len(p), function(j) 2*(o$pl - prof(j, 0))); L <- function(x) setNames(as.list(x), nm)
  lr <- 2*(o$pl - nl$pl)
  whole <- suppressWarnings(coxph(fm, d, init = b, ties = ties, control = held)); c0 <- chk("coxph itself at the maximum", whole$loglik[2] - .5*as.numeric(determinant(whole$var)$modulus), o$pl, 1e-9)
  list(out = list(n = f0$n, n_event = f0$nevent, coef = L(b), se = L(se), vcov = unname(o$V), hr = L(exp(b)), log_lower = L(lo), log_upper = L(hi), hr_lower = L(exp(lo)), hr_upper = L(exp(hi)),
       chisq = L(ch), p = L(pchisq(ch, 1, lower.tail = FALSE)), penalised_loglik_null = nl$pl, penalised_loglik = o$pl, lrt = c(chisq = lr, df = p, p = pchisq(lr, p, lower.tail = FALSE))), checks = list(ck, c0)) }
firth_add <- function(id, what, data, fm, d, ties = "efron", source, params = NULL, checks = NULL) { r <- firth_out(fm, d, ties); add(id, what, data, r$out, call = "maximum of coxph's log-likelihood + 1/2 log det of its information (init = beta, iter.max = 0)", params = c(list(ties = ties), params), source = source, rel = 1e-6, abs = 1e-8, checks = c(r$checks, checks)); invisible(r$out) }
firth_src <- function(s) paste0(s, "; method of Firth 1993 (Biometrika 80:27) and Heinze & Schemper 2001 (Biometrics 57:114), computed here")
firth_add("firth-lung", "age + sex + ph.ecog, Efron ties", list(file = fl, rows = "ph.ecog not missing"), Surv(time, status) ~ age + sex + ph.ecog, lu, source = firth_src(SRC$surv))
firth_add("firth-lung-strata", "age + sex, stratified by ph.ecog", list(file = fl, rows = "ph.ecog not missing"), Surv(time, status) ~ age + sex + strata(ph.ecog), lu, source = firth_src(SRC$surv), params = list(strata = "ph.ecog"))
firth_add("firth-ovarian", "age + ecog.ps, Efron ties", list(file = fo), Surv(futime, fustat) ~ age + ecog.ps, ov, source = firth_src(SRC$surv))
ve$ct_smallcell <- as.integer(ve$celltype == "smallcell"); ve$ct_adeno <- as.integer(ve$celltype == "adeno"); ve$ct_large <- as.integer(ve$celltype == "large"); ve$trt2 <- as.integer(ve$trt == 2)
for (tt in c("efron", "breslow")) firth_add(paste0("firth-veteran-", tt), paste0("karno + celltype (reference squamous) + trt2, ", tt, " ties"), list(file = fv), Surv(time, status) ~ karno + ct_smallcell + ct_adeno + ct_large + trt2, ve, tt, source = firth_src(SRC$surv))
firth_add("firth-6mp-breslow", "control v 6-MP, heavy ties, Breslow", list(file = fg, x = "g6 = 1 if treat is control"), Surv(time, status) ~ g6, data.frame(gh, g6 = g6), "breslow", source = firth_src("as Freireich"))
hp$tx <- as.integer(hp$transplant) - 1; firth_add("firth-heart-timevarying", "time-varying transplant in (start, stop] rows", list(file = fh), Surv(start, stop, event) ~ age + year + surgery + tx, hp, source = firth_src(SRC$surv))
mono <- data.frame(time = c(1,2,2,3,4,5,5,6,7,8,9,10), status = c(1,1,1,0,1,1,0,0,1,0,0,0), flag = c(1,1,1,1,1,1,0,0,1,0,0,0), size = c(2.1,3.4,1.2,2.2,4.1,2.8,1.9,3.3,0.7,2.5,1.1,3.0))
firth_add("firth-monotone", "every event carries the flag: ordinary Cox has no finite maximum", list(inline_rows = as.list(mono)), Surv(time, status) ~ flag + size, mono, source = firth_src("made up for this base"))
firth_add("firth-monotone-breslow", "the same, Breslow ties", list(inline_rows = as.list(mono)), Surv(time, status) ~ flag + size, mono, "breslow", source = firth_src("made up for this base"))
pr <- data.frame(pair = rep(1:4, each = 2), time = rep(1:2, 4), status = rep(1:0, 4), exposed = rep(1:0, 4)); k <- 4
firth_add("firth-pairs", "four pairs as strata, the exposed one has the event in each: (k + 1/2) log p + 1/2 log(1 - p), so that the ratio is 2k + 1 = 9 exactly", list(inline_rows = as.list(pr)), Surv(time, status) ~ exposed + strata(pair), pr, source = firth_src("made up for this base"), params = list(strata = "pair"),
  checks = list(chk("log(2k + 1)", firth_out(Surv(time, status) ~ exposed + strata(pair), pr)$out$coef$exposed, log(2*k + 1), 1e-8)))
topic_end(here)

## ============================================================ 07 mixed model
topic_begin("07-mixed-model", "Linear mixed model: random intercept and slope, REML and ML")
ss <- as.data.frame(lme4::sleepstudy); ss$Subject <- as.character(ss$Subject); fs <- csv(ss, "sleepstudy"); X <- cbind(1, ss$Days)
r <- lmm_out(Reaction ~ Days + (Days | Subject), ss, ss$Subject, X, X); dv <- attr(r, "lme4_dev"); attr(r, "lme4_dev") <- NULL
tolv <- list(satterthwaite_df = 1e-3, "G, correlation, residual_variance, blup" = 1e-6)
add("lmm-sleep-reml", "Reaction ~ Days, random intercept and slope by Subject, unstructured 2x2 G, REML; fixed effects with SE, G, residual variance, BLUPs, log-likelihood", list(file = fs), r, call = "lmer(Reaction~Days+(Days|Subject)); then own scoring to a zero score", source = "Belenky et al. 2003; lme4::sleepstudy", rel = 1e-7, abs = 1e-8, tol_over = tolv, checks = list(chk("Bates et al. 2015 JSS: criterion 1743.628, fixef 251.405 10.467, SE 6.825 1.546", c(r$deviance_minus2loglik, unlist(r$fixed), unlist(r$se)), c(1743.628,251.405,10.467,6.825,1.546), 1e-3), chk("lme4 deviance", dv[["exact"]], dv[["lme4"]], 1e-6)))
nl <- nlme::lme(Reaction ~ Days, random = ~ Days | Subject, data = ss, control = lmeControl(msTol = 1e-12, tolerance = 1e-12)); invisible(chk("nlme", c(nl$sigma^2, fixef(nl)), c(r$residual_variance, unlist(r$fixed)), 1e-2))
r <- lmm_out(Reaction ~ Days + (Days | Subject), ss, ss$Subject, X, X, REML = FALSE, satt = FALSE); attr(r, "lme4_dev") <- NULL; add("lmm-sleep-ml", "as above by ML", list(file = fs), r, source = "as above", rel = 1e-7, abs = 1e-8, tol_over = tolv, checks = list(chk("Bates et al. 2015: ML deviance 1751.939", r$deviance_minus2loglik, 1751.939, 1e-3)))
r <- lmm_out(Reaction ~ Days + (1 | Subject), ss, ss$Subject, X, X[, 1, drop = FALSE]); attr(r, "lme4_dev") <- NULL; add("lmm-sleep-intercept", "random intercept only, REML", list(file = fs), r, source = "as above", rel = 1e-7, abs = 1e-8, tol_over = tolv)
l0 <- lmm_out(Reaction ~ Days + (1 | Subject), ss, ss$Subject, X, X[,1,drop=FALSE], REML = FALSE, satt = FALSE); l1 <- lmm_out(Reaction ~ Days + (Days | Subject), ss, ss$Subject, X, X, REML = FALSE, satt = FALSE); lr <- 2*(l1$loglik - l0$loglik); add("lmm-sleep-slope-test", "Likelihood ratio (ML) for the random slope; naive chi2(2) p and the 50:50 chi2(1)/chi2(2) mixture p", list(file = fs), c(lrt = lr, p_chi2_2 = pchisq(lr, 2, lower.tail = FALSE), p_mixture = .5*pchisq(lr, 1, lower.tail = FALSE) + .5*pchisq(lr, 2, lower.tail = FALSE)), source = "as above; Self & Liang 1987, Stram & Lee 1994", rel = 1e-6)
or <- as.data.frame(nlme::Orthodont); or$Subject <- as.character(or$Subject); or$age11 <- or$age - 11; or$male <- as.integer(or$Sex == "Male"); fo2 <- csv(or[, c("distance","age","age11","Subject","Sex","male")], "orthodont"); X <- cbind(1, or$age11, or$male, or$age11*or$male)
r <- lmm_out(distance ~ age11*male + (age11 | Subject), or, or$Subject, X, X[,1:2]); attr(r, "lme4_dev") <- NULL; names(r$fixed) <- names(r$se) <- c("(Intercept)","age11","male","age11:male"); add("lmm-orthodont-reml", "distance ~ (age-11)*male with random intercept and slope of age-11, REML, balanced: 27 children x 4", list(file = fo2), r, source = "Potthoff & Roy 1964; nlme::Orthodont", rel = 1e-7, abs = 1e-8, tol_over = tolv)
set.seed(4101); n <- 40; wk <- 0:12; ld <- do.call(rbind, lapply(1:n, function(i) { b <- c(rnorm(1, log(6), .35), rnorm(1, .045, .02)); m <- sort(sample(wk, sample(5:13, 1))); data.frame(participant = sprintf("P%03d", i), week = m, load_kg = round(exp(b[1] + b[2]*m + rnorm(length(m), 0, .08))*2)/2) })); ld <- ld[ld$load_kg > 0, ]; fld <- csv(ld, "loads_sim"); ld$ll <- log(ld$load_kg); X <- cbind(1, ld$week)
r <- lmm_out(ll ~ week + (week | participant), ld, ld$participant, X, X); attr(r, "lme4_dev") <- NULL; r$weekly_percent_change <- c(estimate = 100*(exp(r$fixed$week)-1), lower = 100*(exp(r$wald_lower$week)-1), upper = 100*(exp(r$wald_upper$week)-1)); add("lmm-loads-log", "Unbalanced weekly training loads, log(load_kg) ~ week, random intercept and slope, REML; percent change a week = 100*(exp(slope)-1)", list(file = fld), r, source = "simulated here, R seed 4101", rel = 1e-7, abs = 1e-8, tol_over = tolv)
r <- lmm_out(load_kg ~ week + (week | participant), ld, ld$participant, X, X); attr(r, "lme4_dev") <- NULL; add("lmm-loads-raw", "same, raw load", list(file = fld), r, source = "as above", rel = 1e-7, abs = 1e-8, tol_over = tolv)
r <- lmm_out(Yield ~ 1 + (1 | Batch), as.data.frame(lme4::Dyestuff), lme4::Dyestuff$Batch, matrix(1, 30, 1), matrix(1, 30, 1), satt = FALSE); attr(r, "lme4_dev") <- NULL; fd <- csv(as.data.frame(lme4::Dyestuff), "dyestuff"); add("lmm-dyestuff", "One-way random effects; balanced, so REML equals ANOVA estimates", list(file = fd), r, source = "Davies & Goldsmith 1972; lme4::Dyestuff", rel = 1e-8, checks = list(chk("Bates: variances 1764 and 2451, REML 319.6543", c(r$G, r$residual_variance, r$deviance_minus2loglik), c(1764.05,2451.25,319.6543), 1e-2)))
topic_end(here)

## ============================================================ 08 progression
topic_begin("08-progression", "Load progression: Theil-Sen, quantile bands, time to a load, rule adherence")
ts1 <- theil_sen(cars$speed, cars$dist); fca <- csv(cars, "cars"); add("theilsen-cars", "Theil-Sen slope (median of pairwise slopes, pairs with equal x left out), two intercept conventions, Kendall-based 95% limits (Sen 1968; interpolated between order statistics; variance corrected for ties), Mann-Kendall z and p with continuity correction", list(file = fca, x = "speed", y = "dist"), as.list(ts1), source = "R datasets::cars (Ezekiel 1930)", rel = 1e-10, checks = list(chk("scipy 1.17 theilslopes: slope 11/3, intercepts -19 (medians) and -15.667 (residuals)", ts1[c("slope","intercept_median_medians","intercept_median_residual")], c(11/3,-19,-47/3), 1e-12), chk("scipy limits (rounded ranks) bracket", abs(ts1[c("lower_interpolated","upper_interpolated")] - c(2.93333333333333,4.5)) < .03, 1, 0)))
an <- datasets::anscombe; fan <- csv(an, "anscombe"); for (i in 1:4) if (i != 4) add(paste0("theilsen-anscombe", i), "as above", list(file = fan, x = paste0("x", i), y = paste0("y", i)), as.list(theil_sen(an[[paste0("x", i)]], an[[paste0("y", i)]])), source = "Anscombe 1973; R datasets", rel = 1e-10)
lh <- data.frame(year = 1875:1972, level = as.numeric(LakeHuron)); flh <- csv(lh, "lakehuron"); add("theilsen-lakehuron", "n=98 trend", list(file = flh, x = "year", y = "level"), as.list(theil_sen(lh$year, lh$level)), source = "R datasets::LakeHuron", rel = 1e-10)
p1 <- ld[ld$participant == names(which.max(table(ld$participant))), ]; add("theilsen-loads-one", "one participant's loads by week", list(file = fld, rows = paste("participant =", p1$participant[1]), x = "week", y = "load_kg"), as.list(theil_sen(p1$week, p1$load_kg)), source = "as loads_sim", rel = 1e-10)
slopes <- sapply(split(ld, ld$participant), function(q) theil_sen(q$week, q$load_kg)["slope"]); add("theilsen-loads-all", "Median over participants of each participant's Theil-Sen slope, and quartiles (type 7)", list(file = fld), c(n = length(slopes), median = median(slopes), q25 = unname(quantile(slopes, .25)), q75 = unname(quantile(slopes, .75))), source = "as loads_sim", rel = 1e-10)
pr <- c(.05,.1,.25,.5,.75,.9,.95); qb <- lapply(split(ld$load_kg, ld$week), function(v) list(n = length(v), type7 = A(unname(quantile(v, pr, type = 7))), type6 = A(unname(quantile(v, pr, type = 6))), type8 = A(unname(quantile(v, pr, type = 8))), mean = mean(v), sd = sd(v))); names(qb) <- paste0("week", names(qb)); add("quantile-bands-loads", "Per-week quantiles of load (Hyndman-Fan types 7, 6, 8) at p=.05 .1 .25 .5 .75 .9 .95", list(file = fld), qb, params = list(p = A(pr)), source = "as loads_sim; Hyndman & Fan 1996", rel = 1e-12)
medci <- function(v, p = .5, conf = .95) { n <- length(v); s <- sort(v); a <- (1-conf)/2; l <- qbinom(a, n, p); u <- qbinom(1-a, n, p) + 1; c(n = n, estimate = unname(quantile(v, p)), rank_lower = max(l, 0), rank_upper = u, lower = if (l < 1) -Inf else s[l], upper = if (u > n) Inf else s[u], coverage = pbinom(u-1, n, p) - pbinom(l-1, n, p)) }
add("median-ci-loads-week0", "Order-statistic (binomial) 95% CI for the median of load at week 6: ranks l=qbinom(.025,n,.5), u=qbinom(.975,n,.5)+1", list(file = fld, rows = "week = 6"), as.list(medci(ld$load_kg[ld$week == 6])), source = SRC$calc, rel = 1e-12)
tgt <- 8; tt <- do.call(rbind, lapply(split(ld, ld$participant), function(q) { h <- q$week[q$load_kg >= tgt]; if (length(h)) data.frame(participant = q$participant[1], time = min(h), event = 1, last_below = if (any(q$week < min(h))) max(q$week[q$week < min(h)]) else NA) else data.frame(participant = q$participant[1], time = max(q$week), event = 0, last_below = max(q$week)) }))
add("time-to-load-8kg", "Time (weeks) to first logged load >= 8 kg; no log at or above 8 -> censored at last logged week. Derived rows, Kaplan-Meier quantiles and values (events at week 0 count at time 0)", list(file = fld), list(participant = A(tt$participant), time = A(tt$time), event = A(tt$event), n_events = sum(tt$event), km = km_at(tt$time, tt$event, c(0,2,4,6,8,10,12)), quantiles = km_q(tt$time, tt$event)), source = "as loads_sim", rel = 1e-10)
L <- ifelse(tt$event == 1, ifelse(is.na(tt$last_below), 0, tt$last_below), tt$time); R <- ifelse(tt$event == 1, tt$time, Inf); k0 <- R > 0; add("time-to-load-8kg-interval", "Same onset seen as interval-censored between the last log below and the first at or above 8 kg ((0,R] when the first log qualifies; those at or above at week 0 left out)", list(file = fld), c(list(n = sum(k0)), npmle_out(L[k0], R[k0], at = c(2,4,6,8,10,12))), source = "as loads_sim", rel = 1e-8, abs = 1e-10)
steps <- do.call(rbind, lapply(split(ld, ld$participant), function(q) { q <- q[order(q$week),]; k <- which(diff(q$week) == 1); if (!length(k)) return(NULL); data.frame(participant = q$participant[1], week_to = q$week[k+1], ratio = q$load_kg[k+1]/q$load_kg[k], d = q$load_kg[k+1] - q$load_kg[k]) }))
ok <- steps$ratio <= 1.1 + 1e-12; cl <- steps$participant; y <- tapply(ok, cl, sum); m <- tapply(ok, cl, length); ph <- sum(y)/sum(m); G <- length(m); sec <- sqrt(sum((y - ph*m)^2)/sum(m)^2*G/(G-1)); add("rule-adherence-10pc", "Share of steps between logs exactly one week apart whose ratio load(t+1)/load(t) <= 1.10 (no lower bound); pooled proportion, Wilson CI ignoring clustering, ratio-estimator SE clustered by participant with G/(G-1), CI with t on G-1 df; mean of participants' own proportions", list(file = fld), c(list(n_steps = length(ok), n_ok = sum(ok), n_participants = G, pooled = ph), list(wilson = wilson(sum(ok), length(ok)), cluster_se = sec, cluster_lower = ph - qt(.975, G-1)*sec, cluster_upper = ph + qt(.975, G-1)*sec, mean_of_participant_proportions = mean(y/m), n_increase = sum(steps$d > 0), n_same = sum(steps$d == 0), n_decrease = sum(steps$d < 0), median_ratio = median(steps$ratio))), params = list(max_ratio = 1.1), source = "as loads_sim", rel = 1e-10, note = "11 kg / 10 kg must count as within 10%: compare with a small slack or in integers")
topic_end(here)

## ============================================================ 09 GLM
topic_begin("09-glm", "Poisson, negative binomial, logistic, GEE")
brf <- br; f <- glm(deaths ~ smoke + factor(age) + offset(log(person_years)), family = poisson, data = br, control = tight); o <- glm_out(f, hc = TRUE); o <- lapply(o, function(z) { if (is.list(z) && !is.null(names(z))) names(z) <- gsub("factor(age)", "age", names(z), fixed = TRUE); z }); add("poisson-doctors", "Poisson regression of deaths on smoke + age (five levels, reference 40), offset log(person_years); exp(coef) are rate ratios; HC0 sandwich SE", list(file = "datasets/breslow_doctors.csv"), o, call = "glm(deaths~smoke+factor(age)+offset(log(person_years)),poisson)", source = "as breslow_doctors", rel = 1e-8, checks = list(chk("textbook smoke 0.3545, SE 0.1074", c(o$coef$smoke, o$se$smoke), c(.3545,.1074), 6e-5)))
qu <- MASS::quine; fq <- csv(qu, "quine"); f <- MASS::glm.nb(Days ~ Eth + Sex + Age + Lrn, data = qu, control = glm.control(epsilon = 1e-14, maxit = 200)); o <- glm_out(f); o$theta <- f$theta; o$theta_se <- f$SE.theta; o$loglik <- as.numeric(logLik(f)); add("negbin-quine", "Negative binomial (NB2, theta by ML): Days ~ Eth + Sex + Age + Lrn (treatment contrasts, reference A, F, F0, AL)", list(file = fq), o, call = "MASS::glm.nb", source = "Quine 1975; MASS::quine", rel = 1e-6, tol_over = list(theta_se = 1e-5), checks = list(chk("Venables & Ripley: theta 1.2749", f$theta, 1.2749, 1e-3)), note = "alpha (dispersion) = 1/theta")
set.seed(711); nb <- data.frame(id = 1:120, site = rep(1:8, each = 15), arm = rbinom(120, 1, .5), py = round(runif(120, .3, 2.5), 2)); nb$events <- rnbinom(120, size = .8, mu = nb$py*exp(-.2 + .5*nb$arm + rep(rnorm(8, 0, .3), each = 15))); fnb <- csv(nb, "recurrent_sim"); f <- MASS::glm.nb(events ~ arm + offset(log(py)), data = nb, control = glm.control(epsilon = 1e-14, maxit = 200)); o <- glm_out(f); o$theta <- f$theta; o$theta_se <- f$SE.theta; add("negbin-offset", "Negative binomial rate ratio with offset log(py)", list(file = fnb), o, source = "simulated here, R seed 711", rel = 1e-6)
f <- glm(events ~ arm + offset(log(py)), family = poisson, data = nb, control = tight); o <- glm_out(f, hc = TRUE, cl = nb$site); add("poisson-cluster-site", "Poisson with offset, HC0 and site-clustered sandwich SE (without and with G/(G-1))", list(file = fnb), o, call = "sandwich::vcovCL(type='HC0', cadjust=FALSE)", source = "as above", rel = 1e-8)
bw <- MASS::birthwt; bw$race <- factor(bw$race); fbw <- csv(bw, "birthwt"); f <- glm(low ~ age + lwt + race + smoke + ptl + ht + ui, family = binomial, data = bw, control = tight); add("logistic-birthwt", "Logistic regression with Wald and profile-likelihood limits (profile limits are on the log-odds scale)", list(file = fbw), glm_out(f, hc = TRUE, profile = TRUE), call = "glm(low~age+lwt+race+smoke+ptl+ht+ui,binomial)", source = "Hosmer & Lemeshow 1989; MASS::birthwt", rel = 1e-8, tol_over = list(profile_lower = 1e-4, profile_upper = 1e-4))
io <- esoph; f <- glm(cbind(ncases, ncontrols) ~ agegp + unclass(tobgp) + unclass(alcgp), data = { z <- io; z$agegp <- factor(as.character(z$agegp)); z }, family = binomial(), control = tight); fe <- csv(data.frame(agegp = io$agegp, alc = unclass(io$alcgp), tob = unclass(io$tobgp), ncases = io$ncases, ncontrols = io$ncontrols), "esoph"); o <- glm_out(f); nm <- gsub("unclass\\((...)gp\\)", "\\1", names(coef(f))); o <- lapply(o, function(z) { if (is.list(z) && !is.null(names(z))) names(z) <- nm; z }); add("logistic-grouped-esoph", "Grouped binomial (ncases of ncases+ncontrols), dummy age (reference 25-34) + linear tob + alc scores", list(file = fe), o, source = "Breslow & Day 1980; R datasets::esoph", rel = 1e-8)
oh <- geepack::ohio; foh <- csv(oh, "ohio"); for (cs in c("independence","exchangeable")) { f <- geepack::geeglm(resp ~ age + smoke + age:smoke, id = id, data = oh, family = binomial, corstr = cs, scale.fix = TRUE, control = geese.control(epsilon = 1e-12, maxit = 200)); s <- summary(f); nm <- names(coef(f)); add(paste0("gee-ohio-", cs), "Logistic GEE, cluster = id, robust (sandwich) SE without small-sample factor, scale fixed at 1", list(file = foh), list(coef = as.list(coef(f)), robust_se = setNames(as.list(s$coefficients[,2]), nm), alpha = if (cs == "independence") NULL else s$corr[1,1]), call = "geepack::geeglm(scale.fix=TRUE)", source = "Laird & Ware six-city data; geepack::ohio", rel = 1e-6, tol_over = list(alpha = 1e-4)) }
topic_end(here)

## ============================================================ 10 reliability
topic_begin("10-reliability", "Agreement and reliability of measurements")
pe <- data.frame(subject = 1:17, wright1 = c(494,395,516,434,476,557,413,442,650,433,417,656,267,478,178,423,427), wright2 = c(490,397,512,401,470,611,415,431,638,429,420,633,275,492,165,372,421), mini1 = c(512,430,520,428,500,600,364,380,658,445,432,626,260,477,259,350,451), mini2 = c(525,415,508,444,500,625,460,390,642,432,420,605,227,467,268,370,443)); fp <- csv(pe, "pefr")
b <- bland_altman(pe$wright1, pe$mini1); add("bland-altman-pefr", "Bland-Altman of wright1 minus mini1: bias with t CI, limits bias +- 1.96(qnorm .975)*sd, CI of the limits with SE = sd*sqrt(1/n + z^2/(2(n-1))) and t on n-1, the 1986 rough SE sqrt(3 sd^2/n), and exact limits by noncentral t (Carkeet 2015)", list(file = fp), as.list(b), source = "Bland & Altman. Lancet 1986;i:307-310 (typed from memory; checks reproduce the paper's summary figures)", rel = 1e-9, tol_over = list("exact_*" = 1e-7), checks = list(chk("1986 paper: mean -2.1, SD 38.8", b[c("bias","sd_diff")], c(-2.1,38.8), .06), chk("1986 paper: bias CI -22.0 to 17.8", b[c("bias_lower","bias_upper")], c(-22,17.8), .1)))
t1 <- tem(pe$wright1, pe$wright2); t2 <- tem(pe$mini1, pe$mini2); add("tem-wright", "Technical error of measurement, two trials: sqrt(sum d^2/2n), relative %, bias-free sd(d)/sqrt 2", list(file = fp), as.list(t1), source = "as above", rel = 1e-11, checks = list(chk("1999 paper: within-subject SD 15.3 (wright)", t1["tem_dahlberg"], 15.3, .05))); add("tem-mini", "as above", list(file = fp), as.list(t2), source = "as above", rel = 1e-11, checks = list(chk("within-subject SD 19.9 (mini)", t2["tem_dahlberg"], 19.9, .1)))
for (k in list(c("wright1","wright2"), c("mini1","mini2"), c("wright1","mini1"))) add(paste0("icc-", k[1], "-", k[2]), "ICC forms with 95% CI from the two-way ANOVA; SEM and SDC95 = 1.96(qnorm)*sqrt2*SEM", list(file = fp, columns = A(k)), icc(as.matrix(pe[, k])), source = "as above", rel = 1e-9)
sf <- data.frame(target = 1:6, j1 = c(9,6,8,7,10,6), j2 = c(2,1,4,1,5,2), j3 = c(5,3,6,2,6,4), j4 = c(8,2,8,6,9,7)); fsf <- csv(sf, "shrout_fleiss"); o <- icc(as.matrix(sf[,-1])); ps <- psych::ICC(sf[,-1], lmer = FALSE)$results
add("icc-shrout-fleiss", "Six ICC forms with CI: Shrout & Fleiss (1,1),(2,1)=A1,(3,1)=C1 and k-averages", list(file = fsf), o, call = "psych::ICC(lmer=FALSE)", source = "Shrout & Fleiss. Psychol Bull 1979;86:420-428", rel = 1e-9, checks = list(chk("published .17 .29 .71 .44 .62 .91", c(o$icc_1_1[1], o$icc_2_1_A1[1], o$icc_3_1_C1[1], o$icc_1_k[1], o$icc_2_k_Ak[1], o$icc_3_k_Ck[1]), c(.17,.29,.71,.44,.62,.91), 6e-3), chk("psych::ICC estimates", c(o$icc_1_1[1], o$icc_2_1_A1[1], o$icc_3_1_C1[1]), ps$ICC[1:3], 1e-9), chk("psych lower", c(o$icc_1_1[2], o$icc_2_1_A1[2], o$icc_3_1_C1[2]), ps$`lower bound`[1:3], 1e-6), chk("psych upper", c(o$icc_1_1[3], o$icc_2_1_A1[3], o$icc_3_1_C1[3]), ps$`upper bound`[1:3], 1e-6)))
topic_end(here)

## ============================================================ 11 missing data, bootstrap, RNG
topic_begin("11-missing-bootstrap-rng", "Missing-data summaries, bootstrap with a fixed generator, generator test vectors")
aq <- datasets::airquality; faq <- csv(aq, "airquality"); pat <- apply(is.na(aq), 1, function(z) paste(as.integer(z), collapse = "")); tb <- sort(table(pat), decreasing = TRUE); add("missing-airquality", "Missing counts by column, complete rows, patterns (1 = missing, column order of the file)", list(file = faq), list(n = nrow(aq), missing = as.list(colSums(is.na(aq))), complete_rows = sum(complete.cases(aq)), patterns = as.list(setNames(as.integer(tb), names(tb)))), source = "R datasets::airquality", rel = 0, abs = 0)
vis <- data.frame(subject = rep(1:6, each = 5), visit_month = rep(c(0,3,6,9,12), 6), volume = c(2100,2110,NA,2130,2140, 1900,1905,1910,NA,NA, 2500,NA,NA,NA,NA, 2200,2210,2225,2230,2260, NA,2010,2030,2040,NA, 1800,1810,NA,1830,1825)); fvi <- csv(vis, "visits_missing"); w <- reshape(vis, idvar = "subject", timevar = "visit_month", direction = "wide"); mm <- is.na(w[,-1]); mono <- apply(mm, 1, function(z) { l <- max(c(0, which(!z))); if (l == 0) TRUE else !any(z[seq_len(l)]) })
add("missing-visits", "By visit: expected, observed, percent missing; by subject: monotone (drop-out only) or intermittent", list(file = fvi), list(by_visit = list(month = A(c(0,3,6,9,12)), observed = A(unname(colSums(!mm))), missing = A(unname(colSums(mm))), percent_missing = A(unname(100*colMeans(mm)))), subjects_monotone = sum(mono), subjects_intermittent = sum(!mono), subjects_complete = sum(rowSums(mm) == 0)), source = "made up for this base")
# bootstrap: with given replicates, so that it is independent of a generator
set.seed(20240117); x <- round(rexp(25, 1/8), 2); B <- 999; idx <- matrix(sample.int(25, 25*B, TRUE), B); th <- apply(idx, 1, function(i) mean(x[i])); jk <- sapply(1:25, function(i) mean(x[-i])); t0 <- mean(x); bo <- boot(x, function(d, i) mean(d[i]), R = 2); bo$R <- B; bo$t <- matrix(th); bo$t0 <- t0
bc <- boot.ci(bo, type = c("norm","basic","perc")); z0 <- qnorm((sum(th < t0))/B); Lj <- mean(jk) - jk; acc <- sum(Lj^3)/(6*sum(Lj^2)^1.5); al <- pnorm(z0 + (z0 + qnorm(c(.025,.975)))/(1 - acc*(z0 + qnorm(c(.025,.975))))); csv(data.frame(replicate = th), "bootstrap_replicates")
ni <- function(p) { rk <- (B+1)*p; k <- trunc(rk); s <- sort(th); ifelse(k == rk, s[k], s[k] + (qnorm(p) - qnorm(k/(B+1)))/(qnorm((k+1)/(B+1)) - qnorm(k/(B+1)))*(s[k+1]-s[k])) }
add("bootstrap-given-replicates", "Given 999 replicates of the mean of x: bootstrap SE (sd with n-1), bias; percentile and basic limits by the (B+1)p order statistic rule with normal interpolation (boot.ci) and by type-7 quantiles; BCa with z0 from share of replicates below the estimate and jackknife acceleration", list(file = "datasets/bootstrap_replicates.csv", inline_rows = list(x = A(x))), list(estimate = t0, se = sd(th), bias = mean(th) - t0, normal = A(bc$normal[2:3]), percentile_bootci = A(bc$percent[4:5]), basic_bootci = A(bc$basic[4:5]), percentile_type7 = A(unname(quantile(th, c(.025,.975)))), z0 = z0, acceleration = acc, bca_levels = A(al), bca_normal_interp = A(sapply(al, ni)), bca_type7 = A(unname(quantile(th, al)))), call = "boot.ci", source = "simulated here, R seed 20240117; Efron 1987, DiCiccio & Efron 1996", rel = 1e-9)
add("bootstrap-exact-variance-of-mean", "Generator-free check: the ideal bootstrap variance of the mean is sum((x-mean)^2)/n^2; a seeded run of B=20000 must agree within 5 Monte-Carlo SE (relative 5*sqrt(2/B)=5%)", list(inline_rows = list(x = A(x))), c(ideal_se = sqrt(sum((x-mean(x))^2))/25), source = "Efron 1979", rel = .05)
md <- sort(c(3,1,4,1.5,9,2.6,5)); n <- 7; m <- 4; pmed <- sapply(1:n, function(k) sum(dbinom(0:(m-1), n, (k-1)/n)) - sum(dbinom(0:(m-1), n, k/n))); add("bootstrap-exact-median", "Generator-free: exact bootstrap distribution of the median for n=7 (Efron 1982): probability that the resampled median equals the k-th order statistic, mean and SE", list(inline_rows = list(x = A(md))), list(prob = A(pmed), mean = sum(pmed*md), se = sqrt(sum(pmed*md^2) - sum(pmed*md)^2)), source = "Efron 1982, The Jackknife, the Bootstrap, ch. 10", rel = 1e-12, note = "a seeded run of B replicates agrees within 5 binomial SE")
rv <- file.path(here, "rng-vectors.json"); if (file.exists(rv)) { V <- jsonlite::fromJSON(rv, simplifyVector = FALSE); for (k in names(V)) add(paste0("rng-", k), V[[k]]$what, list(inline = V[[k]]$seed), V[[k]]$expected, source = V[[k]]$source, rel = 0, abs = 0) }
topic_end(here)

## ============================================================ 13 NIST StRD
topic_begin("13-nist", "NIST StRD certified values (linear regression, ANOVA, univariate)")
no <- read.csv(file.path(D, "nist_norris.csv")); f <- lm(y ~ x, no); add("norris", "Simple linear regression", list(file = "datasets/nist_norris.csv"), list(b0 = -0.262323073774029, b1 = 1.00211681802045, se_b0 = 0.232818234301152, se_b1 = 0.429796848199937e-3, residual_sd = 0.884796396144373, r_squared = 0.999993745883712, F = 5436385.54079785), source = "NIST StRD Norris, certified values read from the public-domain file shipped with scipy", rel = 1e-9, checks = list(chk("R lm", coef(f), c(-0.262323073774029, 1.00211681802045), 1e-10)))
lo <- datasets::longley; lo <- lo[, c(7,1:6)]; names(lo) <- c("y","x1","x2","x3","x4","x5","x6"); fl2 <- csv(lo, "nist_longley"); lo$y <- lo$y; cert <- c(-3482258.63459582,15.0618722713733,-.358191792925910e-1,-2.02022980381683,-1.03322686717359,-.511041056535807e-1,1829.15146461355); f <- lm(I(y*1000) ~ x1 + I(x2*1000) + I(x3*10) + I(x4*10) + I(x5*1000) + x6, data = { z <- lo; z$x2 <- lo$x2; z }); f2 <- NULL
# the R copy has scaled columns; restore NIST's units: GNP.deflator, GNP (millions = x1000), Unemployed (x10), Armed.Forces (x10), Population (x1000), Year, Employed (x1000)
ln <- data.frame(y = round(lo$y*1000), x1 = lo$x1, x2 = round(lo$x2*1000), x3 = round(lo$x3*10), x4 = round(lo$x4*10), x5 = round(lo$x5*1000), x6 = lo$x6); csv(ln, "nist_longley"); f <- lm(y ~ ., ln); add("longley", "Multiple regression, badly conditioned", list(file = fl2), list(coef = A(cert)), source = "NIST StRD Longley (certified values from memory; R's lm agrees)", rel = 1e-7, checks = list(chk("R lm relative", coef(f)/cert, 1, 1e-9)))
for (v in list(list("wampler1", function(x) 1+x+x^2+x^3+x^4+x^5, rep(1,6)), list("wampler2", function(x) 1+.1*x+.01*x^2+.001*x^3+1e-4*x^4+1e-5*x^5, 10^-(0:5)))) { x <- 0:20; add(v[[1]], "Degree-5 polynomial through 21 exact points (x=0..20, y by the formula): coefficients, residual SD 0", list(inline_rows = list(x = A(x), y = A(v[[2]](x)))), list(coef = A(v[[3]]), residual_sd = 0), source = "NIST StRD Wampler1/2 (formula from memory)", rel = 1e-7, abs = 1e-7) }
add("noint1", "Regression through the origin", list(inline_rows = list(x = A(60:70), y = A(130:140))), c(b1 = 2.07438016528926, se_b1 = 0.165289256198347e-1, residual_sd = 3.56753034006338), source = "NIST StRD NoInt1 (from memory; R agrees)", rel = 1e-10, checks = list(chk("R", coef(lm(I(130:140) ~ 0 + I(60:70))), 2.07438016528926, 1e-13)))
add("noint2", "Regression through the origin", list(inline_rows = list(x = A(c(4,5,6)), y = A(c(3,4,4)))), c(b1 = 0.727272727272727, se_b1 = 0.420827318078432e-1, residual_sd = 0.369274472937998), source = "NIST StRD NoInt2 (from memory; R agrees)", rel = 1e-10, checks = list(chk("R", coef(lm(c(3,4,4) ~ 0 + c(4,5,6))), 8/11, 1e-13)))
NA_ <- jsonlite::fromJSON(file.path(here, "nist-anova.json")); for (k in c("SiRstv","AtmWtAg","SmLs01","SmLs07")) { d <- read.csv(file.path(D, paste0("nist_", tolower(k), ".csv"))); z <- NA_[[k]]; g <- function(q) as.numeric(z[[q]]); add(paste0("anova-", k), "One-way ANOVA: sums of squares, F, R-squared, residual SD", list(file = paste0("datasets/nist_", tolower(k), ".csv")), list(n = z$n, df_between = g("df_between"), df_within = g("df_within"), ss_between = g("ss_between"), ss_within = g("ss_within"), F = g("F"), r_squared = g("r_squared"), residual_sd = g("residual_sd")), source = paste("NIST StRD", k, "read from the public-domain file shipped with scipy"), rel = if (k == "SmLs07") 1e-3 else if (k == "AtmWtAg") 1e-8 else 1e-9, note = if (k == "SmLs07") "12 leading digits: stored doubles carry only ~1e-4 of the 0.1 steps; a naive sum of squares gives nonsense, a two-pass mean keeps ~3 digits" else NULL) }
na <- list(numacc1 = list(c(10000001,10000003,10000002), 10000002, 1, "x1=10000001,x2=10000003,x3=10000002"), numacc2 = list(c(1.2, rep(c(1.1,1.3), 500)), 1.2, .1, "1.2 then 1.1,1.3 repeated 500 times"), numacc3 = list(c(1000000.2, rep(c(1000000.1,1000000.3), 500)), 1000000.2, .1, "1000000.2 then 1000000.1,1000000.3 x500"), numacc4 = list(c(10000000.2, rep(c(10000000.1,10000000.3), 500)), 10000000.2, .1, "10000000.2 then 10000000.1,10000000.3 x500")); for (k in names(na)) add(k, "Mean and standard deviation (n-1)", list(rule = na[[k]][[4]]), c(n = length(na[[k]][[1]]), mean = na[[k]][[2]], sd = na[[k]][[3]]), source = "NIST StRD NumAcc (from memory; certified values exact)", rel = if (k == "numacc4") 1e-7 else if (k == "numacc3") 1e-8 else 1e-12, checks = list(chk("R sd", sd(na[[k]][[1]]), na[[k]][[3]], 1e-7)))
topic_end(here)
