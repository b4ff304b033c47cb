// Hand-written closed forms: position, velocity and acceleration per call. out = x,y,vx,vy,ax,ay (point), w,alpha (body).
#include "common.h"
typedef struct { double x, y; } V;
typedef struct { double r, l, e; } Slider;
typedef struct { double a, b, c, ox, oy, s, fol, qx, qy, b2, c2, o6x, o6y, s2, tg, K1, K2, K3, K4, K5, p, tq; } Bar; // four-bar: (qx,qy) is P; six-bar: second dyad too; tg... : constants of the textbook style
typedef struct { double off, a, b, c, ox, oy, s, co, so; } Link;
typedef struct { int n; Link *l; } Chain;
typedef struct { V p, v, a; } Pt;   // point with derivatives
typedef struct { V u; double w, al; } Dir; // unit vector of a link with rate and acceleration
typedef void Fn(const void *m, double phi, double w, double al, double *o);

// ---- textbook style: an angle per link, sin/cos per link
NOIPA void slider_text(const void *mp, double t2, double w2, double a2, double *o) {
  const Slider *m = mp;
  double s3 = (m->e - m->r * sin(t2)) / m->l, t3 = atan2(s3, sqrt(1 - s3 * s3));
  double w3 = -m->r * w2 * cos(t2) / (m->l * cos(t3));
  double a3 = (m->r * w2 * w2 * sin(t2) - m->r * a2 * cos(t2) + m->l * w3 * w3 * sin(t3)) / (m->l * cos(t3));
  o[0] = m->r * cos(t2) + m->l * cos(t3); o[1] = m->e;
  o[2] = -m->r * w2 * sin(t2) - m->l * w3 * sin(t3); o[3] = 0;
  o[4] = -m->r * (a2 * sin(t2) + w2 * w2 * cos(t2)) - m->l * (a3 * sin(t3) + w3 * w3 * cos(t3)); o[5] = 0;
  o[6] = w3; o[7] = a3;
}
NOIPA void fourbar_text(const void *mp, double t2, double w2, double al2, double *o) {
  const Bar *m = mp;
  double a = m->a, b = m->b, c = m->c, t = t2 - m->tg;
  double A = cos(t) - m->K1 - m->K2 * cos(t) + m->K3, B = -2 * sin(t), C = m->K1 - (m->K2 + 1) * cos(t) + m->K3;
  double D = cos(t) - m->K1 + m->K4 * cos(t) + m->K5, E = -2 * sin(t), F = m->K1 + (m->K4 - 1) * cos(t) + m->K5;
  double t4 = 2 * atan2(-B - m->s * sqrt(B * B - 4 * A * C), 2 * A) + m->tg, t3 = 2 * atan2(-E - m->s * sqrt(E * E - 4 * D * F), 2 * D) + m->tg;
  double w3 = a * w2 * sin(t4 - t2) / (b * sin(t3 - t4)), w4 = a * w2 * sin(t2 - t3) / (c * sin(t4 - t3));
  double G = c * sin(t4), H = b * sin(t3), I = a * al2 * sin(t2) + a * w2 * w2 * cos(t2) + b * w3 * w3 * cos(t3) - c * w4 * w4 * cos(t4);
  double J = c * cos(t4), K = b * cos(t3), L = a * al2 * cos(t2) - a * w2 * w2 * sin(t2) - b * w3 * w3 * sin(t3) + c * w4 * w4 * sin(t4);
  double a3 = (I * J - G * L) / (G * K - H * J), a4 = (I * K - H * L) / (G * K - H * J);
  double p = m->p, tp = t3 + m->tq;
  o[0] = a * cos(t2) + p * cos(tp); o[1] = a * sin(t2) + p * sin(tp);
  o[2] = -a * w2 * sin(t2) - p * w3 * sin(tp); o[3] = a * w2 * cos(t2) + p * w3 * cos(tp);
  o[4] = -a * (al2 * sin(t2) + w2 * w2 * cos(t2)) - p * (a3 * sin(tp) + w3 * w3 * cos(tp));
  o[5] = a * (al2 * cos(t2) - w2 * w2 * sin(t2)) + p * (a3 * cos(tp) - w3 * w3 * sin(tp));
  o[6] = w4; o[7] = a4;
}
// ---- vector style: one sincos, circle intersection, unit vectors
static inline Pt fix(double x, double y) { return (Pt){{x, y}, {0, 0}, {0, 0}}; }
static inline Pt on(Pt p, Dir d, double x, double y) { // local point (x,y) of a link that starts at p along d
  double rx = x * d.u.x - y * d.u.y, ry = x * d.u.y + y * d.u.x, w2 = d.w * d.w;
  return (Pt){{p.p.x + rx, p.p.y + ry}, {p.v.x - d.w * ry, p.v.y + d.w * rx}, {p.a.x - d.al * ry - w2 * rx, p.a.y + d.al * rx - w2 * ry}};
}
static inline Dir crank(double phi, double w, double al) { double s, c; sincos(phi, &s, &c); return (Dir){{c, s}, w, al}; }
// A moves, C is fixed: link AB of length b, link CB of length c
static inline void dyad(Pt A, double cx, double cy, double b, double c, double s, Dir *ab, Dir *cb) {
  double dx = cx - A.p.x, dy = cy - A.p.y, i = 1 / (dx * dx + dy * dy), u = 0.5 * (1 + (b * b - c * c) * i), h = s * sqrt(b * b * i - u * u);
  double rx = u * dx - h * dy, ry = u * dy + h * dx, qx = rx - dx, qy = ry - dy, k = 1 / (ry * qx - rx * qy); // r = AB, q = CB
  double w3 = (A.v.x * qx + A.v.y * qy) * k, w4 = (A.v.x * rx + A.v.y * ry) * k;
  double ex = A.a.x - w3 * w3 * rx + w4 * w4 * qx, ey = A.a.y - w3 * w3 * ry + w4 * w4 * qy;
  *ab = (Dir){{rx / b, ry / b}, w3, (ex * qx + ey * qy) * k};
  *cb = (Dir){{qx / c, qy / c}, w4, (ex * rx + ey * ry) * k};
}
static inline void put(double *o, Pt p, Dir d) { memcpy(o, &p, 48); o[6] = d.w; o[7] = d.al; }
NOIPA void slider_vec(const void *mp, double phi, double w, double al, double *o) {
  const Slider *m = mp;
  Pt A = on(fix(0, 0), crank(phi, w, al), m->r, 0);
  double dy = m->e - A.p.y, dx = sqrt(m->l * m->l - dy * dy), i = 1 / dx;
  double w3 = -A.v.y * i, a3 = (w3 * w3 * dy - A.a.y) * i; // rod vector d: v = vA + w3 x d with v.y = 0
  o[0] = A.p.x + dx; o[1] = m->e; o[2] = A.v.x - w3 * dy; o[3] = 0; o[4] = A.a.x - a3 * dy - w3 * w3 * dx; o[5] = 0; o[6] = w3; o[7] = a3;
}
NOIPA void fourbar_vec(const void *mp, double phi, double w, double al, double *o) {
  const Bar *m = mp; Dir ab, cb;
  Pt A = on(fix(0, 0), crank(phi, w, al), m->a, 0);
  dyad(A, m->ox, m->oy, m->b, m->c, m->s, &ab, &cb);
  put(o, on(A, ab, m->qx, m->qy), cb);
}
NOIPA void sixbar_vec(const void *mp, double phi, double w, double al, double *o) {
  const Bar *m = mp; Dir ab, cb, qd, od;
  Pt A = on(fix(0, 0), crank(phi, w, al), m->a, 0);
  dyad(A, m->ox, m->oy, m->b, m->c, m->s, &ab, &cb);
  Pt Q = m->fol ? on(fix(m->ox, m->oy), cb, m->qx, m->qy) : on(A, ab, m->qx, m->qy);
  dyad(Q, m->o6x, m->o6y, m->b2, m->c2, m->s2, &qd, &od);
  put(o, on(fix(m->o6x, m->o6y), od, m->c2, 0), od);
}
static inline __attribute__((always_inline)) double chain_run(const Chain *m, double phi, double w, double al, double *o, int check) {
  Dir cb = crank(phi, w, al), ab; Pt O = fix(0, 0); double res = 0;
  for (int i = 0; i < m->n; i++) {
    const Link *l = &m->l[i];
    Pt A = on(O, cb, l->a * l->co, l->a * l->so);
    dyad(A, l->ox, l->oy, l->b, l->c, l->s, &ab, &cb); O = fix(l->ox, l->oy);
    if (check) { V p = on(A, ab, l->b, 0).p, q = on(O, cb, l->c, 0).p; res = fmax(res, hypot(p.x - q.x, p.y - q.y)); }
  }
  put(o, on(O, cb, m->l[m->n - 1].c, 0), cb);
  return res;
}
NOIPA void chain_vec(const void *m, double phi, double w, double al, double *o) { chain_run(m, phi, w, al, o, 0); }
// ---- closure error from the outputs alone, outside the timed loop
static double res_slider(const void *mp, double phi, const double *o) { const Slider *m = mp; return fabs(hypot(o[0] - m->r * cos(phi), o[1] - m->r * sin(phi)) - m->l); }
static double res_four(const void *mp, double phi, const double *o) {
  const Bar *m = mp; double ax = m->a * cos(phi), ay = m->a * sin(phi), t = atan2(o[1] - ay, o[0] - ax) - atan2(m->qy, m->qx);
  return fmax(fabs(hypot(o[0] - ax, o[1] - ay) - hypot(m->qx, m->qy)), fabs(hypot(ax + m->b * cos(t) - m->ox, ay + m->b * sin(t) - m->oy) - m->c));
}
static double res_six(const void *mp, double phi, const double *o) {
  const Bar *m = mp; Dir ab, cb; Pt A = on(fix(0, 0), crank(phi, 1, 0), m->a, 0);
  dyad(A, m->ox, m->oy, m->b, m->c, m->s, &ab, &cb);
  V p = on(A, ab, m->b, 0).p, q = on(fix(m->ox, m->oy), cb, m->c, 0).p, r = m->fol ? on(fix(m->ox, m->oy), cb, m->qx, m->qy).p : on(A, ab, m->qx, m->qy).p;
  return fmax(hypot(p.x - q.x, p.y - q.y), fabs(hypot(r.x - o[0], r.y - o[1]) - m->b2));
}
static double res_chain(const void *m, double phi, const double *o) { double t[8], r = chain_run(m, phi, 1, 0, t, 1); return fmax(r, hypot(t[0] - o[0], t[1] - o[1])); }

