#!/usr/bin/env python3
"""High-precision reference for distribution functions (mpmath, 60+ digits; results rounded to the nearest double).
usage: reference-distributions.py shared tests/reference/12-distributions.json     (needs mpmath, numpy, scipy for starting values, Rscript for the R column)"""
import sys, json, subprocess, math, tempfile, os
import mpmath as mp, scipy.special as sc
mp.mp.dps = 60
one = mp.mpf(1)
# ---------- cdf/sf pairs, arguments are exact doubles
def norm(x): x = mp.mpf(x); return mp.erfc(-x/mp.sqrt(2))/2, mp.erfc(x/mp.sqrt(2))/2
def gam(a, x):      # regularised incomplete gamma (P, Q)
    a, x = mp.mpf(a), mp.mpf(x)
    if x <= 0: return mp.mpf(0), one
    lead = mp.exp(a*mp.log(x) - x - mp.loggamma(a))
    if x < a + 1:
        s = t = one/a; n = 0
        while abs(t) > abs(s)*mp.mpf(10)**(-mp.mp.dps-2): n += 1; t *= x/(a+n); s += t
        P = lead*s; return P, 1 - P
    tiny = mp.mpf(10)**-2000; b = x + 1 - a; c = 1/tiny; d = 1/b; h = d; i = 0
    while True:
        i += 1; an = -i*(i-a); b += 2; d = an*d + b; d = tiny if d == 0 else d; c = b + an/c; c = tiny if c == 0 else c; d = 1/d; de = d*c; h *= de
        if abs(de - 1) < mp.mpf(10)**(-mp.mp.dps-1): break
    Q = lead*h; return 1 - Q, Q
def bet(a, b, x, y=None):   # regularised incomplete beta (I_x, 1-I_x), y = 1-x when known exactly
    a, b, x = mp.mpf(a), mp.mpf(b), mp.mpf(x); y = 1 - x if y is None else mp.mpf(y)
    if x <= 0: return mp.mpf(0), one
    if y <= 0: return one, mp.mpf(0)
    if x > (a+1)/(a+b+2): q, p = bet(b, a, y, x); return p, q
    lead = mp.exp(a*mp.log(x) + b*mp.log(y) - (mp.loggamma(a)+mp.loggamma(b)-mp.loggamma(a+b)))/a
    tiny = mp.mpf(10)**-2000; c = one; d = 1 - (a+b)*x/(a+1); d = 1/(tiny if d == 0 else d); h = d; m = 0
    while True:
        m += 1; m2 = 2*m
        aa = m*(b-m)*x/((a+m2-1)*(a+m2)); d = 1 + aa*d; c = 1 + aa/c; d = 1/(tiny if d == 0 else d); c = tiny if c == 0 else c; h *= d*c
        aa = -(a+m)*(a+b+m)*x/((a+m2)*(a+m2+1)); d = 1 + aa*d; c = 1 + aa/c; d = 1/(tiny if d == 0 else d); c = tiny if c == 0 else c; de = d*c; h *= de
        if abs(de - 1) < mp.mpf(10)**(-mp.mp.dps-1): break
    P = lead*h; return P, 1 - P
def tdist(v, t):
    v, t = mp.mpf(v), mp.mpf(t); x = v/(v+t*t); y = t*t/(v+t*t); tail = bet(v/2, mp.mpf('0.5'), x, y)[0]/2
    return (tail, 1-tail) if t < 0 else (1-tail, tail)
def chi(v, x): return gam(mp.mpf(v)/2, mp.mpf(x)/2)
def fd(d1, d2, f): d1, d2, f = mp.mpf(d1), mp.mpf(d2), mp.mpf(f); s = d1*f + d2; return bet(d1/2, d2/2, d1*f/s, d2/s)
def gamma_(k, x): return gam(k, x)
DIST = dict(normal=norm, t=tdist, chisq=chi, f=fd, beta=lambda a, b, x: bet(a, b, x), gamma=gamma_)
def extra(fn, x, args):      # working precision for cancellation
    return DIST[fn](*args, x)
