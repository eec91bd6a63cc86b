/*
 * The work of the usual kernel in C, for comparison: twenty sums and four sizes over the facets of a binary STL file, in blocks of 16 facets folded by two-sum.
 * Reads the file, sums it so many times, and prints the nanoseconds of processor time a facet of the quickest round, and a sum.
 */
#include <math.h>
#include <stdint.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

enum { BLOCK = 16, SUMS = 20, FACET = 50, HEADER = 84 };

static double high[SUMS], low[SUMS], sizes[4];

static void fold(int place, double value) {
  double before = high[place], after = before + value, part = after - before;
  low[place] += (before - (after - part)) + (value - part);
  high[place] = after;
}

static void integrate(const uint8_t *facets, long count, const double *o) {
  for (long begin = 0; begin < count; begin += BLOCK) {
    long end = begin + BLOCK < count ? begin + BLOCK : count;
    double s[SUMS] = {0}, z[4] = {0};
    for (long facet = begin; facet < end; facet++) {
      float c[9];
      memcpy(c, facets + FACET * facet + 12, sizeof c);
      double px = c[0], py = c[1], pz = c[2], qx = c[3], qy = c[4], qz = c[5], rx = c[6], ry = c[7], rz = c[8];
      double ax = px - o[0], ay = py - o[1], az = pz - o[2], bx = qx - o[0], by = qy - o[1], bz = qz - o[2], cx = rx - o[0], cy = ry - o[1], cz = rz - o[2];
      double ex = qx - px, ey = qy - py, ez = qz - pz, fx = rx - px, fy = ry - py, fz = rz - pz;
      double p1 = ey * fz, q1 = ez * fy, p2 = ez * fx, q2 = ex * fz, p3 = ex * fy, q3 = ey * fx;
      double nx = p1 - q1, ny = p2 - q2, nz = p3 - q3;
      double size1 = fabs(p1) + fabs(q1), size2 = fabs(p2) + fabs(q2), size3 = fabs(p3) + fabs(q3);
      double dSize = fabs(ax) * size1 + fabs(ay) * size2 + fabs(az) * size3, lSize = size1 + size2 + size3;
      double d = ax * nx + ay * ny + az * nz, l = sqrt(nx * nx + ny * ny + nz * nz);
      double tx = ax + bx + cx, ty = ay + by + cy, tz = az + bz + cz;
      double xx = tx * tx + ax * ax + (bx * bx + cx * cx), yy = ty * ty + ay * ay + (by * by + cy * cy), zz = tz * tz + az * az + (bz * bz + cz * cz);
      double xy = tx * ty + ax * ay + (bx * by + cx * cy), yz = ty * tz + ay * az + (by * bz + cy * cz), zx = tz * tx + az * ax + (bz * bx + cz * cx);
      double trace = xx + yy + zz;
      s[0] += d; s[1] += d * tx; s[2] += d * ty; s[3] += d * tz; s[4] += d * xx; s[5] += d * yy; s[6] += d * zz; s[7] += d * xy; s[8] += d * yz; s[9] += d * zx;
      s[10] += l; s[11] += l * tx; s[12] += l * ty; s[13] += l * tz; s[14] += l * xx; s[15] += l * yy; s[16] += l * zz; s[17] += l * xy; s[18] += l * yz; s[19] += l * zx;
      z[0] += dSize; z[1] += dSize * trace; z[2] += lSize; z[3] += lSize * trace;
    }
    for (int place = 0; place < SUMS; place++) fold(place, s[place]);
    for (int place = 0; place < 4; place++) sizes[place] += z[place];
  }
}

int main(int argc, char **argv) {
  FILE *file = argc < 3 ? NULL : fopen(argv[1], "rb");
  if (!file) return 1;
  fseek(file, 0, SEEK_END);
  long length = ftell(file), count = (length - HEADER) / FACET;
  uint8_t *bytes = malloc(length);
  rewind(file);
  if (!bytes || fread(bytes, 1, length, file) != (size_t)length) return 1;
  float first[3];
  memcpy(first, bytes + HEADER + 12, sizeof first);
  const double origin[3] = {first[0], first[1], first[2]};
  double best = INFINITY;
  for (int round = 0; round < atoi(argv[2]); round++) {
    memset(high, 0, sizeof high);
    memset(low, 0, sizeof low);
    clock_t begin = clock();
    integrate(bytes + HEADER, count, origin);
    double time = (double)(clock() - begin) / CLOCKS_PER_SEC;
    if (time < best) best = time;
  }
  printf("%.3f %.17g\n", 1e9 * best / count, (high[0] + low[0]) / 6);
  return 0;
}
