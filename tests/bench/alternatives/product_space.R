# The same four models in JAGS by a product space: the model is a parameter, and how often each is
# visited gives the Bayes factors against `fixed_null`. The noncentral t is written as the Normal and
# chi-square it is made of.
# Rscript product_space.R STUDIES.csv SECONDS     prints: id, log Bayes factor against fixed_null, its standard error
library(rjags)
arguments <- commandArgs(trailingOnly = TRUE)
rows <- read.csv(arguments[1])
budget <- as.numeric(arguments[2])
df <- rows$n1 + rows$n2 - 2
n <- rows$n1 * rows$n2 / (rows$n1 + rows$n2)

model <- "model {
  m ~ dcat(weight[])
  has_effect <- equals(m, 2) + equals(m, 4)
  varies <- equals(m, 3) + equals(m, 4)
  mean ~ dt(0, 2, 1)             # Cauchy(0, 1/sqrt(2))
  inverse ~ dgamma(1, 0.15)
  spread <- 1 / inverse
  for (i in 1:k) {
    z[i] ~ dnorm(0, 1)
    own[i] <- has_effect * mean + varies * spread * z[i]
    u[i] ~ dchisqr(df[i])
    t[i] ~ dnorm(own[i] * sqrt(n[i]) * sqrt(df[i] / u[i]), u[i] / df[i])
  }
}"
weight <- c(1, 1, 1, 1) / 4
started <- proc.time()[["elapsed"]]
run <- jags.model(textConnection(model), data = list(t = rows$t, df = df, n = n, k = nrow(rows), weight = weight),
                  n.chains = 4, quiet = TRUE, inits = lapply(1:4, function(c)
                    list(.RNG.name = "base::Wichmann-Hill", .RNG.seed = c, m = c)))
update(run, 2000, progress.bar = "none")
batches <- NULL
repeat {
  visited <- do.call(c, lapply(coda.samples(run, "m", 10000, progress.bar = "none"), as.vector))
  batches <- rbind(batches, tabulate(visited, 4) / length(visited))
  if (proc.time()[["elapsed"]] - started > budget) break
}
share <- colMeans(batches)
error <- apply(batches, 2, sd) / sqrt(nrow(batches))
for (j in 2:4) {
  cat(sprintf("%s,%.4f,%.4f\n", c("fixed_null", "fixed_effect", "random_null", "random_effect")[j],
              log(share[j] / share[1]), sqrt((error[j] / share[j])^2 + (error[1] / share[1])^2)))
}
