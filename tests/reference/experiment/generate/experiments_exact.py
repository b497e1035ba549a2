#!/usr/bin/env python3
"""Exact-rational statistics of every experiment in experiments_data.csv (the binary64 values are taken as exact numbers), tail areas
in 40-digit arithmetic -> experiments_exact.csv. Empty cell = not defined for that experiment."""
import csv, sys
from collections import OrderedDict
from fractions import Fraction as Fr
from mpf import *
mp.dps = 40
def load(path):
    d = OrderedDict()
    for r in csv.DictReader(open(path)):
        d.setdefault(r['experiment'], []).append((r['group'], int(r.get('order') or 0), Fr(float(r['value']))))
    return d
def m(fr): return mpf(fr.numerator)/mpf(fr.denominator)
def fup(F, d1, d2):
    """(p, ln p) of the F upper tail; F: mpf"""
    if F == 0: return mpf(1), mpf(0)
    lo, up = log_f_tails(d1, d2, F); return mp.exp(up), up
def chi2up(x, df): return mp.gammainc(mpf(df)/2, x/2, mp.inf, regularized=True)
def one_way(groups):
    """groups: list of lists of Fraction -> dict of exact fractions"""
    k = len(groups); n = [len(g) for g in groups]; N = sum(n); means = [sum(g)/len(g) for g in groups]; gm = sum(map(sum, groups))/N
    ssw = sum(sum((x-mu)**2 for x in g) for g, mu in zip(groups, means)); ssb = sum(ni*(mu-gm)**2 for ni, mu in zip(n, means))
    return dict(k=k, n=n, N=N, means=means, gm=gm, ssb=ssb, ssw=ssw)
def median(v):
    v = sorted(v); h = len(v)//2
    return v[h] if len(v) % 2 else (v[h-1]+v[h])/2
COLS = ['k', 'n_total', 'df_between', 'df_within', 'grand_mean', 'ss_between', 'ss_within', 'ss_total', 'ms_between', 'ms_within', 'f', 'p', 'log_p', 'eta2', 'omega2',
        'epsilon2', 'cohen_f', 'welch_f', 'welch_df2', 'welch_p', 'bf_fstar', 'bf_df2', 'bf_p', 'bf_df1_mehrotra', 'bf_p_mehrotra', 'kw_h', 'kw_p', 'tie_groups', 'levene_median_f', 'levene_median_p',
        'bartlett_k2', 'bartlett_p', 'max_rstudent', 'max_rstudent_group', 'max_rstudent_order', 'max_rstudent_p_bonferroni', 'dw', 'dw_mean', 'dw_var', 'lag1']
