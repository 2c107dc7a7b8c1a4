// A year of one-minute rows from the bytes of its file to checked columns: chunks read into one buffer, stamps and
// numbers taken digit by digit, the date decoded when it changes, everything else refused.
//   meter-scan FILE OUTPUT RUNS
#define _GNU_SOURCE
#include "twin.h"

#include <fcntl.h>
#include <math.h>
#include <string.h>
#include <unistd.h>

enum { CHUNK = 262144, LONGEST_ROW = 4096 };

typedef struct {
  long count, room;
  double *begin_s, *active_kw, *lagging_kvar, *leading_kvar;
} columns;

static const double tens[] = {1,    1e1,  1e2,  1e3,  1e4,  1e5,  1e6,  1e7,  1e8,  1e9,  1e10,
                              1e11, 1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21};

static void refuse(const char *why) {
  fprintf(stderr, "%s\n", why);
  exit(1);
}

static void grow(columns *c) {
  c->room = c->room ? 2 * c->room : 65536;
  double **all[] = {&c->begin_s, &c->active_kw, &c->lagging_kvar, &c->leading_kvar};
  for (int k = 0; k < 4; k++) {
    *all[k] = realloc(*all[k], (size_t)c->room * sizeof(double));
    if (!*all[k]) refuse("no memory");
  }
}

static int digit(char byte) {
  unsigned value = (unsigned)(byte - '0');
  if (value > 9) refuse("a stamp with something else than digits");
  return (int)value;
}

static int two(const char *at) { return digit(at[0]) * 10 + digit(at[1]); }

static long day_number(int year, int month, int day) {
  static const int days[] = {31, 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31};
  int leap = (year % 4 == 0 && year % 100 != 0) || year % 400 == 0;
  if (month < 1 || month > 12 || day < 1 || day > days[month - 1] + (month == 2 && leap)) refuse("no such date");
  year -= month <= 2;
  long era = year / 400, of_era = year - era * 400;
  long of_year = (153 * (month + (month > 2 ? -3 : 9)) + 2) / 5 + day - 1;
  return era * 146097 + of_era * 365 + of_era / 4 - of_era / 100 + of_year - 719468;
}

static const char *number(const char *at, double *value) {
  const char *start = at;
  int negative = *at == '-';
  at += negative;
  long digits = 0;
  const char *from = at;
  while ((unsigned)(*at - '0') <= 9) digits = digits * 10 + (*at++ - '0');
  int count = (int)(at - from), decimals = 0;
  if (*at == '.') {
    from = ++at;
    while ((unsigned)(*at - '0') <= 9) digits = digits * 10 + (*at++ - '0');
    decimals = (int)(at - from);
  }
  if (count + decimals < 1 || count + decimals > 15) {
    char *end;
    *value = strtod(start, &end);
    if (end == start || !isfinite(*value)) refuse("no number");
    return end;
  }
  double size = (double)digits / tens[decimals];
  *value = negative ? -size : size;
  return at;
}

static void take_rows(columns *c, const char *at, const char *limit) {
  char date[10] = {0};
  double day_s = 0;
  while (at < limit) {
    if (memcmp(date, at, 10) != 0) {
      if (at[4] != '-' || at[7] != '-') refuse("a stamp of another form");
      day_s = 86400.0 * (double)day_number(two(at) * 100 + two(at + 2), two(at + 5), two(at + 8));
      memcpy(date, at, 10);
    }
    int hour = two(at + 11), minute = two(at + 14), second = two(at + 17);
    if (hour > 23 || minute > 59 || second > 59 || at[10] != ' ' || at[13] != ':' || at[16] != ':' || at[19] != ',')
      refuse("a stamp of another form");
    double kw, kvar;
    at = number(at + 20, &kw);
    if (*at++ != ',') refuse("a row of another width");
    at = number(at, &kvar);
    if (*at == '\r') at++;
    if (*at++ != '\n') refuse("a row of another width");
    if (c->count == c->room) grow(c);
    long i = c->count++;
    c->begin_s[i] = day_s + hour * 3600 + minute * 60 + second;
    c->active_kw[i] = kw;
    c->lagging_kvar[i] = kvar > 0 ? kvar : 0;
    c->leading_kvar[i] = kvar < 0 ? -kvar : 0;
  }
}

static void check(const columns *c) {
  if (c->count < 2) refuse("no record");
  double step_s = c->begin_s[1] - c->begin_s[0];
  if (!(step_s > 0)) refuse("times that go back");
  for (long i = 1; i < c->count; i++)
    if (c->begin_s[i] - c->begin_s[i - 1] != step_s) refuse("a time beside the grid");
}

static void scan(const char *path, char *buffer, columns *c) {
  int file = open(path, O_RDONLY);
  if (file < 0) refuse("no file");
  size_t kept = 0;
  int header = 1;
  for (;;) {
    ssize_t got = read(file, buffer + kept, CHUNK);
    if (got < 0) refuse("a file that can't be read");
    if (got == 0) break;
    char *end = buffer + kept + got, *from = buffer;
    char *last = memrchr(buffer, '\n', (size_t)(end - buffer));
    if (last) {
      if (header) from = (char *)memchr(buffer, '\n', (size_t)(end - buffer)) + 1;
      header = 0;
      take_rows(c, from, last + 1);
      from = last + 1;
    }
    kept = (size_t)(end - from);
    if (kept > LONGEST_ROW) refuse("a row without end");
    memmove(buffer, from, kept);
  }
  if (kept) refuse("a row without end");
  close(file);
  check(c);
}

int main(int argc, char **argv) {
  if (argc != 4) return 1;
  int runs = atoi(argv[3]);
  double *times = malloc((size_t)runs * sizeof(double));
  char *buffer = malloc(CHUNK + LONGEST_ROW + 64);
  columns c = {0};
  for (int run = -1; run < runs; run++) {
    double **all[] = {&c.begin_s, &c.active_kw, &c.lagging_kvar, &c.leading_kvar};
    for (int k = 0; k < 4; k++) {
      free(*all[k]);
      *all[k] = NULL;
    }
    c.count = c.room = 0;
    double start = now_ns();
    scan(argv[1], buffer, &c);
    if (run >= 0) times[run] = now_ns() - start;
  }
  double *all = malloc((size_t)c.count * 4 * sizeof(double));
  double *from[] = {c.begin_s, c.active_kw, c.lagging_kvar, c.leading_kvar};
  for (int k = 0; k < 4; k++) memcpy(all + k * c.count, from[k], (size_t)c.count * sizeof(double));
  write_numbers(argv[2], all, 4 * c.count);
  print_median(times, runs);
  return 0;
}
