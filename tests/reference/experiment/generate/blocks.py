#!/usr/bin/env python3
"""Experiments in blocks, and experiments with several readings of a specimen, by exact fractions from the typed decimals.
Least squares on the full design matrix (all groups, all blocks but the last), solved by Gauss-Jordan elimination of fractions;
the adjusted sum of squares of groups is the difference of two residual sums of squares. Tails of F in 50 digits (mpf.py).
Writes blocks_data.csv, blocks_exact.csv, blocks_fit_exact.csv, blocks_differences_exact.csv, specimens_data.csv, specimens_exact.csv."""
import csv, random
from collections import OrderedDict
from decimal import Decimal
from fractions import Fraction as Fr
from mpf import mp, mpf, log_f_tails, s17
mp.dps = 50
random.seed(20261201)

def m(fr): return mpf(fr.numerator)/mpf(fr.denominator)
def t(fr): return s17(m(fr))
def order(names): return list(OrderedDict.fromkeys(names))

def inverse(a):
    """Inverse of a matrix of fractions; None where it is singular."""
    n = len(a); a = [row[:]+[Fr(i == j) for j in range(n)] for i, row in enumerate(a)]
    for c in range(n):
        p = next((r for r in range(c, n) if a[r][c] != 0), None)
        if p is None: return None
        a[c], a[p] = a[p], a[c]
        f = a[c][c]; a[c] = [v/f for v in a[c]]
        for r in range(n):
            if r != c and a[r][c] != 0:
                f = a[r][c]; a[r] = [v-f*w for v, w in zip(a[r], a[c])]
    return [row[n:] for row in a]

def fit(x, y):
    """Coefficients, residuals, leverages and (X'X)^-1; None where X has not full rank."""
    p = len(x[0])
    inv = inverse([[sum(r[i]*r[j] for r in x) for j in range(p)] for i in range(p)])
    if inv is None: return None
    xty = [sum(r[i]*v for r, v in zip(x, y)) for i in range(p)]
    beta = [sum(inv[i][j]*xty[j] for j in range(p)) for i in range(p)]
    res = [v-sum(b*c for b, c in zip(beta, r)) for r, v in zip(x, y)]
    lev = [sum(r[i]*inv[i][j]*r[j] for i in range(p) for j in range(p)) for r in x]
    return beta, res, lev, inv

def up(f, d1, d2):
    if f == 0: return '1', '0'
    l = log_f_tails(d1, d2, m(f))[1]
    return s17(mp.exp(l)), s17(l)

def values(k, b, count, effect, block, decimals, offset=0, exponent=''):
    """Rows (group, block, text); count(i, j) values a cell."""
    g = [random.gauss(0, effect) for _ in range(k)]; s = [random.gauss(0, block) for _ in range(b)]
    rows = []
    for j in range(b):
        for i in range(k):
            for _ in range(count(i, j)):
                v = Decimal(offset)+Decimal(repr(round(g[i]+s[j]+random.gauss(0, 1), decimals))).quantize(Decimal(1).scaleb(-decimals))
                rows.append(('g%d' % i, 'b%d' % j, format(v, 'f')+exponent))
    return rows

def bibd7(i, j): return int((i-j) % 7 in (0, 1, 3))

experiments = OrderedDict()
experiments['montgomery-grafts'] = [(g, 'b%d' % j, v) for g, vs in
    [('8500', '90.3 89.2 98.2 93.9 87.4 97.9'), ('8700', '92.5 89.5 90.6 94.7 87.0 95.8'), ('8900', '85.5 90.8 89.6 86.2 88.0 93.4'), ('9100', '82.5 89.5 85.6 87.4 78.9 90.7')]
    for j, v in enumerate(vs.split())]
experiments['montgomery-catalysts'] = [(g, b, v) for g, b, v in
    [('1', '1', '73'), ('1', '2', '74'), ('1', '4', '71'), ('2', '2', '75'), ('2', '3', '67'), ('2', '4', '72'),
     ('3', '1', '73'), ('3', '2', '75'), ('3', '3', '68'), ('4', '1', '75'), ('4', '3', '72'), ('4', '4', '75')]]
