/*
 * Times general-purpose sparse solvers on one matrix, for comparison only.
 *
 *   sparse FILE klu|cholmod SECONDS
 *
 * FILE, little-endian: int32 n, nnz, sets; int32 column starts (n + 1); int32 rows (nnz), both triangles;
 * float64 values (sets * nnz); float64 right-hand sides (sets * n).
 * Prints one JSON line: microseconds per system as the median over batches of about a millisecond, and the scaled residual.
 */
#include <cholmod.h>
#include <klu.h>
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

static int n, nnz, sets;
static int *starts, *rows;
static double *values, *rhs, *x;

static double now(void) {
  struct timespec t;
  clock_gettime(CLOCK_MONOTONIC, &t);
  return t.tv_sec + 1e-9 * t.tv_nsec;
}

static int ascending(const void *a, const void *b) {
  double p = *(const double *)a, q = *(const double *)b;
  return (p > q) - (p < q);
}

/* Microseconds per call of `step`, median over batches. */
static double timed(void (*step)(int), double seconds) {
  static double batch[100000];
  double start = now();
  step(0);
  double once = now() - start;
  int repeat = once > 1e-3 ? 1 : (int)(1e-3 / (once + 1e-9)) + 1;
  int count = 0, set = 0;
  double end = now() + seconds;
  while ((now() < end || count < 3) && count < 100000) {
    double t = now();
    for (int i = 0; i < repeat; i++) {
      step(set);
      if (++set == sets) set = 0;
    }
    batch[count++] = 1e6 * (now() - t) / repeat;
  }
  qsort(batch, count, sizeof(double), ascending);
  return batch[count / 2];
}

static double residual(int set) {
  double *r = malloc(n * sizeof(double)), *m = malloc(n * sizeof(double)), most = 0, scale = 0;
  for (int i = 0; i < n; i++) { r[i] = rhs[(size_t)set * n + i]; m[i] = fabs(r[i]); }
  for (int j = 0; j < n; j++)
    for (int p = starts[j]; p < starts[j + 1]; p++) {
      double t = values[(size_t)set * nnz + p] * x[j];
      r[rows[p]] -= t;
      m[rows[p]] += fabs(t);
    }
  for (int i = 0; i < n; i++) { if (fabs(r[i]) > most) most = fabs(r[i]); if (m[i] > scale) scale = m[i]; }
  return most / scale;
}

static klu_common kluCommon;
static klu_symbolic *kluSymbolic;
static klu_numeric *kluNumeric;

static void kluAll(int set) {
  double *v = values + (size_t)set * nnz;
  klu_symbolic *s = klu_analyze(n, starts, rows, &kluCommon);
  klu_numeric *f = klu_factor(starts, rows, v, s, &kluCommon);
  memcpy(x, rhs + (size_t)set * n, n * sizeof(double));
  klu_solve(s, f, n, 1, x, &kluCommon);
  klu_free_numeric(&f, &kluCommon);
  klu_free_symbolic(&s, &kluCommon);
}

static void kluAgain(int set) {
  klu_refactor(starts, rows, values + (size_t)set * nnz, kluSymbolic, kluNumeric, &kluCommon);
  memcpy(x, rhs + (size_t)set * n, n * sizeof(double));
  klu_solve(kluSymbolic, kluNumeric, n, 1, x, &kluCommon);
}

static void kluSolve(int set) {
  memcpy(x, rhs + (size_t)set * n, n * sizeof(double));
  klu_solve(kluSymbolic, kluNumeric, n, 1, x, &kluCommon);
}

static void klu(double seconds, int scale) {
  klu_defaults(&kluCommon);
  kluCommon.scale = scale;
  kluSymbolic = klu_analyze(n, starts, rows, &kluCommon);
  kluNumeric = klu_factor(starts, rows, values, kluSymbolic, &kluCommon);
  kluAgain(0);
  double r = residual(0);
  double all = timed(kluAll, seconds);
  double again = timed(kluAgain, seconds);
  double solve = timed(kluSolve, seconds);
  printf("{\"all\":%.6g,\"again\":%.6g,\"solve\":%.6g,\"residual\":%.3g}\n", all, again, solve, r);
}