def cdfsf(fn, args, x):
    P, Q = DIST[fn](*args, x)
    if min(P, Q) < mp.mpf(10)**-30 and min(P, Q) != 0 or P == 0 or Q == 0:   # complement lost digits: redo with more
        old = mp.mp.dps; mp.mp.dps = old + 340
        try: P, Q = DIST[fn](*args, x)
        finally: mp.mp.dps = old
    return P, Q
def quant(fn, args, p, upper):    # solve by bisection on a transformed scale then secant, in mp
    p = mp.mpf(p)
    def g(x):
        P, Q = cdfsf(fn, args, x); v = Q if upper else P
        return (mp.log(v) - mp.log(p)) if v > 0 else mp.mpf(-10)**6
    if fn in ('normal', 't'):
        lo, hi = (mp.mpf(-40), mp.mpf(40)) if fn == 'normal' else (-mp.mpf(10)**320, mp.mpf(10)**320)
        if p == mp.mpf('0.5'): return mp.mpf(0)
        neg = (p < 0.5) != upper
        tr = (lambda u: -mp.exp(u)) if neg else (lambda u: mp.exp(u)); ulo, uhi = mp.mpf(-60), (mp.log(45) if fn == 'normal' else mp.mpf(740))
    elif fn == 'beta': tr = lambda u: 1/(1+mp.exp(-u)); ulo, uhi = mp.mpf(-800000), mp.mpf(800)
    else: tr = lambda u: mp.exp(u); ulo, uhi = mp.mpf(-800000) if fn in ('gamma','chisq','f') else mp.mpf(-800), mp.mpf(800)
    old = mp.mp.dps; mp.mp.dps = 30
    try:
        glo = g(tr(ulo)); ghi = g(tr(uhi)); s = 1 if ghi > glo else -1
        for _ in range(60):
            m = (ulo+uhi)/2; v = g(tr(m))*s
            if v < 0: ulo = m
            else: uhi = m
            if abs(uhi-ulo) < mp.mpf(10)**-9*max(1, abs(m)): break
        a, b = ulo, uhi; fa, fb = g(tr(a)), g(tr(b))
        for _ in range(30):
            if fb == fa: break
            c = b - fb*(b-a)/(fb-fa); a, fa = b, fb; b, fb = c, g(tr(c))
            if abs(b-a) < mp.mpf(10)**-24*max(1, abs(b)): break
    finally: mp.mp.dps = old
    return tr(b)
P_SET = [1e-300, 1e-100, 1e-20, 1e-10, 1e-6, 5e-4, 0.025, 0.05, 0.3, 0.5, 0.7, 0.95, 0.975, 0.9995]
PAR = dict(
 shared=dict(normal=[()], t=[(1,),(2,),(2.5,),(5,),(10,),(30,),(200,),(1e4,),(1e7,)], chisq=[(0.5,),(1,),(2,),(3,),(10,),(100,),(1e4,),(1e6,)], f=[(1,1),(1,10),(5,2),(3.5,7.2),(10,40),(2,1e4),(500,500)],
             beta=[(0.5,0.5),(1,1),(2,3),(0.1,0.3),(82,183),(1,30),(21,1),(5,1e5),(500,500),(1e5,1e5)], gamma=[(0.1,),(0.5,),(1,),(2.5,),(11,),(100,),(1e4,),(1e6,)]))
X = dict(normal=[-38.0,-37.0,-20.0,-8.5,-5.0,-1.0,0.0,0.5,1.96,3.0,6.0,8.3,10.0,37.5], t=[-1e6,-500.0,-40.0,-9.0,-3.0,-0.5,0.0,1e-8,1.0,2.0,6.0,30.0,1e4])
def xs(fn, args):
    if fn in X: return X[fn]
    if fn == 'beta': m = args[0]/(args[0]+args[1]); return sorted({1e-10, 1e-3, m*0.5, m*0.9, m, min(0.999999, m+(1-m)*0.1), m+(1-m)*0.5, 1-1e-9})
    m = args[0] if fn in ('chisq','gamma') else 1.0; s = math.sqrt(m*(2 if fn == 'chisq' else 1)) if fn != 'f' else 1.0
    return sorted({1e-12, m*1e-3, max(m-8*s, m*0.2), m*0.8, m, m+2*s, m+8*s, m+20*s, m*50.0} if fn != 'f' else {1e-12,1e-4,0.1,0.7,1.0,2.5,10.0,500.0,1e8})
