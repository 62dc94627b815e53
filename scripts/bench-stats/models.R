# R's side of the model and bootstrap tasks.
suppressPackageStartupMessages({ library(lme4); library(boot); library(MASS) })

tasks[["mixed-model-52-weeks"]] <- function(d) {
  f <- suppressWarnings(lmer(y ~ week + (week | id), d))
  c(-2 * as.numeric(logLik(f)), fixef(f))
}

restricted_mean <- function(d) {
  f <- survfit(Surv(day, cause == 1) ~ 1, d, se.fit = FALSE)
  survival:::survmean(f, rmean = 730)$matrix[["rmean"]]
}
tasks[["bootstrap-2000-rmst"]] <- function(d) {
  set.seed(1)
  b <- boot(d[c("day", "cause")], function(d, i) restricted_mean(d[i, ]), 2000)
  c(b$t0, sd(b$t))
}

count_numbers <- function(f) c(coef(f), sqrt(diag(vcov(f))))
tasks[["poisson-offset"]] <- function(d) count_numbers(glm(y ~ x + g + offset(log(py)), poisson, d))
tasks[["negative-binomial-offset"]] <- function(d) {
  f <- glm.nb(y ~ x + g + offset(log(py)), d)
  c(count_numbers(f), f$theta)
}

tasks[["theil-sen"]] <- function(d) {
  n <- nrow(d)
  dx <- outer(d$week, d$week, "-"); dy <- outer(d$load, d$load, "-"); pair <- upper.tri(dx)
  dx <- dx[pair]; dy <- dy[pair]; S <- sum(sign(dx) * sign(dy))
  slopes <- sort(dy[dx != 0] / dx[dx != 0]); N <- length(slopes)
  tx <- as.numeric(table(d$week)); ty <- as.numeric(table(d$load))
  ties <- function(t) sum(t * (t - 1) * (2 * t + 5))
  v <- (n * (n - 1) * (2 * n + 5) - ties(tx) - ties(ty)) / 18 +
    sum(tx * (tx - 1)) * sum(ty * (ty - 1)) / (2 * n * (n - 1)) +
    sum(tx * (tx - 1) * (tx - 2)) * sum(ty * (ty - 1) * (ty - 2)) / (9 * n * (n - 1) * (n - 2))
  C <- qnorm(0.975) * sqrt(v)
  at <- function(r) { low <- floor(r); slopes[low] + (r - low) * (slopes[ceiling(r)] - slopes[low]) }
  c(median(slopes), at((N - C) / 2), at((N + C) / 2 + 1), S)
}
