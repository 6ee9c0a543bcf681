# The four log marginal likelihoods with R's parts: nested integrate() over dt(..., ncp).
# Rscript quadrature.R STUDIES.csv     prints one line a model: id, natural log, seconds
rows <- read.csv(commandArgs(trailingOnly = TRUE)[1])
df <- rows$n1 + rows$n2 - 2
n <- rows$n1 * rows$n2 / (rows$n1 + rows$n2)
t <- rows$t

log_likelihood <- function(mean, spread) {
  s <- sqrt(1 + n * spread^2)
  vapply(mean, function(m) sum(suppressWarnings(dt(t / s, df, m * sqrt(n) / s, log = TRUE)) - log(s)), 0)
}
shift <- log_likelihood(sum(t * sqrt(n)) / sum(n), 0) # so that nothing underflows
spread_prior <- function(spread) exp(log(0.15) - 2 * log(spread) - 0.15 / spread)
pieces <- function(f, cuts) {
  sum(mapply(function(a, b) integrate(f, a, b, rel.tol = 1e-8, abs.tol = 1e-13, subdivisions = 500)$value,
             head(cuts, -1), tail(cuts, -1)))
}
# Beyond |mean| = 30 the likelihood is nothing, and dt with such ncp is not to be trusted.
over_mean <- function(spread) {
  pieces(function(m) dcauchy(m, 0, 1 / sqrt(2)) * exp(log_likelihood(m, spread) - shift),
         c(-30, -1, 0, 0.5, 1, 2, 30))
}
over_spread <- function(f) {
  pieces(function(s) spread_prior(s) * vapply(s, f, 0), c(1e-4, 0.1, 0.3, 1, 3, 100))
}
say <- function(name, work) {
  took <- system.time(value <- log(work()) + shift)[["elapsed"]]
  cat(sprintf("%s,%.12f,%.3f\n", name, value, took))
}
say("fixed_null", function() exp(log_likelihood(0, 0) - shift))
say("fixed_effect", function() over_mean(0))
say("random_null", function() over_spread(function(s) exp(log_likelihood(0, s) - shift)))
say("random_effect", function() over_spread(over_mean))