experiments['complete-3x4'] = values(3, 4, lambda i, j: 1, 1, 3, 2)
experiments['complete-2x10'] = values(2, 10, lambda i, j: 1, 1, 3, 3)
experiments['complete-replicated'] = values(4, 3, lambda i, j: 2, .5, 2, 2)
experiments['bibd-7'] = values(7, 7, bibd7, 1, 5, 2)
experiments['unbalanced'] = values(5, 6, lambda i, j: random.choice((0, 1, 1, 2, 4)), 1, 2, 2)
experiments['unbalanced-sizes'] = values(4, 9, lambda i, j: 1+(i*j) % 4, .3, 2, 1)
experiments['one-missing'] = values(4, 5, lambda i, j: int((i, j) != (2, 3)), 1, 2, 2)
experiments['single-value-blocks'] = values(3, 6, lambda i, j: int(j < 4 or i == j % 3), 1, 2, 2)
experiments['chain'] = values(8, 7, lambda i, j: 2 if i in (j, j+1) else 0, 1, 1, 2)
experiments['one-block'] = values(4, 1, lambda i, j: 3+i, 1, 0, 2)
experiments['offset-1e12'] = values(4, 5, lambda i, j: 1, 1, 2, 3, 10**12)
experiments['at-1e-300'] = values(3, 4, lambda i, j: 1+(i == j), 1, 2, 2, 0, 'e-300')
experiments['at-1e300'] = values(3, 4, lambda i, j: 1+(i == j), 1, 2, 2, 0, 'e300')
experiments['blocks-1e300-apart'] = [(g, b, str(int(Decimal(v)*100)+[0, 10**302, -3*10**302, 7*10**290][int(b[1:])])) for g, b, v in values(3, 4, lambda i, j: 1+(i == j), 1, 2, 2)]
experiments['groups-1e40-apart'] = [(g, b, str(int(Decimal(v)*100)+[0, 10**40, -3*10**41][int(g[1:])])) for g, b, v in values(3, 4, lambda i, j: 1+(i == j), 1, 2, 2)]
experiments['integers-of-64-bits'] = [(g, b, str((1 if (i*7) % 5 else -1)*(2**63-1-i))) for i, (g, b, v) in enumerate(values(3, 4, lambda i, j: 1, 1, 2, 2))]
experiments['tiny-residual'] = [('g%d' % i, 'b%d' % j, str(10**15*i+3*10**14*j+int((i, j) == (1, 2)))) for i in range(3) for j in range(5)]
experiments['two-lots-of-one'] = [('a', '1', '1'), ('b', '1', '2'), ('a', '2', '4'), ('b', '2', '6')]
experiments['equal-within-blocks-on-average'] = [('a', '1', '1'), ('b', '1', '3'), ('a', '2', '7'), ('b', '2', '5'), ('a', '3', '4'), ('b', '3', '4')]
experiments['additive-exactly'] = [('g%d' % i, 'b%d' % j, '%d' % (3*i*i+10**18*j)) for i in range(3) for j in range(4)]
experiments['additive-exactly-far'] = [('g%d' % i, 'b%d' % j, '%d' % (3*i*i*10**90+10**200*j)) for i in range(3) for j in range(4)]
experiments['constant-in-blocks'] = [('g%d' % i, 'b%d' % j, str(5+j)) for i in range(3) for j in range(4)]
experiments['all-constant'] = [('g%d' % i, 'b%d' % j, '5') for i in range(3) for j in range(4)]
experiments['no-residual'] = [('a', '1', '1'), ('b', '1', '2'), ('b', '2', '4'), ('c', '2', '7')]
experiments['disconnected'] = [(g, b, str(i)) for i, (g, b) in enumerate([(g, b) for b in '12' for g in 'ab']+[(g, b) for b in '34' for g in 'cd'])]
experiments['group-alone-in-its-block'] = [(g, b, str(i*i)) for i, (g, b) in enumerate([(g, b) for b in '123' for g in 'ab']+[('c', '4'), ('c', '4')])]
experiments['one-group'] = [('a', '1', '1'), ('a', '1', '3'), ('a', '2', '2')]

with open('blocks_data.csv', 'w', newline='\n') as fd, open('blocks_exact.csv', 'w', newline='\n') as fe, \
     open('blocks_fit_exact.csv', 'w', newline='\n') as ff, open('blocks_differences_exact.csv', 'w', newline='\n') as fg:
    fd.write('experiment,group,block,value\n')
    fe.write('experiment,status,k,b,n,df1,df2,ss_blocks,ss_groups,ss_residual,ss_total,f,p,log_p,partial_eta2,partial_omega2,residual_sd\n')
    ff.write('experiment,row,residual,leverage\n')
    fg.write('experiment,group,difference_to_first,variance_factor\n')
    for name, rows in experiments.items():
        for r in rows: fd.write(','.join((name,)+r)+'\n')
        groups = order(r[0] for r in rows); blocks = order(r[1] for r in rows); y = [Fr(Decimal(r[2])) for r in rows]
        k, b, n = len(groups), len(blocks), len(rows); df1, df2 = k-1, n-k-b+1
        x = [[Fr(r[0] == g) for g in groups]+[Fr(r[1] == q) for q in blocks[:-1]] for r in rows]
        out = fit(x, y)
        block_mean = {q: Fr(sum(v for v, r in zip(y, rows) if r[1] == q))/sum(r[1] == q for r in rows) for q in blocks}
        grand = sum(y)/n
        rss0 = sum((v-block_mean[r[1]])**2 for v, r in zip(y, rows)); ssb = sum((block_mean[r[1]]-grand)**2 for r in rows)
        status = 'too-few-groups' if k < 2 else 'disconnected' if out is None else 'no-replication' if df2 < 1 else 'ok'
        line = [name, status, k, b, n]
        if status == 'ok':
            beta, res, lev, inv = out
            sse = sum(e*e for e in res); ssg = rss0-sse; mse = sse/df2
            if sse == 0: line[1] = 'constant-response' if ssg == 0 else 'zero-residual'
            else:
                f = ssg/df1/mse; p, lp = up(f, df1, df2)
                line += [df1, df2, t(ssb), t(ssg), t(sse), t(ssb+ssg+sse), t(f), p, lp, t(ssg/(ssg+sse)), t((ssg-df1*mse)/(ssg+(n-df1)*mse)), s17(mp.sqrt(m(mse)))]
            for i, (e, h) in enumerate(zip(res, lev)): ff.write('%s,%d,%s,%s\n' % (name, i, t(e), t(h)))
            for i in range(1, k): fg.write('%s,%s,%s,%s\n' % (name, groups[i], t(beta[i]-beta[0]), t(inv[i][i]+inv[0][0]-2*inv[i][0])))
        line += ['']*(17-len(line))
        fe.write(','.join(map(str, line))+'\n')

