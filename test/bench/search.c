// The search done without any bound: every layout under every set point is simulated through the year, billed by the month
// and taken to its net present value; the greatest is the answer.
// Input: n, months, sizes, builds, set points, months of the horizon, response ratio, step delay, reconnection delay,
// interval, free ratio, price, switchings of a switch's life; month_from[months + 1], weight_of_saving[months],
// bill_before[months], weight_of_replacement[horizon + 1], tan_set[set points], kvar[sizes], price_of_switch[sizes], largest
// size first; per build counts[sizes], certain cost, cost of a kvarh connected; begin[n], active[n], lagging[n].
// Output: greatest net present value, its build, its set point.
#include "bank.h"

typedef struct {
  long n, months, sizes, builds, points, horizon;
  double response, step_delay, delay, interval, free_ratio, price, life;
  const double *from, *saving, *before, *replacement, *tan_set, *kvar, *switch_price, *build, *begin, *active, *lagging;
} Work;

static double cents(double x) { return copysign(floor(fabs(x) * 100 + 0.5 + 1e-6) / 100, x); }

// months in which a life ends: max(1, ceil(12 k L)), k = 1, 2 ... before the last month
static double replaced(const Work *w, double years, double amount) {
  double sum = 0;
  for (long k = 1;; k++) {
    double month = ceil(12 * (double)k * years - 1e-9);
    if (month < 1) month = 1;
    if (month >= (double)w->horizon) return sum;
    sum += amount * w->replacement[(long)month];
  }
}

static void lay_out(const Work *w, const double *build, Bank *b) {
  b->n = w->n;
  b->delay = w->delay;
  b->classes = b->stages = 0;
  for (long s = 0; s < w->sizes; s++) {
    int count = (int)build[s];
    if (count == 0) continue;
    b->kvar[b->classes] = b->smallest = w->kvar[s];
    b->count[b->classes] = count;
    b->first[b->classes++] = b->stages;
    b->stages += count;
  }
  b->band = w->response * b->smallest;
  b->most = w->step_delay == 0 ? b->stages : fmax(1, floor(w->interval / w->step_delay));
}

static double worth(const Work *w, const double *build, const double *wanted, Bank *b) {
  double hours = w->interval / 3600, npv = -build[w->sizes], kvarh = 0, level = 0;
  start(b);
  for (long m = 0; m < w->months; m++) {
    double kwh = 0, lag = 0;
    for (long i = (long)w->from[m]; i < (long)w->from[m + 1]; i++) {
      double d = wanted[i] - level;
      if (d > b->band || d < -b->band) level = decide(b, w->begin[i], wanted[i]);
      double left = w->lagging[i] - level;
      if (w->active[i] > 0) kwh += w->active[i];
      if (left > 0) lag += left;
      kvarh += level;
    }
    double excess = hours * (lag - w->free_ratio * kwh);
    npv += w->saving[m] * (w->before[m] - (excess > 1e-9 ? cents(excess * w->price) : 0));
  }
  npv -= build[w->sizes + 1] * kvarh * hours;
  double a_year = 8760 / ((double)w->n * hours);
  int stage = 0;
  for (long s = 0; s < w->sizes; s++) {
    for (int k = 0; k < (int)build[s]; k++, stage++) {
      if (b->switchings[stage] == 0) continue;
      npv -= replaced(w, w->life / (b->switchings[stage] * a_year), w->switch_price[s]);
    }
  }
  return npv;
}

static const double *column(const double **next, long length) {
  const double *first = *next;
  *next += length;
  return first;
}

int main(int argc, char **argv) {
  if (argc != 4) return 2;
  long numbers;
  const double *in = read_numbers(argv[1], &numbers);
  Work w = {.n = (long)in[0], .months = (long)in[1], .sizes = (long)in[2], .builds = (long)in[3], .points = (long)in[4],
            .horizon = (long)in[5], .response = in[6], .step_delay = in[7], .delay = in[8], .interval = in[9],
            .free_ratio = in[10], .price = in[11], .life = in[12]};
  const double *next = in + 13;
  w.from = column(&next, w.months + 1);
  w.saving = column(&next, w.months);
  w.before = column(&next, w.months);
  w.replacement = column(&next, w.horizon + 1);
  w.tan_set = column(&next, w.points);
  w.kvar = column(&next, w.sizes);
  w.switch_price = column(&next, w.sizes);
  w.build = column(&next, w.builds * (w.sizes + 2));
  w.begin = column(&next, w.n);
  w.active = column(&next, w.n);
  w.lagging = column(&next, w.n);
  double *wanted = malloc((size_t)w.n * sizeof(double)), out[3];
  int runs = atoi(argv[3]);
  double *times = malloc((size_t)runs * sizeof(double));
  for (int run = 0; run < runs; run++) {
    double from = now_ns();
    out[0] = -INFINITY;
    for (long p = 0; p < w.points; p++) {
      for (long i = 0; i < w.n; i++) wanted[i] = w.lagging[i] - (w.active[i] > 0 ? w.active[i] : 0) * w.tan_set[p];
      for (long k = 0; k < w.builds; k++) {
        Bank b;
        lay_out(&w, w.build + k * (w.sizes + 2), &b);
        double npv = worth(&w, w.build + k * (w.sizes + 2), wanted, &b);
        if (npv <= out[0]) continue;
        out[0] = npv;
        out[1] = (double)k;
        out[2] = (double)p;
      }
    }
    times[run] = now_ns() - from;
  }
  write_numbers(argv[2], out, 3);
  print_median(times, runs);
  return 0;
}
