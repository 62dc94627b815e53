# R's side of the survival tasks. Each takes the columns as a data frame and returns the numbers to compare.
suppressPackageStartupMessages(library(survival))

km_numbers <- function(time, event) {
  f <- survfit(Surv(time, event) ~ 1, conf.type = "log-log")
  s <- summary(f, times = c(365, 1000))
  c(s$surv, s$std.err, s$lower)
}
tasks[["kaplan-meier-days"]] <- function(d) km_numbers(d$day, d$cause == 1)
tasks[["kaplan-meier-continuous"]] <- function(d) km_numbers(d$time, d$cause == 1)

tasks[["log-rank-4-groups"]] <- function(d) {
  z <- survdiff(Surv(day, cause == 1) ~ group, d)
  c(z$chisq, z$exp)
}

tasks[["aalen-johansen-days"]] <- function(d) {
  f <- survfit(Surv(day, factor(cause)) ~ 1, d)
  s <- summary(f, times = c(365, 1000))
  c(s$pstate[, 2], s$std.err[, 2])
}

cox_numbers <- function(f) c(f$loglik[2], coef(f), sqrt(diag(f$var)))
tasks[["cox-5-days-efron"]] <- function(d) cox_numbers(coxph(Surv(day, cause == 1) ~ x1 + x2 + x3 + x4 + x5, d))
tasks[["cox-5-continuous"]] <- function(d) cox_numbers(coxph(Surv(time, cause == 1) ~ x1 + x2 + x3 + x4 + x5, d))
tasks[["cox-5-days-cluster"]] <- function(d) cox_numbers(coxph(Surv(day, cause == 1) ~ x1 + x2 + x3 + x4 + x5, d, cluster = site))

# Innermost intervals, then EM, then Newton on the sets with mass until the KKT gap is closed.
npmle <- function(L, R) {
  p <- rbind(data.frame(v = L, type = 2, left = TRUE), data.frame(v = R, type = 1, left = FALSE))
  p <- unique(p[order(p$v, p$type), ])
  k <- which(p$left[-nrow(p)] & !p$left[-1])
  q <- p$v[k]; r <- p$v[k + 1]
  key <- paste(findInterval(L, q, left.open = TRUE), findInterval(R, r)); u <- !duplicated(key)
  w <- as.numeric(table(factor(key, levels = key[u]))); l <- L[u]; h <- R[u]
  M <- outer(l, q, "<=") & outer(h, r, ">="); storage.mode(M) <- "double"
  W <- sum(w); x <- rep(1 / length(q), length(q))
  for (i in 1:300) x <- x * as.vector(crossprod(M, w / as.vector(M %*% x))) / W
  on <- x > 1e-6
  x[!on] <- 0; x <- x / sum(x)
  for (outer in 1:200) {
    for (i in 1:100) {
      B <- M[, on, drop = FALSE]; f <- as.vector(B %*% x[on]); g <- as.vector(crossprod(B, w / f)) - W
      d <- as.vector(solve(crossprod(B * (sqrt(w) / f)), g)); s <- 1
      if (any(x[on] + d < 0)) s <- min((x[on] / -d)[d < 0 & x[on] + d < 0])
      x[on] <- x[on] + s * d
      drop <- which(on)[x[on] < 1e-13]; x[drop] <- 0; on[drop] <- FALSE
      if (length(drop) == 0 && max(abs(s * d)) < 1e-14) break
    }
    x <- x / sum(x); f <- as.vector(M %*% x); g <- as.vector(crossprod(M, w / f)); j <- which.max(g)
    if (g[j] <= W * (1 + 1e-12)) break
    on[j] <- TRUE; x[j] <- x[j] + 1e-6; x <- x / sum(x)
  }
  list(loglik = sum(w * log(f)), free = function(t) 1 - sum(x[r <= t]))
}
tasks[["interval-onset"]] <- function(d) {
  o <- npmle(d$left, d$right)
  c(o$loglik, o$free(365), o$free(1000))
}
