# Answers questions of the form "what argument argument ..." one a line, as numbers on a line each.
# Only R's own functions: nothing here follows the project's code.
answers <- list(
  'gamma-lower' = function(shape, x) pgamma(x, shape),
  'gamma-upper' = function(shape, x) pgamma(x, shape, lower.tail = FALSE),
  'gamma-quantile' = function(p, shape, rate) qgamma(p, shape, rate),
  'gamma-quantile-upper' = function(q, shape, rate) qgamma(q, shape, rate, lower.tail = FALSE),
  'beta-lower' = function(x, a, b) pbeta(x, a, b),
  'beta-quantile' = function(p, a, b) qbeta(p, a, b),
  'log-gamma' = function(x) lgamma(x),
  'log-beta' = function(a, b) lbeta(a, b),
  'normal-density' = function(z) dnorm(z),
  'normal-lower' = function(z) pnorm(z),
  'normal-quantile' = function(p) qnorm(p),
  'error-function-upper' = function(x) 2 * pnorm(-x * sqrt(2)),
  'poisson-at-most' = function(k, mean) ppois(k, mean),
  'binomial-at-most' = function(k, n, p) pbinom(k, n, p),
  'binomial-counts' = function(n, p) dbinom(0:n, n, p),
  'poisson-interval' = function(k, level) poisson.test(k, conf.level = level)$conf.int,
  'clopper-pearson' = function(k, n, level) binom.test(k, n, conf.level = level)$conf.int,
  'wilson' = function(k, n, level)
    suppressWarnings(prop.test(k, n, conf.level = level, correct = FALSE))$conf.int
)

questions <- readLines(file('stdin'))
for (question in questions) {
  words <- strsplit(question, ' ')[[1]]
  value <- do.call(answers[[words[1]]], as.list(as.numeric(words[-1])))
  cat(sprintf('%.17g', value), '\n')
}