static void bench(const char *peer, const char *cas, Fn *f, const void *m, Sweep s, double (*res)(const void *, double, const double *)) {
  static double phi[4096], w[4096], al[4096], chk[4][8]; double o[8], acc[8] = {0}, sink[8] = {0}, r = 0;
  for (int k = 0; k < s.steps; k++) { phi[k] = phi_k(k, s.steps); w[k] = om_k(k); al[k] = al_k(k); }
  for (int k = 0; k < s.steps; k++) { // warm-up pass: checksums and residual
    f(m, phi[k], w[k], al[k], o); r = fmax(r, res(m, phi[k], o));
    for (int j = 0; j < 8; j++) acc[j] += o[j];
    for (int i = 0; i < s.nchk; i++) if (s.chk[i] == k) memcpy(chk[i], o, sizeof o);
  }
  long n = 0; double t0 = now(), t, before = 0, best = INFINITY; // the quickest sweep: noise only adds
  do {
    for (int k = 0; k < s.steps; k++) { f(m, phi[k], w[k], al[k], o); for (int j = 0; j < 8; j++) sink[j] += o[j]; }
    n += s.steps; t = now() - t0; best = fmin(best, t - before); before = t;
  } while (t < SLICE);
  if (!isfinite(sink[0] + sink[7])) r = INFINITY;
  report(peer, cas, best, s.steps, s.steps, r, 0, acc, s, chk);
}
static Bar rd_bar(int six) {
  Bar m = {0}; double *p = &m.a; // all members are doubles, in file order
  for (int j = 0; j < 14; j++) if (six || j < 6 || j == 7 || j == 8) p[j] = num();
  double a = m.a, b = m.b, c = m.c, d = hypot(m.ox, m.oy);
  m.tg = atan2(m.oy, m.ox); m.p = hypot(m.qx, m.qy); m.tq = atan2(m.qy, m.qx); m.K1 = d / a; m.K2 = d / c; m.K4 = d / b;
  m.K3 = (a * a - b * b + c * c + d * d) / (2 * a * c); m.K5 = (c * c - d * d - a * a - b * b) / (2 * a * b);
  return m;
}
int main(void) {
  Sweep s = rd_open("slider_crank", ""); Slider sl; sl.r = num(); sl.l = num(); sl.e = num();
  bench("c-textbook", "slider_crank", slider_text, &sl, s, res_slider);
  bench("c-vector", "slider_crank", slider_vec, &sl, s, res_slider);
  s = rd_open("four_bar", ""); Bar fb = rd_bar(0);
  bench("c-textbook", "four_bar", fourbar_text, &fb, s, res_four);
  bench("c-vector", "four_bar", fourbar_vec, &fb, s, res_four);
  const char *six[] = {"sixbar_watt", "sixbar_steph"};
  for (int i = 0; i < 2; i++) { s = rd_open(six[i], ""); Bar m = rd_bar(1); bench("c-dyads", six[i], sixbar_vec, &m, s, res_six); }
  for (int i = 0, N[] = {1, 3, 10, 30, 100, 330}; i < 6; i++) {
    char name[16]; snprintf(name, 16, "chain%d", N[i]); s = rd_open(name, "");
    Chain c = {(int)num(), NULL}; c.l = calloc(c.n, sizeof(Link));
    for (int j = 0; j < c.n; j++) {
      Link *l = &c.l[j]; l->off = num(); l->a = num(); l->b = num(); l->c = num(); l->ox = num(); l->oy = num(); l->s = num();
      l->co = cos(l->off); l->so = sin(l->off);
    }
    bench("c-dyads", name, chain_vec, &c, s, res_chain);
  }
}