def nested(groups, specimens, readings, sd_specimen, decimals, offset=0, exponent=''):
    rows = []; s = 0
    for i in range(groups):
        mean = random.gauss(0, 1)
        for j in range(specimens(i)):
            s += 1; own = random.gauss(0, sd_specimen)
            for _ in range(readings(i, j)):
                v = Decimal(offset)+Decimal(repr(round(mean+own+random.gauss(0, 1), decimals))).quantize(Decimal(1).scaleb(-decimals))
                rows.append(('g%d' % i, 's%d' % s, format(v, 'f')+exponent))
    random.shuffle(rows)
    return rows

sets = OrderedDict()
sets['balanced'] = nested(3, lambda i: 4, lambda i, j: 3, 2, 2)
sets['unequal-readings'] = nested(4, lambda i: 3+i, lambda i, j: random.randint(1, 5), 1, 2)
sets['no-spread-of-specimens'] = nested(3, lambda i: 5, lambda i, j: 4, 0, 2)
sets['offset-1e12'] = nested(3, lambda i: 4, lambda i, j: random.randint(1, 3), 1, 3, 10**12)
sets['at-1e-300'] = nested(3, lambda i: 4, lambda i, j: 2, 1, 2, 0, 'e-300')
sets['wide'] = [(g, s, str(int(Decimal(v)*100)+10**(30*(int(g[1:])+1)))) for g, s, v in nested(3, lambda i: 4, lambda i, j: random.randint(1, 4), 1, 2)]
sets['many-counts'] = nested(2, lambda i: 12, lambda i, j: 1+j, 1, 2)
with open('specimens_data.csv', 'w', newline='\n') as fd, open('specimens_exact.csv', 'w', newline='\n') as fe:
    fd.write('experiment,group,specimen,value\n')
    fe.write('experiment,specimens,n,fewest,most,df_between,df_within,ss_between,ss_within,n0,raw_component,f_of_means,df1,df2,p,log_p\n')
    for name, rows in sets.items():
        for r in rows: fd.write(','.join((name,)+r)+'\n')
        y = [Fr(Decimal(r[2])) for r in rows]; groups = order(r[0] for r in rows); specimens = order(r[1] for r in rows)
        of = {r[1]: r[0] for r in rows}; n = len(rows); k = len(groups); b = len(specimens)
        count = {s: sum(r[1] == s for r in rows) for s in specimens}; size = {g: sum(r[0] == g for r in rows) for g in groups}
        mean = {s: sum(v for v, r in zip(y, rows) if r[1] == s)/count[s] for s in specimens}
        gmean = {g: sum(v for v, r in zip(y, rows) if r[0] == g)/size[g] for g in groups}
        ssw = sum((v-mean[r[1]])**2 for v, r in zip(y, rows)); ssb = sum((mean[r[1]]-gmean[r[0]])**2 for r in rows)
        n0 = (n-sum(Fr(sum(count[s]**2 for s in specimens if of[s] == g), size[g]) for g in groups))/(b-k)
        comp = (ssb/(b-k)-ssw/(n-b))/n0
        by = {g: [mean[s] for s in specimens if of[s] == g] for g in groups}
        u = {g: sum(v)/len(v) for g, v in by.items()}; gm = sum(mean.values())/b
        f = sum(len(by[g])*(u[g]-gm)**2 for g in groups)/(k-1)/(sum((v-u[g])**2 for g in groups for v in by[g])/(b-k)); p, lp = up(f, k-1, b-k)
        fe.write(','.join(map(str, [name, b, n, min(count.values()), max(count.values()), b-k, n-b, t(ssb), t(ssw), t(n0), t(comp), t(f), k-1, b-k, p, lp]))+'\n')
