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
