/* The inner loops of likelihood.py in 80-bit arithmetic: the logarithm of
 *   mass(z) = int exp(df (log(1+d) - d) - w0^2 d^2 / 2 + u) du,  d = e^u - 1,  w0 = sqrt(df) e^z,
 * tabulated, and the log likelihoods that follow from it. */
#include <math.h>

typedef long double ld;

/* The trapezoid rule in u, from where nothing is left to where nothing is left. */
static ld log_mass(ld nu, ld z) {
  const ld w2 = nu * expl(2 * z), width = 1 / sqrtl(nu + 1 + w2);
  const ld step =
      width < 0.4L ? width / 4 : 0.1L; /* exp(-exp(2 u)) turns round at an imaginary part of pi/4 */
  ld total = 0;
  for (int side = -1; side <= 1; side += 2) {
    for (long j = side < 0 ? 1 : 0;; ++j) {
      const ld u = side * j * step, d = expm1l(u);
      const ld term = expl(nu * (log1pl(d) - d) - w2 * d * d / 2 + u);
      total += term;
      if (term < 1e-24L * total) break;
    }
  }
  return logl(total * step);
}

typedef struct {
  ld nu, root, constant, piece; /* root: of nu */
  int first, pieces, terms;
  const ld *nodes, *matrix; /* Chebyshev nodes, and the matrix from values there to coefficients */
  ld* coefficients;         /* a row of terms for each piece, NaN until it is needed */
} table;

static const ld* coefficients_of(const table* k, int p) {
  ld* c = k->coefficients + p * k->terms;
  if (isnan(c[0])) {
    ld values[64];
    for (int j = 0; j < k->terms; ++j)
      values[j] = log_mass(k->nu, (k->first + p + 0.5L + k->nodes[j] / 2) * k->piece);
    for (int m = 0; m < k->terms; ++m) {
      c[m] = 0;
      for (int j = 0; j < k->terms; ++j) c[m] += k->matrix[m * k->terms + j] * values[j];
    }
  }
  return c;
}

/* What depends on the scaled t alone. */
typedef struct {
  ld ratio, fixed; /* t / sqrt(nu + t^2); the constant and the power of nu + t^2 */
} scaled;

static scaled scale(const table* k, ld t) {
  const ld x2 = t * t / k->nu;
  const scaled r = {t / sqrtl(k->nu * (1 + x2)), k->constant - (k->nu + 1) / 2 * log1pl(x2)};
  return r;
}

/* log f(t; nu, ncp); -1e18 beyond the table, where the density is smaller than any that counts.
 * The peak of the integral: (nu+1) log w0 - w0^2/2 + y w0 with w0^2 = y w0 + nu. */
static ld log_density(const table* k, scaled at, ld ncp) {
  const ld y = ncp * at.ratio, root = sqrtl(y * y + 4 * k->nu);
  const ld w0 = y > 0 ? (y + root) / 2 : 2 * k->nu / (root - y);
  const ld z = logl(w0 / k->root), place = z / k->piece - k->first;
  const int p = (int)floorl(place);
  if (!(place >= 0) || p >= k->pieces) return -1e18L;
  const ld* c = coefficients_of(k, p);
  const ld x = 2 * (place - p) - 1;
  ld last = 0, value = c[k->terms - 1];
  for (int m = k->terms - 2; m > 0; --m) {
    const ld next = 2 * x * value - last + c[m];
    last = value;
    value = next;
  }
  return at.fixed - ncp * ncp / 2 + (k->nu + 1) * z + y * w0 / 2 + (x * value - last + c[0]);
}

static ld log_add(ld a, ld b) { return a > b ? a + log1pl(expl(b - a)) : b + log1pl(expl(a - b)); }

void add_exact(const table* k, ld t, ld n, int folded, long count, const ld* mean, const ld* spread,
               ld* out) {
  ld last = -1, s = 1, log_s = 0, per_mean = 0;
  scaled near = {0, 0}, far = {0, 0};
  for (long i = 0; i < count; ++i) {
    if (spread[i] != last) {
      last = spread[i];
      s = sqrtl(1 + n * last * last);
      log_s = logl(s);
      per_mean = sqrtl(n) / s;
      near = scale(k, t / s);
      far = scale(k, -t / s);
    }
    const ld ncp = mean[i] * per_mean, value = log_density(k, near, ncp);
    out[i] += (folded ? log_add(value, log_density(k, far, ncp)) : value) - log_s;
  }
}

void add_normal(ld estimate, ld se, int folded, long count, const ld* mean, const ld* spread, ld* out) {
  const ld log_two_pi = logl(2 * 3.14159265358979323846264338327950288L);
  for (long i = 0; i < count; ++i) {
    const ld variance = se * se + spread[i] * spread[i];
    const ld near = (estimate - mean[i]) * (estimate - mean[i]) / (2 * variance);
    const ld far = (estimate + mean[i]) * (estimate + mean[i]) / (2 * variance);
    out[i] += (folded ? log_add(-near, -far) : -near) - (log_two_pi + logl(variance)) / 2;
  }
}

static double normal_cdf(double z) { return erfc(-z * 0.70710678118654752440) / 2; }

/* ratio: w / sqrt(df) at the nodes of the chi-distributed scale, weight: their probabilities. */
void add_band(int nodes, const double* ratio, const double* weight, int bands, const double* low,
              const double* high, ld n, long count, const ld* mean, const ld* spread, ld* out) {
  for (long i = 0; i < count; ++i) {
    const double s = (double)sqrtl(1 + n * spread[i] * spread[i]), shift = (double)(mean[i] * sqrtl(n)) / s;
    double total = 0;
    for (int b = 0; b < bands; ++b)
      for (int j = 0; j < nodes; ++j) {
        const double a = low[b] * ratio[j] / s - shift, c = high[b] * ratio[j] / s - shift;
        total += weight[j] * (a > 0 ? normal_cdf(-a) - normal_cdf(-c) : normal_cdf(c) - normal_cdf(a));
      }
    out[i] += total > 0 ? logl(total) : -1e18L;
  }
}