def main(which, out, parfile=None):
    global P_SET
    if parfile: o = json.load(open(parfile)); PAR[which] = {k: [tuple(a) for a in v] for k, v in o['params'].items()}; P_SET = o['p']      # another set of points
    pts = []
    for fn, L in PAR[which].items():
        for args in L:
            for x in xs(fn, args):
                P, Q = cdfsf(fn, args, x)
                for nm, v in (('cdf', P), ('sf', Q)):
                    if v > mp.mpf('1e-305'): pts.append([fn, nm, list(args), float(x), float(v)])
            for p in P_SET:
                for nm, up in (('quantile', False), ('isf', True)):
                    if up and p > 0.5: continue
                    q = quant(fn, args, p, up); fq = float(q)
                    if abs(q) > mp.mpf('1e-300') and abs(q) < mp.mpf('1e300') and not (fn == 'beta' and fq == 1.0): pts.append([fn, nm, list(args), p, fq])
                    elif q == 0: pts.append([fn, nm, list(args), p, 0.0])
        print(fn, len(pts), file=sys.stderr, flush=True)
    # R's own answers
    rn = dict(normal='norm', t='t', chisq='chisq', f='f', beta='beta', gamma='gamma')
    with tempfile.TemporaryDirectory() as d:
        with open(d+'/a.R', 'w') as f:
            f.write('options(warn=-1);v <- c(\n' + ',\n'.join(f"{'p' if n in ('cdf','sf') else 'q'}{rn[fn]}({','.join(repr(z) for z in [x]+a)},lower.tail={'TRUE' if n in ('cdf','quantile') else 'FALSE'})" for fn, n, a, x, e in pts) + ")\nwriteLines(sprintf('%.17g', v), '" + d + "/o')\n")
        subprocess.run(['Rscript', d+'/a.R'], check=True, stderr=subprocess.DEVNULL); R = [float(z) for z in open(d+'/o')]
    rows = []; worst = {}
    for (fn, n, a, x, e), r in zip(pts, R):
        re = abs(r-e)/abs(e) if e else abs(r)
        rows.append(dict(dist=fn, fn=n, params=a, x=x, expected=e, r_relerr=float('%.1e' % re)))
        k = fn+'.'+n; worst[k] = max(worst.get(k, (0,)), (re, a, x), key=lambda z: z[0])
    js = dict(topic='12-distributions', title='Distribution functions and quantiles incl. far tails', set=which, source='mpmath %s, 60 digits, arguments taken as exact doubles; expected = nearest double; r_relerr = relative error of R 4.2.2 at the point' % mp.__version__,
              meaning='cdf: P(X<=x). sf: P(X>x), computed without 1-cdf. quantile: x with P(X<=x)=p. isf: x with P(X>x)=p. params: normal [], t [df], chisq [df], f [df1,df2], beta [a,b], gamma [shape] (rate 1). Points whose answer is outside 1e-300..1e300 are left out.',
              tolerance=dict(rel=1e-11, abs=0, override={'quantile/isf where density is flat or p<1e-50': 1e-9, 'params >= 1e5': 1e-9}), count=len(rows), cases=rows)
    s = json.dumps({k: v for k, v in js.items() if k != 'cases'}, indent=1)[:-2] + ',\n "cases": [\n' + ',\n'.join('  '+json.dumps(r) for r in rows) + '\n ]\n}\n'
    open(out, 'w').write(s); json.loads(s)
    for k, v in worst.items(): print(k, 'R worst rel err %.2e at' % v[0], v[1:], file=sys.stderr)
main(*sys.argv[1:4])
