// A year of minutes kept the plain way: a row an interval, one prepared insert, one transaction, write-ahead log,
// synchronous FULL; then read back into columns.
//   store-rows COLUMNS OUTPUT RUNS    prints the median time of a write, then that of a read
#include "twin.h"

#include <sqlite3.h>
#include <string.h>

enum { COLUMNS = 4 };

static void must(sqlite3 *db, int code, int expected) {
  if (code == expected) return;
  fprintf(stderr, "%s\n", sqlite3_errmsg(db));
  exit(1);
}

static void run_sql(sqlite3 *db, const char *sql) { must(db, sqlite3_exec(db, sql, NULL, NULL, NULL), SQLITE_OK); }

static void write_rows(sqlite3 *db, sqlite3_stmt *insert, long record, const double *columns, long n) {
  run_sql(db, "BEGIN IMMEDIATE");
  sqlite3_bind_int64(insert, 1, record);
  for (long i = 0; i < n; i++) {
    sqlite3_bind_int64(insert, 2, (sqlite3_int64)columns[i]);
    for (int k = 1; k < COLUMNS; k++) sqlite3_bind_double(insert, 2 + k, columns[k * n + i]);
    must(db, sqlite3_step(insert), SQLITE_DONE);
    sqlite3_reset(insert);
  }
  run_sql(db, "COMMIT");
}

static double *read_rows(sqlite3 *db, sqlite3_stmt *select, long record, long n) {
  double *columns = malloc(COLUMNS * (size_t)n * sizeof(double));
  if (!columns) exit(1);
  sqlite3_bind_int64(select, 1, record);
  long i = 0;
  for (; sqlite3_step(select) == SQLITE_ROW && i < n; i++) {
    columns[i] = (double)sqlite3_column_int64(select, 0);
    for (int k = 1; k < COLUMNS; k++) columns[k * n + i] = sqlite3_column_double(select, k);
  }
  must(db, sqlite3_reset(select), SQLITE_OK);
  if (i != n) exit(1);
  return columns;
}

int main(int argc, char **argv) {
  if (argc != 4) return 1;
  int runs = atoi(argv[3]);
  long count;
  double *columns = read_numbers(argv[1], &count);
  long n = count / COLUMNS;
  double *back = NULL;
  double *writes = malloc((size_t)runs * sizeof(double)), *reads = malloc((size_t)runs * sizeof(double));

  char path[4096];
  const char *traces[] = {"", "-wal", "-shm"};
  for (int k = 0; k < 3; k++) {
    snprintf(path, sizeof path, "%s.db%s", argv[2], traces[k]);
    remove(path);
  }
  snprintf(path, sizeof path, "%s.db", argv[2]);
  sqlite3 *db;
  sqlite3_stmt *insert, *select;
  must(db, sqlite3_open(path, &db), SQLITE_OK);
  run_sql(db, "PRAGMA journal_mode = WAL");
  run_sql(db, "PRAGMA synchronous = FULL");
  run_sql(db, "CREATE TABLE interval (record INTEGER, begin_s INTEGER, active_kw REAL, lagging_kvar REAL,"
              " leading_kvar REAL, PRIMARY KEY (record, begin_s)) WITHOUT ROWID");
  const char *put = "INSERT INTO interval VALUES (?, ?, ?, ?, ?)";
  const char *get = "SELECT begin_s, active_kw, lagging_kvar, leading_kvar FROM interval WHERE record = ? ORDER BY begin_s";
  must(db, sqlite3_prepare_v2(db, put, -1, &insert, NULL), SQLITE_OK);
  must(db, sqlite3_prepare_v2(db, get, -1, &select, NULL), SQLITE_OK);

  for (int run = 0; run < runs; run++) {
    double start = now_ns();
    write_rows(db, insert, run, columns, n);
    double written = now_ns();
    free(back);
    double freed = now_ns();
    back = read_rows(db, select, run, n);
    reads[run] = now_ns() - freed;
    writes[run] = written - start;
  }
  write_numbers(argv[2], back, count);
  print_median(writes, runs);
  print_median(reads, runs);
  return 0;
}