static cholmod_common cholCommon;
static cholmod_sparse cholA;
static cholmod_factor *cholL;
static int *upStarts, *upRows, *upFrom;
static double *upValues;

static void cholSet(int set) {
  for (int p = 0; p < upStarts[n]; p++) upValues[p] = values[(size_t)set * nnz + upFrom[p]];
}

static void cholSolve(cholmod_factor *l, int set) {
  cholmod_dense b = {.nrow = n, .ncol = 1, .nzmax = n, .d = n, .x = rhs + (size_t)set * n, .xtype = CHOLMOD_REAL, .dtype = CHOLMOD_DOUBLE};
  cholmod_dense *s = cholmod_solve(CHOLMOD_A, l, &b, &cholCommon);
  memcpy(x, s->x, n * sizeof(double));
  cholmod_free_dense(&s, &cholCommon);
}

static void cholAll(int set) {
  cholSet(set);
  cholmod_factor *l = cholmod_analyze(&cholA, &cholCommon);
  cholmod_factorize(&cholA, l, &cholCommon);
  cholSolve(l, set);
  cholmod_free_factor(&l, &cholCommon);
}

static void cholAgain(int set) {
  cholSet(set);
  cholmod_factorize(&cholA, cholL, &cholCommon);
  cholSolve(cholL, set);
}

static void cholOnly(int set) { cholSolve(cholL, set); }

static void cholmod(double seconds) {
  cholmod_start(&cholCommon);
  cholCommon.supernodal = CHOLMOD_SIMPLICIAL;
  cholCommon.nmethods = 1;
  cholCommon.method[0].ordering = CHOLMOD_AMD;
  upStarts = malloc((n + 1) * sizeof(int));
  upRows = malloc(nnz * sizeof(int));
  upFrom = malloc(nnz * sizeof(int));
  upValues = malloc(nnz * sizeof(double));
  int used = 0;
  for (int j = 0; j < n; j++) {
    upStarts[j] = used;
    for (int p = starts[j]; p < starts[j + 1]; p++)
      if (rows[p] <= j) { upRows[used] = rows[p]; upFrom[used++] = p; }
  }
  upStarts[n] = used;
  cholA = (cholmod_sparse){.nrow = n, .ncol = n, .nzmax = used, .p = upStarts, .i = upRows, .x = upValues, .stype = 1,
    .itype = CHOLMOD_INT, .xtype = CHOLMOD_REAL, .dtype = CHOLMOD_DOUBLE, .sorted = 1, .packed = 1};
  cholL = cholmod_analyze(&cholA, &cholCommon);
  cholAgain(0);
  double r = residual(0);
  double all = timed(cholAll, seconds);
  double again = timed(cholAgain, seconds);
  double solve = timed(cholOnly, seconds);
  printf("{\"all\":%.6g,\"again\":%.6g,\"solve\":%.6g,\"residual\":%.3g}\n", all, again, solve, r);
}

int main(int count, char **argument) {
  if (count != 4) return 2;
  FILE *f = fopen(argument[1], "rb");
  int head[3];
  if (!f || fread(head, sizeof(int), 3, f) != 3) return 3;
  n = head[0]; nnz = head[1]; sets = head[2];
  starts = malloc((n + 1) * sizeof(int));
  rows = malloc(nnz * sizeof(int));
  values = malloc((size_t)sets * nnz * sizeof(double));
  rhs = malloc((size_t)sets * n * sizeof(double));
  x = malloc(n * sizeof(double));
  if (fread(starts, sizeof(int), n + 1, f) != (size_t)n + 1) return 3;
  if (fread(rows, sizeof(int), nnz, f) != (size_t)nnz) return 3;
  if (fread(values, sizeof(double), (size_t)sets * nnz, f) != (size_t)sets * nnz) return 3;
  if (fread(rhs, sizeof(double), (size_t)sets * n, f) != (size_t)sets * n) return 3;
  fclose(f);
  double seconds = atof(argument[3]);
  if (!strcmp(argument[2], "klu")) klu(seconds, 2);
  else if (!strcmp(argument[2], "klu-unscaled")) klu(seconds, -1);
  else if (!strcmp(argument[2], "cholmod")) cholmod(seconds);
  else return 2;
  return 0;
}
