// A bank and its controller as plain C: nearest level, even wear, the rules as DEVELOPERS.md's method states them.
// Classes stand largest first; a bank that is started again keeps its classes and forgets everything else.
#include "twin.h"
#include <math.h>
#include <string.h>

enum { MOST_CLASSES = 8, MOST_STAGES = 64 };

typedef struct {
  long n;
  double band, smallest, most, delay;
  int classes, stages;
  double kvar[MOST_CLASSES];
  int first[MOST_CLASSES], count[MOST_CLASSES];
  int connected[MOST_CLASSES], free[MOST_CLASSES], chosen[MOST_CLASSES];
  char on[MOST_STAGES];
  double off_since[MOST_STAGES];
  int switchings[MOST_STAGES];
} Bank;

typedef struct { double least, lowest; int fewest, counts[MOST_CLASSES]; } Search;

static void choose_one_size(Bank *b, double wanted) {
  double kvar = b->kvar[0], tolerance = 1e-9 * b->smallest;
  int present = b->connected[0], most = (int)b->most;
  int low = present > most ? present - most : 0;
  int high = present + (b->free[0] < most ? b->free[0] : most);
  double at = floor(wanted / kvar);
  int middle = at < low ? low : at > high ? high : (int)at;
  int best = middle;
  double best_off = fabs(wanted - middle * kvar);
  for (int c = middle > low ? middle - 1 : low; c <= middle + 2 && c <= high; c++) {
    double off = fabs(wanted - c * kvar);
    int moves = abs(c - present), best_moves = abs(best - present);
    int as_near = fabs(off - best_off) <= tolerance;
    if (off < best_off - tolerance || (as_near && (moves < best_moves || (moves == best_moves && c < best)))) {
      best = c;
      best_off = off;
    }
  }
  b->chosen[0] = best;
}

// pass 0 finds the least distance; pass 1 takes, among those as near, fewest switchings, then the lower level.
static void walk(Bank *b, Search *s, double wanted, int c, double level, int moves, int pass) {
  if (c == b->classes) {
    double off = fabs(wanted - level);
    if (pass == 0) {
      if (off < s->least) s->least = off;
    } else if (off <= s->least + 1e-9 * b->smallest &&
               (moves < s->fewest || (moves == s->fewest && level < s->lowest - 1e-9 * b->smallest))) {
      s->fewest = moves;
      s->lowest = level;
      memcpy(b->chosen, s->counts, sizeof s->counts);
    }
    return;
  }
  int present = b->connected[c], left = (int)b->most - moves;
  int low = present > left ? present - left : 0;
  int high = present + (b->free[c] < left ? b->free[c] : left);
  for (int count = low; count <= high; count++) {
    s->counts[c] = count;
    walk(b, s, wanted, c + 1, level + count * b->kvar[c], moves + abs(count - present), pass);
  }
}

static void choose(Bank *b, double wanted) {
  if (b->classes == 1) {
    choose_one_size(b, wanted);
    return;
  }
  Search s = {.least = INFINITY, .lowest = INFINITY, .fewest = 1 << 30};
  walk(b, &s, wanted, 0, 0, 0, 0);
  walk(b, &s, wanted, 0, 0, 0, 1);
}

static void connect_one(Bank *b, int c, double begin) {
  int pick = -1;
  for (int s = b->first[c]; s < b->first[c] + b->count[c]; s++) {
    if (b->on[s] || begin < b->off_since[s] + b->delay) continue;
    if (pick < 0 || b->switchings[s] < b->switchings[pick]) pick = s;
  }
  b->on[pick] = 1;
  b->switchings[pick]++;
}

static void disconnect_one(Bank *b, int c, double begin) {
  int pick = -1;
  for (int s = b->first[c]; s < b->first[c] + b->count[c]; s++) {
    if (b->on[s] && (pick < 0 || b->switchings[s] > b->switchings[pick])) pick = s;
  }
  b->on[pick] = 0;
  b->off_since[pick] = begin;
  b->switchings[pick]++;
}

static double decide(Bank *b, double begin, double wanted) {
  for (int c = 0; c < b->classes; c++) {
    int free = 0;
    for (int s = b->first[c]; s < b->first[c] + b->count[c]; s++) {
      free += !b->on[s] && begin >= b->off_since[s] + b->delay;
    }
    b->free[c] = free;
  }
  choose(b, wanted);
  double level = 0;
  for (int c = 0; c < b->classes; c++) {
    for (int k = b->connected[c]; k < b->chosen[c]; k++) connect_one(b, c, begin);
    for (int k = b->connected[c]; k > b->chosen[c]; k--) disconnect_one(b, c, begin);
    b->connected[c] = b->chosen[c];
    level += b->connected[c] * b->kvar[c];
  }
  return level;
}

static void start(Bank *b) {
  memset(b->connected, 0, sizeof b->connected);
  memset(b->on, 0, sizeof b->on);
  memset(b->switchings, 0, sizeof b->switchings);
  for (int s = 0; s < b->stages; s++) b->off_since[s] = -INFINITY;
}
