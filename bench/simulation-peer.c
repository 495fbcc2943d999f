/* The simulation of K in C, as one would write it there: one tree after another, 64 random bits a draw.
   Arguments: replicates, drift, rate, diffusion, start, cut, runs. Prints, for each run, its milliseconds of processor
   time, the particle steps taken, and how many were absorbed.
   Source of the step: the reflection principle for the Brownian bridge, as app/solvers/simulation-trees.ts says it;
   xoshiro256++: D. Blackman, S. Vigna, ACM Trans. Math. Software 47 (2021) 36;
   ziggurat: G. Marsaglia, W. W. Tsang, J. Statist. Software 5 (2000) 8. */
#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <time.h>

#define LAYERS 256
#define MOST_ALIVE 1000000

static uint64_t state[4] = {1, 2, 3, 4};
static double normal_x[LAYERS + 1], normal_y[LAYERS + 1];
static double exponential_x[LAYERS + 1], exponential_y[LAYERS + 1];
static double alive[MOST_ALIVE];
static uint64_t steps;

static inline uint64_t rotated(uint64_t x, int by) { return (x << by) | (x >> (64 - by)); }

static inline uint64_t bits(void) {
  const uint64_t result = rotated(state[0] + state[3], 23) + state[0];
  const uint64_t shifted = state[1] << 17;
  state[2] ^= state[0];
  state[3] ^= state[1];
  state[1] ^= state[2];
  state[0] ^= state[3];
  state[2] ^= shifted;
  state[3] = rotated(state[3], 45);
  return result;
}

static inline double fraction(uint64_t b) { return (double)(b >> 11) * 0x1p-53; }

static double exponential(void) {
  double passed = 0;
  for (;;) {
    const uint64_t b = bits();
    const int layer = b & (LAYERS - 1);
    const double x = fraction(b) * exponential_x[layer];
    if (x < exponential_x[layer + 1]) return passed + x;
    if (layer == 0)
      passed += exponential_x[1];
    else if (exponential_y[layer] + fraction(bits()) * (exponential_y[layer + 1] - exponential_y[layer]) < exp(-x))
      return passed + x;
  }
}

static double normal(void) {
  for (;;) {
    const uint64_t b = bits();
    const int layer = b & (LAYERS - 1);
    const double x = fraction(b) * normal_x[layer];
    const double sign = 1 - (double)((b >> 7) & 2);
    if (x < normal_x[layer + 1]) return sign * x;
    if (layer == 0) {
      double beyond, other;
      do {
        beyond = -log(1 - fraction(bits())) / normal_x[1];
        other = -log(1 - fraction(bits()));
      } while (2 * other <= beyond * beyond);
      return sign * (normal_x[1] + beyond);
    }
    if (normal_y[layer] + fraction(bits()) * (normal_y[layer + 1] - normal_y[layer]) < exp(-x * x / 2)) return sign * x;
  }
}

static void prepare(void) {
  const double normal_area = 4.92867323399e-3, exponential_area = 3.949659822581572e-3;
  normal_x[1] = 3.6541528853610088;
  exponential_x[1] = 7.69711747013105;
  normal_x[0] = normal_area / exp(-normal_x[1] * normal_x[1] / 2);
  exponential_x[0] = exponential_area / exp(-exponential_x[1]);
  for (int i = 2; i < LAYERS; i++) {
    const double n = normal_x[i - 1], e = exponential_x[i - 1];
    normal_x[i] = sqrt(-2 * log(exp(-n * n / 2) + normal_area / n));
    exponential_x[i] = -log(exp(-e) + exponential_area / e);
  }
  for (int i = 1; i <= LAYERS; i++) {
    normal_y[i] = exp(-normal_x[i] * normal_x[i] / 2);
    exponential_y[i] = exp(-exponential_x[i]);
  }
}

/* K of binary branching from one particle. */
static long grown(double start, double drift, double rate, double diffusion, double cut) {
  const double life = 1 / rate, twice = 2 * diffusion;
  long absorbed = 0;
  int size = 0;
  alive[size++] = start;
  while (size > 0) {
    const double y = alive[--size];
    steps++;
    const double t = exponential() * life;
    const double z = y + drift * t + sqrt(twice * t) * normal();
    const double unit = diffusion * t;
    if (z <= 0 || (y * z < 64 * unit && exponential() * unit > y * z))
      absorbed++;
    else if (z <= cut && size < MOST_ALIVE - 2) {
      alive[size++] = z;
      alive[size++] = z;
    }
  }
  return absorbed;
}

int main(int count, char **arguments) {
  if (count != 8) return 1;
  double value[8];
  for (int i = 1; i < 8; i++) value[i] = atof(arguments[i]);
  prepare();
  for (int run = 0; run < (int)value[7]; run++) {
    long absorbed = 0;
    steps = 0;
    const clock_t begun = clock();
    for (long i = 0; i < (long)value[1]; i++) absorbed += grown(value[5], value[2], value[3], value[4], value[6]);
    printf("%.3f %llu %ld\n", 1000.0 * (double)(clock() - begun) / CLOCKS_PER_SEC, (unsigned long long)steps, absorbed);
  }
  return 0;
}