def analyse(rows):
    gr = OrderedDict()
    for g, o, v in rows: gr.setdefault(g, []).append((o, v))
    G = [[v for _, v in x] for x in gr.values()]; names = list(gr)
    A = one_way(G); k, n, N = A['k'], A['n'], A['N']; d1, d2 = k-1, N-k
    r = dict(k=k, n_total=N, df_between=d1, df_within=d2, grand_mean=m(A['gm']), ss_between=m(A['ssb']), ss_within=m(A['ssw']), ss_total=m(A['ssb']+A['ssw']), ms_between=m(A['ssb']/d1))
    msw = A['ssw']/d2; r['ms_within'] = m(msw); sst = A['ssb']+A['ssw']
    if msw > 0:
        F = A['ssb']/d1/msw; r['f'] = m(F); r['p'], r['log_p'] = fup(r['f'], d1, d2); r['cohen_f'] = mp.sqrt(m(A['ssb']/A['ssw']))
    if sst > 0:
        r['eta2'] = m(A['ssb']/sst); r['omega2'] = m((A['ssb']-d1*msw)/(sst+msw)); r['epsilon2'] = m((A['ssb']-d1*msw)/sst)
    s2 = [sum((x-mu)**2 for x in g)/(len(g)-1) if len(g) > 1 else None for g, mu in zip(G, A['means'])]
    if all(v is not None and v > 0 for v in s2):
        w = [Fr(ni)/v for ni, v in zip(n, s2)]; W = sum(w); xt = sum(wi*mu for wi, mu in zip(w, A['means']))/W
        tmp = sum((1-wi/W)**2/(ni-1) for wi, ni in zip(w, n))/(k*k-1)
        wf = sum(wi*(mu-xt)**2 for wi, mu in zip(w, A['means']))/(k-1)/(1+2*(k-2)*tmp)
        r['welch_f'] = m(wf); r['welch_df2'] = m(1/(3*tmp)); r['welch_p'] = fup(r['welch_f'], d1, r['welch_df2'])[0]
        C = 1+(sum(Fr(1, ni-1) for ni in n)-Fr(1, d2))/(3*d1)
        r['bartlett_k2'] = (d2*mp.log(m(msw))-sum((ni-1)*mp.log(m(v)) for ni, v in zip(n, s2)))/m(C); r['bartlett_p'] = chi2up(r['bartlett_k2'], d1)
    if all(v is not None for v in s2) and any(v > 0 for v in s2):
        den = sum((1-Fr(ni, N))*v for ni, v in zip(n, s2)); fs = A['ssb']/den
        c = [(1-Fr(ni, N))*v/den for ni, v in zip(n, s2)]; df2 = 1/sum(ci**2/(ni-1) for ci, ni in zip(c, n))
        r['bf_fstar'] = m(fs); r['bf_df2'] = m(df2); r['bf_p'] = fup(m(fs), d1, m(df2))[0]
        f = [Fr(ni, N) for ni in n]
        df1 = den**2/(sum(fi*v for fi, v in zip(f, s2))**2+sum(v*v*(1-2*fi) for fi, v in zip(f, s2)))
        r['bf_df1_mehrotra'] = m(df1); r['bf_p_mehrotra'] = fup(m(fs), m(df1), m(df2))[0]
    # Kruskal-Wallis
    allv = sorted((v, i) for i, g in enumerate(G) for v in g); R = [Fr(0)]*k; i = 0; T = 0; ties = 0
    while i < N:
        j = i
        while j+1 < N and allv[j+1][0] == allv[i][0]: j += 1
        t = j-i+1; T += t**3-t; ties += t > 1
        for q in range(i, j+1): R[allv[q][1]] += Fr(i+j+2, 2)
        i = j+1
    r['tie_groups'] = ties; D = 1-Fr(T, N**3-N)
    if D > 0:
        H = (Fr(12, N*(N+1))*sum(x*x/ni for x, ni in zip(R, n))-3*(N+1))/D; r['kw_h'] = m(H); r['kw_p'] = chi2up(m(H), d1)
    Z = [[abs(x-md) for x in g] for g, md in ((g, median(g)) for g in G)]; L = one_way(Z)
    if L['ssw'] > 0:
        lf = L['ssb']/d1/(L['ssw']/d2); r['levene_median_f'] = m(lf); r['levene_median_p'] = fup(m(lf), d1, d2)[0]
    # residuals
    if msw > 0 and d2 >= 2:
        best = None
        for nm, g, mu in zip(names, gr.values(), A['means']):
            ni = len(g)
            if ni < 2: continue
            for o, x in g:
                e = x-mu; r2 = e*e/(msw*(1-Fr(1, ni)))            # squared internally studentised
                if best is None or r2 > best[0]: best = (r2, nm, o, 1 if e >= 0 else -1)
        r2, nm, o, sg = best
        if d2-r2 > 0:
            t2 = r2*(d2-1)/(d2-r2); r['max_rstudent'] = sg*mp.sqrt(m(t2)); r['max_rstudent_group'] = nm; r['max_rstudent_order'] = o
            r['max_rstudent_p_bonferroni'] = min(mpf(1), N*fup(m(t2), 1, d2-1)[0])
    if msw > 0 and rows[0][1] > 0:
        res = sorted((o, x-mu, names.index(nm)) for nm, mu in zip(names, A['means']) for o, x in gr[nm])
        e = [x for _, x, _ in res]; gi = [g for _, _, g in res]
        r['dw'] = m(sum((e[i+1]-e[i])**2 for i in range(N-1))/A['ssw']); r['lag1'] = m(sum(e[i+1]*e[i] for i in range(N-1))/A['ssw'])
        # exact mean/variance of the Durbin-Watson ratio under iid normal errors: M = I - P (P averages within groups), A = first-difference matrix
        tr, tr2 = dw_traces(gi, n, N)
        r['dw_mean'] = m(tr/d2); r['dw_var'] = m(2*(tr2-tr*tr/d2)/(d2*(d2+2)))
    return r
def dw_traces(gi, n, N):
    """tr(MA) and tr((MA)^2) for M = I - sum_g 1_g 1_g'/n_g and A = D'D (D first differences in run order), exact, O(N + k^2)."""
    k = len(n)
    trA = 2*(N-1); trA2 = sum((1 if i in (0, N-1) else 2)**2 for i in range(N))+2*(N-1)
    # B[g][h] = 1_g' A 1_h ; A 1_h computed sparsely
    B = [[0]*k for _ in range(k)]; C = [0]*k                   # C[g] = 1_g' A^2 1_g = |A 1_g|^2
    nz = [dict() for _ in range(k)]
    for i in range(N):
        for j, a in ((i, 1 if i in (0, N-1) else 2), (i-1, -1), (i+1, -1)):
            if 0 <= j < N:
                h = gi[j]; nz[h][i] = nz[h].get(i, 0)+a; B[gi[i]][h] += a
    for g in range(k): C[g] = sum(v*v for v in nz[g].values())
    tr = trA-sum(Fr(B[g][g], n[g]) for g in range(k))
    tr2 = trA2-2*sum(Fr(C[g], n[g]) for g in range(k))+sum(Fr(B[g][h]**2, n[g]*n[h]) for g in range(k) for h in range(k))
    return tr, tr2
def fmt(v):
    if v is None: return ''
    return s17(v) if isinstance(v, mpf) else str(v)
if __name__ == '__main__':
    src = sys.argv[1] if len(sys.argv) > 1 else 'experiments_data.csv'; dst = sys.argv[2] if len(sys.argv) > 2 else 'experiments_exact.csv'
    with open(dst, 'w', newline='') as fh:
        w = csv.writer(fh, lineterminator='\n'); w.writerow(['experiment']+COLS)
        for nm, rows in load(src).items():
            r = analyse(rows); w.writerow([nm]+[fmt(r.get(c)) for c in COLS])
