// What every twin shares: numbers in, numbers out, the median time of one run printed in ns.
#include <stdio.h>
#include <stdlib.h>
#include <time.h>

__attribute__((unused)) static double *read_numbers(const char *path, long *count) {
  FILE *file = fopen(path, "rb");
  if (!file) { perror(path); exit(1); }
  fseek(file, 0, SEEK_END);
  *count = ftell(file) / (long)sizeof(double);
  rewind(file);
  double *numbers = malloc((size_t)*count * sizeof(double));
  if (!numbers || fread(numbers, sizeof(double), (size_t)*count, file) != (size_t)*count) exit(1);
  fclose(file);
  return numbers;
}

static void write_numbers(const char *path, const double *numbers, long count) {
  FILE *file = fopen(path, "wb");
  if (!file || fwrite(numbers, sizeof(double), (size_t)count, file) != (size_t)count) exit(1);
  fclose(file);
}

static double now_ns(void) {
  struct timespec t;
  clock_gettime(CLOCK_MONOTONIC, &t);
  return (double)t.tv_sec * 1e9 + (double)t.tv_nsec;
}

static int by_size(const void *a, const void *b) {
  double x = *(const double *)a, y = *(const double *)b;
  return (x > y) - (x < y);
}

static void print_median(double *times, int runs) {
  qsort(times, (size_t)runs, sizeof(double), by_size);
  printf("%.1f\n", times[runs / 2]);
}
