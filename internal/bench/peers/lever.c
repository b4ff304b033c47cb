// Slotted lever by hand, with vectors: position, velocity and acceleration per call. out = x,y,vx,vy,ax,ay of the
// crank pin as seen from the lever, then the lever's w,alpha. Prints a result a line, as closed.c does; its case stands here.
#include "common.h"
typedef struct { double r, c, e; } Lever; // crank, centre distance, slot's offset
static const Lever lever = {0.11, 0.26, 0.02};

// crank pivot (0,0), lever pivot (-c,0), pin at (s, e) in the lever; d: from lever pivot to pin, u along the slot
static inline void lever_core(const void *mp, double phi, double w, double al, double *o, double *cx, double *cy) {
  const Lever *m = mp;
  double sn, cs; sincos(phi, &sn, &cs);
  double ax = m->r * cs, ay = m->r * sn, w2 = w * w, e = m->e;
  double vx = -w * ay, vy = w * ax, bx = -al * ay - w2 * ax, by = al * ax - w2 * ay;
  double dx = ax + m->c, dy = ay, d2 = dx * dx + dy * dy, i = 1 / d2, s = sqrt(d2 - e * e), k = 1 / s;
  double ux = (s * dx + e * dy) * i, uy = (s * dy - e * dx) * i;
  double w4 = (vy * ux - vx * uy) * k, sv = vx * ux + vy * uy + w4 * e;
  double a4 = (by * ux - bx * uy - 2 * sv * w4 + w4 * w4 * e) * k;
  o[0] = s; o[1] = e; o[2] = sv; o[3] = 0; o[4] = bx * ux + by * uy + a4 * e + w4 * w4 * s; o[5] = 0; o[6] = w4; o[7] = a4; *cx = ux; *cy = uy;
}
NOIPA void lever_vec(const void *mp, double phi, double w, double al, double *o) { double ux, uy; lever_core(mp, phi, w, al, o, &ux, &uy); }
// the same with the lever's angle, which a swing over many turns is counted by
double lever_angle;
NOIPA void lever_swing(const void *mp, double phi, double w, double al, double *o) {
  double ux, uy; lever_core(mp, phi, w, al, o, &ux, &uy); lever_angle = atan2(uy, ux);
}
// textbook style: angles
NOIPA void lever_text(const void *mp, double t2, double w2, double al2, double *o) {
  const Lever *m = mp;
  double r = m->r, c = m->c, e = m->e, x = c + r * cos(t2), y = r * sin(t2), d = sqrt(x * x + y * y), s = sqrt(d * d - e * e);
  double t4 = atan2(y, x) - asin(e / d), w4 = r * w2 * cos(t2 - t4) / s, sv = -r * w2 * sin(t2 - t4) + w4 * e;
  double a4 = (r * al2 * cos(t2 - t4) - r * w2 * w2 * sin(t2 - t4) - 2 * sv * w4 + w4 * w4 * e) / s;
  o[0] = s; o[1] = e; o[2] = sv; o[3] = 0; o[4] = -r * al2 * sin(t2 - t4) - r * w2 * w2 * cos(t2 - t4) + a4 * e + w4 * w4 * s;
  o[5] = 0; o[6] = w4; o[7] = a4;
}
static double residual(double phi, const double *o) { // how far the pin is from its place in the lever, from the outputs alone
  return fabs(hypot(o[0], o[1]) - hypot(lever.c + lever.r * cos(phi), lever.r * sin(phi)));
}
typedef void Fn(const void *m, double phi, double w, double al, double *o);
static void bench(const char *peer, Fn *f) {
  static double phi[4096], w[4096], al[4096];
  Sweep s = {4096, 4, {0, 1000, 2500, 4095}};
  double chk[4][8], o[8], acc[8] = {0}, sink[8] = {0}, res = 0, t0, t; long n = 0;
  for (int k = 0; k < s.steps; k++) { phi[k] = phi_k(k, s.steps); w[k] = om_k(k); al[k] = al_k(k); }
  for (int k = 0; k < s.steps; k++) {
    f(&lever, phi[k], w[k], al[k], o); res = fmax(res, residual(phi[k], o));
    for (int j = 0; j < 8; j++) acc[j] += o[j];
    for (int i = 0; i < s.nchk; i++) if (s.chk[i] == k) memcpy(chk[i], o, sizeof o);
  }
  double before = 0, best = INFINITY; // the quickest sweep: noise only adds
  t0 = now();
  do {
    for (int k = 0; k < s.steps; k++) { f(&lever, phi[k], w[k], al[k], o); for (int j = 0; j < 8; j++) sink[j] += o[j]; }
    n += s.steps; t = now() - t0; best = fmin(best, t - before); before = t;
  } while (t < SLICE);
  if (!isfinite(sink[0] + sink[7])) res = INFINITY;
  report(peer, "lever", best, s.steps, s.steps, res, 0, acc, s, chk);
}
int main(void) { bench("c-textbook", lever_text); bench("c-vector", lever_vec); bench("c-vector, angle too", lever_swing); }
