#!/usr/bin/env python3
"""Gear dimensions and measures with 50 digits: the outside check of the claim that
every dimension of package involute is right to 1e-9 mm for m_n 0.1 to 50 and z 4 to 1000.

    python3 forty.py          writes gears.csv, meshes.csv and inverse.csv beside itself
    python3 forty.py --check  computes them again and exits with 1 where a file differs

Needs Python 3 and mpmath, nothing else, and shares no code with the Go program. Formulas are
ISO 21771's and are written with its symbols; most quantities are computed a second way (vectors,
nearest points, envelopes), and the script stops where the two ways differ by more than 1e-30.
Before anything is written it must also land on a list of numbers known from elsewhere.

Units: mm; columns *_deg in degrees; alpha, inv_alpha, y, alpha_of_y in radians; coefficients
haP, hfP, rhofP, x in normal modules. Input columns hold the shortest decimals of float64 values,
and the float64 is what is computed with. Results have 25 significant digits (inverse.csv: 30).
An empty field: the quantity does not exist for this gear.

gears.csv (external gears)
  inputs    m_n z alpha_n_deg beta_deg x haP hfP rhofP thin (total normal thinning on the reference
            cylinder), further k (teeth spanned) and D (pin or ball diameter)
  circles   d d_b; d_a = d + 2 m_n (haP + x); d_f nominal root; d_f_thinned root with the rack fed
            deeper, x_E = x - thin/(2 m_n tan alpha_n); d_Ff nominal form diameter (undercut: where
            fillet and involute cross); undercut 0/1 (nominal); d_Ff_thinned with x_E
  tooth     s_n s_t (thinned, reference cylinder); s_an normal arc at the tip cylinder (nominal);
            p_bt alpha_t_deg beta_b_deg
  span      k W_k (thinned) W_contact_d
  pins      D d_K M (two, in one transverse plane) pin_contact_d; M_opposed (odd helical: rollers
            exactly opposite, d_K + D); M_three (odd spur: two neighbors against one); M_axis (one
            pin to the axis); M_free and M_free_offset (odd helical: straight pins free to slide in
            the nearest opposite spaces, least distance between parallel anvils, and its axial
            offset, counted away from the opposed position); all thinned
  chords    s_c h_c on a circle of z/cos^3 beta teeth; s_cc h_cc constant chord; heights from d_a;
            thinned

meshes.csv (external pairs, parallel axes; suffix 1 and 2 for the gears)
  inputs    m_n alpha_n_deg beta_deg; z x haP hfP rhofP thin of both; a center distance; b face width
  results   a_tight (nominal teeth without backlash) alpha_wt_deg d_w1 d_w2; eps_alpha_tips (tip
            circles alone) eps_alpha (ended by the nominal form circles too) eps_beta; j_wt j_bt j_bn
            (thinned teeth at a) j_r (a minus the tight center of the thinned teeth); c1 = gear 1's
            tip to gear 2's root, c2 the other; zeta_A1 zeta_A2 zeta_E1 zeta_E2 specific sliding at
            the ends of the active contact (A: gear 1's root, E: gear 1's tip); d_Nf1 d_Nf2 start of
            active profile

inverse.csv
  alpha -> inv_alpha = tan alpha - alpha;  y (input, a float64 near inv_alpha) -> alpha_of_y
"""
import math
import sys
from pathlib import Path

from mpmath import fp, mp, mpf

mp.dps = 50
HERE = Path(__file__).resolve().parent
AGREE = mpf("1e-30")  # two routes with 50 digits each may not differ by more
MAX_GEARS, MAX_MESHES = 240, 72


# ---------------------------------------------------------------- tools

def agree(a, b, what):
    """Two independent routes must give one number."""
    if not abs(a - b) < AGREE * max(1, abs(a)):
        sys.exit(f"{what}: {mp.nstr(a, 40)} and {mp.nstr(b, 40)} differ by {mp.nstr(a - b, 5)}")


def land(value, known, what):
    """A value must round to a number known from elsewhere (given as text)."""
    places = len(known.split(".")[1]) if "." in known else 0
    if not abs(value - mpf(known)) <= mpf("0.51") * mpf(10) ** -places:
        sys.exit(f"{what}: {mp.nstr(value, 15)}, known is {known}")


def root(f, a, b):
    """Ridders' method: the zero of f between a and b, where f changes sign."""
    fa, fb, last = f(a), f(b), None
    if fa * fb > 0:
        raise ValueError("no change of sign")
    for _ in range(400):
        if fa == 0 or fb == 0:
            return a if fa == 0 else b
        c = (a + b) / 2
        fc = f(c)
        if fc == 0:
            return c
        x = c + (c - a) * mp.sign(fa - fb) * fc / mp.sqrt(fc * fc - fa * fb)
        fx = f(x)
        if fx == 0 or last is not None and abs(x - last) < mpf("1e-47") * max(1, abs(x)):
            return x
        last = x
        if fc * fx < 0:
            a, fa, b, fb = c, fc, x, fx
        elif fa * fx < 0:
            b, fb = x, fx
        else:
            a, fa = x, fx
    raise ValueError("no convergence")


def inv(a, ctx=mp):
    """inv a = tan a - a, with digits to spare for small angles."""
    if ctx is fp:
        return fp.tan(a) - a
    with mp.extradps(40):
        y = mp.tan(a) - a
    return +y


def arcinv(y):
    """The angle whose involute is y > 0: with v = tan a, v - atan v = y by Newton from above."""
    with mp.extradps(40):
        v = y + min(mp.cbrt(3 * y), mp.pi / 2)
        for _ in range(200):
            step = (v - mp.atan(v) - y) * (1 + v * v) / (v * v)
            v -= step
            if abs(step) < mpf(10) ** -70 * v:
                return +mp.atan(v)
    raise ValueError("no convergence")


def text(v, digits=25):
    """A result for the table."""
    if v is None:
        return ""
    return str(v) if isinstance(v, int) else mp.nstr(v, digits)


def short(v):
    """An input for the table: the shortest decimal of the float64."""
    return repr(v)[:-2] if repr(v).endswith(".0") else repr(v)


class Dice:
    """A small congruential generator, so that the spread is the same everywhere."""

    def __init__(self, state):
        self.state = state

    def next(self):
        self.state = (self.state * 6364136223846793005 + 1442695040888963407) % 2**64
        return (self.state >> 33) / 2**31

    def pick(self, items):
        return items[int(self.next() * len(items))]

    def between(self, lo, hi):
        return lo + (hi - lo) * self.next()


# ---------------------------------------------------------------- the generated tooth space

class Space:
    """The tooth space a rack cuts, in the transverse plane, its middle on the +x axis.

    Works in 50 digits (ctx mp) and, for choosing gears, in floats (ctx fp)."""

    def __init__(self, ctx, m, z, alpha_n, beta, x, hfP, rhofP):
        self.ctx, self.m, self.z, self.alpha_n, self.beta = ctx, m, z, alpha_n, beta
        self.cosb = ctx.cos(beta)
        self.alpha_t = ctx.atan(ctx.tan(alpha_n) / self.cosb)
        self.r = z * m / self.cosb / 2
        self.r_b = self.r * ctx.cos(self.alpha_t)
        self.r_f = self.r - m * (hfP - x)
        self.s_n = m * (ctx.pi / 2 + 2 * x * ctx.tan(alpha_n))
        self.s_t = self.s_n / self.cosb
        # half angle of the space at the base circle; at radius R it is sigma + inv alpha_R
        self.sigma = ctx.pi / z - self.s_t / (2 * self.r) - inv(self.alpha_t, ctx)
        # the rack's tip circle in its normal section: center (X_c, Y_c) from the space's middle and
        # the rolling line; the transverse section stretches it by 1/cos beta along the rolling line
        self.rho = rhofP * m
        self.Y_c = -(hfP - x) * m + self.rho
        self.X_c = (ctx.pi * m / 4 + (self.Y_c - self.rho * ctx.sin(alpha_n) - x * m) * ctx.tan(alpha_n)
                    - self.rho * ctx.cos(alpha_n))
        # the rack's straight flank ends h m_n below the rolling line; negative lever: undercut
        self.h = (hfP - rhofP * (1 - ctx.sin(alpha_n)) - x) * m
        self.lever = self.r * ctx.sin(self.alpha_t) - self.h / ctx.sin(self.alpha_t)

    def fillet(self, theta):
        """The point (radius, polar angle) the rack's tip ellipse envelops: theta from -pi/2 (root)
        to -alpha_n (end of the rack's flank). The normal of rack and tooth passes the pitch point."""
        ctx = self.ctx
        X = (self.X_c + self.rho * ctx.cos(theta)) / self.cosb
        Y = self.Y_c + self.rho * ctx.sin(theta)
        along = Y * self.cosb * ctx.cos(theta) / ctx.sin(theta)
        roll = (along - X) / self.r
        return ctx.sqrt((self.r + Y) ** 2 + along**2), ctx.atan2(along, self.r + Y) - roll

    def flank_angle(self, R):
        """Half angle of the space between involutes at radius R (from the base circle up)."""
        return self.sigma + inv(self.ctx.acos(min(self.r_b / R, self.ctx.mpf(1))), self.ctx)

    def flank(self, t, shift=0):
        """The point of the space's involute at roll angle t, turned by shift."""
        p = self.sigma + shift + t
        return self.r_b * (mp.cos(p) + t * mp.sin(p)), self.r_b * (mp.sin(p) - t * mp.cos(p))

    def form_radius(self):
        """r_Ff. Not undercut: r_Ff^2 = r_b^2 + (r sin alpha_t - h m_n/sin alpha_t)^2."""
        end = -self.alpha_n
        if self.lever >= 0:
            r_Ff = mp.sqrt(self.r_b**2 + self.lever**2)
            R, psi = self.fillet(end)
            agree(R, r_Ff, "form radius against the end of the fillet")
            agree(psi, self.flank_angle(R), "fillet meets involute")
            return r_Ff
        bottom = -mp.pi / 2
        at_base = root(lambda th: self.fillet(th)[0] - self.r_b, bottom, end)
        gap = lambda th: (lambda p: p[1] - self.flank_angle(p[0]))(self.fillet(th))
        theta = root(gap, at_base, end)
        r_Ff = self.fillet(theta)[0]
        # second route: crossing of the two curves as points, from a rough start
        def apart(th, t):
            R, psi = self.fillet(th)
            x, y = self.flank(t)
            return R * mp.cos(psi) - x, R * mp.sin(psi) - y
        t = mp.sqrt((r_Ff / self.r_b) ** 2 - 1)
        th2, t2 = mp.findroot(apart, (theta * (1 + mpf("1e-9")), t * (1 + mpf("1e-9"))), tol=mpf("1e-70"))
        agree(self.r_b * mp.sqrt(1 + t2**2), r_Ff, "undercut form radius")
        # and the tip ellipse, rolled past that point, touches it and never covers it
        x, y = self.flank(t2)
        def outside(roll):
            X = x * mp.sin(roll) + y * mp.cos(roll) - self.r * roll
            Y = x * mp.cos(roll) - y * mp.sin(roll) - self.r
            return (X * self.cosb - self.X_c) ** 2 + (Y - self.Y_c) ** 2 - self.rho**2
        def slope(roll):
            X = x * mp.sin(roll) + y * mp.cos(roll) - self.r * roll
            Y = x * mp.cos(roll) - y * mp.sin(roll) - self.r
            return ((X * self.cosb - self.X_c) * Y * self.cosb
                    - (Y - self.Y_c) * (X + self.r * roll))
        X = (self.X_c + self.rho * mp.cos(theta)) / self.cosb
        Y = self.Y_c + self.rho * mp.sin(theta)
        roll = (Y * self.cosb * mp.cos(theta) / mp.sin(theta) - X) / self.r
        if self.rho > 0:
            roll = mp.findroot(slope, roll * (1 + mpf("1e-9")), tol=mpf("1e-80"))
        agree(outside(roll) + 1, mpf(1), "rack tip touches the form point")
        for side in ("-0.01", "0.01", "-0.2", "0.2"):
            if not outside(roll + mpf(side)) > 0:
                sys.exit("the rack's tip covers the form point")
        return r_Ff

    def tooth_possible(self, r_a):
        """In floats: a root, an involute and a tip land exist, and undercut leaves a neck."""
        tip = fp.pi / self.z - self.flank_angle(r_a) if r_a > self.r_b else -1
        if self.r_f < 0.05 * self.r or self.X_c < 0 or tip * 2 * r_a < 0.02 * self.m:
            return False
        if self.lever >= 0:
            return fp.sqrt(self.r_b**2 + self.lever**2) < r_a - 0.1 * self.m
        crossings, before, r_Ff = 0, None, None
        for i in range(201):
            R, psi = self.fillet(-fp.pi / 2 + i / 200 * (fp.pi / 2 - self.alpha_n))
            if psi > 0.9 * fp.pi / self.z:
                return False
            if R < self.r_b:
                continue
            sign = psi > self.flank_angle(R)
            if before and not sign:
                crossings, r_Ff = crossings + 1, R
            elif before is not None and sign != before:
                return False
            before = sign
        # within a sample of the base circle the crossing may hide; it exists all the same
        return before is False and crossings <= 1 and (r_Ff or self.r_b) < r_a - 0.1 * self.m


# ---------------------------------------------------------------- one gear

class Gear:
    """An external gear with thinned teeth. Arguments are floats (exact), angles in degrees."""

    def __init__(self, m_n, z, alpha_n_deg, beta_deg, x, haP, hfP, rhofP, thin, d_a=None):
        self.inputs = (float(m_n), z, float(alpha_n_deg), float(beta_deg), float(x),
                       float(haP), float(hfP), float(rhofP), float(thin))
        m, _, alpha_deg, beta_d, x, haP, hfP, rhofP, thin = map(mpf, self.inputs)
        alpha_n, beta = alpha_deg * mp.pi / 180, beta_d * mp.pi / 180
        self.m, self.z, self.x, self.alpha_n, self.beta, self.thin = m, z, x, alpha_n, beta, thin
        self.x_E = x - thin / (2 * m * mp.tan(alpha_n))
        self.full = Space(mp, m, z, alpha_n, beta, x, hfP, rhofP)
        self.cut = Space(mp, m, z, alpha_n, beta, self.x_E, hfP, rhofP)
        self.alpha_t, self.d, self.d_b = self.full.alpha_t, 2 * self.full.r, 2 * self.full.r_b
        self.d_a = self.d + 2 * m * (haP + x) if d_a is None else mpf(d_a)
        self.d_f, self.d_f_thinned = 2 * self.full.r_f, 2 * self.cut.r_f
        self.beta_b = mp.asin(mp.sin(beta) * mp.cos(alpha_n))
        agree(mp.tan(self.beta_b), mp.tan(beta) * mp.cos(self.alpha_t), "base helix angle")
        self.p_bt = mp.pi * self.d_b / z
        self.s_n, self.s_t = self.full.s_n - thin, (self.full.s_n - thin) / mp.cos(beta)
        agree(self.s_n, self.cut.s_n, "thinning by x_E")
        self.s_bt = self.d_b * (self.s_t / self.d + inv(self.alpha_t))  # base thickness, thinned

    def form_diameters(self):
        """d_Ff of the nominal and of the thinned tooth."""
        d_Ff = 2 * self.full.form_radius()
        return d_Ff, d_Ff if self.thin == 0 else 2 * self.cut.form_radius()

    def tip_thickness(self):
        """s_an = s_at cos beta_a, s_at = d_a (s_t/d + inv alpha_t - inv alpha_at), nominal."""
        s_at = self.d_a * (self.full.s_t / self.d + inv(self.alpha_t) - inv(mp.acos(self.d_b / self.d_a)))
        t = mp.sqrt((self.d_a / self.d_b) ** 2 - 1)
        x, y = self.full.flank(t)
        agree(s_at, self.d_a * (mp.pi / self.z - mp.atan2(y, x)), "tip thickness")
        return s_at * mp.cos(mp.atan(self.d_a / self.d * mp.tan(self.beta)))

    def span_teeth(self):
        """A number of teeth that touches near d + 2 x m_n."""
        d_y = max(self.d + 2 * self.x * self.m, self.d_b * mpf("1.001"))
        wide = (mp.sqrt(d_y**2 - self.d_b**2) - self.s_bt) / self.p_bt
        return max(1, min(self.z // 2, 1 + int(mp.nint(wide))))

    def span(self, k):
        """W_k = m_n cos alpha_n ((k - 1/2) pi + z inv alpha_t) + 2 x_E m_n sin alpha_n, d_W."""
        W = (self.m * mp.cos(self.alpha_n) * ((k - mpf(1) / 2) * mp.pi + self.z * inv(self.alpha_t))
             + 2 * self.x_E * self.m * mp.sin(self.alpha_n))
        agree(W, ((k - 1) * self.p_bt + self.s_bt) * mp.cos(self.beta_b), "span by base thickness")
        d_W = mp.sqrt(self.d_b**2 + (W * mp.cos(self.beta_b)) ** 2)
        # third route, in space: outermost flanks of k teeth, contact at heights +-h, each flank
        # turned by h tan beta/r there; the line between the contacts is normal to the helicoid
        turn, h = 2 * mp.tan(self.beta) / self.d, -W * mp.sin(self.beta_b) / 2
        middle = k * mp.pi / self.z  # middle of the k teeth, seen from the space below them
        t = middle - self.cut.sigma + turn * h
        x, y = self.cut.flank(t, -middle - turn * h)  # mirrored: lower flank
        agree(4 * (y * y + h * h), W * W, "span in space")
        agree(2 * mp.hypot(x, y), d_W, "span contact in space")
        # derivatives along roll and height are both across the connecting line (0, y, h)
        p = self.cut.sigma - middle - turn * h + t
        along_t = self.d_b / 2 * t * mp.sin(p)
        along_h = x * turn  # a point turning with height moves by (-y, x) turn, and by 1 in height
        agree(along_t * y, mpf(0), "span normal to the flank")
        agree(along_h * -y + h, mpf(0), "span normal to the helix")
        return W, d_W

    def pin(self, D):
        """d_K and the pin's contact diameter; None where the pin touches no involute.

        inv alpha_Kt = s_t/d + inv alpha_t + D/(z m_n cos alpha_n) - pi/z; d_K = d_b/cos alpha_Kt;
        tan alpha_c = tan alpha_Kt - D cos beta_b/d_b."""
        D = mpf(D)
        y = (self.s_t / self.d + inv(self.alpha_t) - mp.pi / self.z
             + D / (self.z * self.m * mp.cos(self.alpha_n)))
        if y <= 0:
            return None
        alpha_Kt = arcinv(y)
        tan_c = mp.tan(alpha_Kt) - D * mp.cos(self.beta_b) / self.d_b
        if tan_c <= 0:
            return None
        d_K, contact = self.d_b / mp.cos(alpha_Kt), self.d_b * mp.sqrt(1 + tan_c**2)
        self.check_ball(D, d_K, contact, tan_c)
        return d_K, contact, alpha_Kt

    def check_ball(self, D, d_K, contact, tan_c):
        """Second route: the point of the helicoid nearest to the ball's center is D/2 away."""
        turn = 2 * mp.tan(self.beta) / self.d
        def across(t, h):
            x, y = self.cut.flank(t, turn * h)
            p = self.cut.sigma + turn * h + t
            dx, dy = d_K / 2 - x, -y
            return mp.cos(p) * dx + mp.sin(p) * dy, (-y * dx + x * dy) * turn - h
        start = (tan_c * (1 + mpf("1e-8")),
                 -D / 2 * mp.sin(self.beta_b) * (1 + mpf("1e-8")))
        t, h = mp.findroot(across, start, tol=mpf("1e-75"))
        x, y = self.cut.flank(t, turn * h)
        agree(mp.sqrt((d_K / 2 - x) ** 2 + y**2 + h**2), D / 2, "ball touches the flank")
        agree(2 * mp.hypot(x, y), contact, "ball contact diameter")

    def over_pins(self, D, d_K):
        """M in one plane, M_opposed, M_three, M_axis, M_free and its offset."""
        D, odd, helical = mpf(D), self.z % 2 == 1, self.beta > 0
        M = d_K * mp.cos(mp.pi / (2 * self.z)) + D if odd else d_K + D
        opposite = (self.z // 2) * 2 * mp.pi / self.z
        agree(M, abs(d_K / 2 * (mp.expj(opposite) - 1)) + D, "over pins by points")
        opposed = d_K + D if odd and helical else None
        three = d_K * (1 + mp.cos(mp.pi / self.z)) / 2 + D if odd and not helical else None
        if three is not None:
            agree(three, d_K / 2 - (d_K / 2 * mp.expj(opposite)).real + D, "three pins by points")
        free, offset = self.free_pins(d_K, D) if odd and helical else (None, None)
        return M, opposed, three, (d_K + D) / 2, free, offset

    def free_pins(self, d_K, D):
        """Straight pins in the nearest opposite spaces, offset by b along the axis: centers are
        sqrt(d_K^2 cos^2 psi + b^2) apart, psi = pi/(2 z) + b tan beta/d; the least over b."""
        c, psi_0 = mp.tan(self.beta) / self.d, mp.pi / (2 * self.z)
        b = root(lambda b: b - d_K**2 * c * mp.sin(2 * (psi_0 + b * c)) / 2, mpf(0), (mp.pi / 2 - psi_0) / c)
        apart = lambda b: mp.sqrt((d_K * mp.cos(psi_0 + b * c)) ** 2 + b * b)
        for step in ("0.01", "-0.01"):
            if not apart(b * (1 + mpf(step))) > apart(b):
                sys.exit("not the least distance over free pins")
        # second parameter: the turn psi itself; and the distance of the two skew pin axes there
        T = (d_K * c) ** 2
        psi = root(lambda p: T * mp.sin(2 * p) - 2 * (p - psi_0), psi_0, mp.pi / 2)
        agree((psi - psi_0) / c, b, "free pins, offset")
        r_K, lift = d_K / 2, 2 * c * d_K / 2
        u = (-lift * mp.sin(psi), lift * mp.cos(psi), 1)  # axis of one pin, tangent to its helix
        v = (-lift * mp.sin(psi), -lift * mp.cos(psi), 1)  # and of the other, at angle pi - psi
        n = (u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0])
        skew = abs(2 * r_K * mp.cos(psi) * n[0] + b * n[2]) / mp.sqrt(sum(k * k for k in n))
        agree(skew, apart(b), "free pins as skew lines")
        return apart(b) + D, b

    def chords(self):
        """s_c, h_c with z_v = z/cos^3 beta; s_cc = s_n cos^2 alpha_n and its height."""
        h_a, d_v = (self.d_a - self.d) / 2, self.m * self.z / mp.cos(self.beta) ** 3
        half = self.s_n / d_v
        s_c, h_c = d_v * mp.sin(half), h_a + d_v / 2 * (1 - mp.cos(half))
        s_cc = self.s_n * mp.cos(self.alpha_n) ** 2
        h_cc = h_a - self.s_n * mp.sin(self.alpha_n) * mp.cos(self.alpha_n) / 2
        if self.beta == 0:  # the chord's ends lie on the involutes
            for chord, height in ((s_c, h_c), (s_cc, h_cc)):
                y = self.d_a / 2 - height
                R = mp.hypot(chord / 2, y)
                if R > self.d_b / 2:
                    agree(mp.atan2(chord / 2, y), mp.pi / self.z - self.cut.flank_angle(R), "chord on the flank")
        return s_c, h_c, s_cc, h_cc


GEAR_COLUMNS = """m_n z alpha_n_deg beta_deg x haP hfP rhofP thin d d_b d_a d_f d_f_thinned d_Ff undercut
d_Ff_thinned s_n s_t s_an p_bt alpha_t_deg beta_b_deg k W_k W_contact_d D d_K M pin_contact_d M_opposed
M_three M_axis M_free M_free_offset s_c h_c s_cc h_cc""".split()


def gear_row(g, D, k=None):
    """One line of gears.csv, or None where the pin finds no involute."""
    pin = g.pin(D)
    if pin is None:
        return None
    d_K, contact, _ = pin
    M, opposed, three, axis, free, offset = g.over_pins(D, d_K)
    k = k or g.span_teeth()
    d_Ff, d_Ff_thinned = g.form_diameters()
    degrees = lambda a: a * 180 / mp.pi
    values = [g.d, g.d_b, g.d_a, g.d_f, g.d_f_thinned, d_Ff, int(g.full.lever < 0), d_Ff_thinned, g.s_n, g.s_t,
              g.tip_thickness(), g.p_bt, degrees(g.alpha_t), degrees(g.beta_b), k, *g.span(k), D, d_K, M, contact,
              opposed, three, axis, free, offset, *g.chords()]
    return dict(zip(GEAR_COLUMNS, [*g.inputs, *values]))


# ---------------------------------------------------------------- a pair

MESH_COLUMNS = """m_n alpha_n_deg beta_deg z1 x1 haP1 hfP1 rhofP1 thin1 z2 x2 haP2 hfP2 rhofP2 thin2 a b
a_tight alpha_wt_deg d_w1 d_w2 eps_alpha_tips eps_alpha eps_beta j_wt j_bt j_bn j_r c1 c2
zeta_A1 zeta_A2 zeta_E1 zeta_E2 d_Nf1 d_Nf2""".split()


def backlash_by_thickness(g1, g2, a, s_t1, s_t2):
    """j_wt = p_wt - s_wt1 - s_wt2 on the working circles at center distance a."""
    alpha_wt = mp.acos((g1.d_b + g2.d_b) / (2 * a))
    d_w1, d_w2 = (2 * a * g.z / (g1.z + g2.z) for g in (g1, g2))
    s_w = lambda g, d_w, s_t: d_w * (s_t / g.d + inv(g.alpha_t) - inv(alpha_wt))
    return mp.pi * d_w1 / g1.z - s_w(g1, d_w1, s_t1) - s_w(g2, d_w2, s_t2)


def tight_center(g1, g2, thinned):
    """inv alpha_wt = inv alpha_t + (2 tan alpha_n (x_1 + x_2) - (t_1 + t_2)/m_n)/(z_1 + z_2)."""
    t = (g1.thin + g2.thin) / g1.m if thinned else 0
    alpha_wt = arcinv(inv(g1.alpha_t) + (2 * mp.tan(g1.alpha_n) * (g1.x + g2.x) - t) / (g1.z + g2.z))
    a = (g1.d_b + g2.d_b) / (2 * mp.cos(alpha_wt))
    s1, s2 = (g1.s_t, g2.s_t) if thinned else (g1.full.s_t, g2.full.s_t)
    low = max(a * mpf("0.999"), (g1.d_b + g2.d_b) / 2)
    agree(a, root(lambda c: backlash_by_thickness(g1, g2, c, s1, s2), low, a * mpf("1.001")), "tight center")
    return a, alpha_wt


def sliding_by_velocity(a, alpha_wt, r_w1, u, rho_1, r_b1):
    """zeta_1, zeta_2 from the velocities of both flanks at the contact point, omega_1 = 1."""
    line, tangent = mp.mpc(mp.sin(alpha_wt), mp.cos(alpha_wt)), mp.mpc(mp.cos(alpha_wt), -mp.sin(alpha_wt))
    q = r_w1 + (rho_1 - r_b1 * mp.tan(alpha_wt)) * line
    v1, v2 = 1j * q, -1j / u * (q - a)
    along = lambda v, e: (v * mp.conj(e)).real
    agree(along(v1, line), along(v2, line), "flanks keep contact")
    w1, w2 = along(v1, tangent), along(v2, tangent)
    return (w1 - w2) / w1, (w2 - w1) / w2


def mesh_row(g1, g2, a, b):
    """One line of meshes.csv."""
    a_in, a, b_in, b = a, mpf(a), b, mpf(b)
    db, z = g1.d_b + g2.d_b, g1.z + g2.z
    a_tight, alpha_w0 = tight_center(g1, g2, False)
    a_thin, _ = tight_center(g1, g2, True)
    alpha_wt = mp.acos(db / (2 * a))
    d_w1, d_w2, u = 2 * a * g1.z / z, 2 * a * g2.z / z, mpf(g2.z) / g1.z
    agree(d_w1, g1.d_b / mp.cos(alpha_wt), "working circle")
    # j_bt = (d_b1 + d_b2)(inv alpha_wt - inv alpha_wt0) + (t_1 + t_2) cos alpha_t/cos beta
    j_bt = db * (inv(alpha_wt) - inv(alpha_w0)) + (g1.thin + g2.thin) * mp.cos(g1.alpha_t) / mp.cos(g1.beta)
    j_wt = j_bt / mp.cos(alpha_wt)
    agree(j_wt, backlash_by_thickness(g1, g2, a, g1.s_t, g2.s_t), "backlash")
    # ends of contact on the line of action, from gear 1's base tangent point
    T = a * mp.sin(alpha_wt)
    lever = lambda d_y, d_b: mp.sqrt(d_y**2 - d_b**2) / 2
    d_Ff1, d_Ff2 = 2 * g1.full.form_radius(), 2 * g2.full.form_radius()
    tips = (lever(g1.d_a, g1.d_b) + lever(g2.d_a, g2.d_b) - T) / g1.p_bt
    rho_A1 = max(T - lever(g2.d_a, g2.d_b), lever(d_Ff1, g1.d_b))
    rho_E1 = min(lever(g1.d_a, g1.d_b), T - lever(d_Ff2, g2.d_b))
    eps = (rho_E1 - rho_A1) / g1.p_bt
    zeta = lambda r1: (1 - (T - r1) / (u * r1), 1 - u * r1 / (T - r1))
    for rho in (rho_A1, rho_E1):
        for f, v in zip(zeta(rho), sliding_by_velocity(a, alpha_wt, d_w1 / 2, u, rho, g1.d_b / 2)):
            agree(f, v, "specific sliding")
    start = lambda g, rho: mp.sqrt(g.d_b**2 + 4 * rho**2)
    d_Nf1, d_Nf2 = start(g1, rho_A1), start(g2, T - rho_E1)
    turned = (mp.tan(mp.acos(g1.d_b / start(g1, rho_E1))) - mp.tan(mp.acos(g1.d_b / d_Nf1))) * g1.z / (2 * mp.pi)
    agree(eps, turned, "contact ratio by angle turned")
    m, _, alpha_deg, beta_deg = g1.inputs[:4]
    values = [m, alpha_deg, beta_deg, g1.z, *g1.inputs[4:], g2.z, *g2.inputs[4:], a_in, b_in,
              a_tight, alpha_wt * 180 / mp.pi, d_w1, d_w2, tips, eps, b * mp.sin(g1.beta) / (mp.pi * g1.m),
              j_wt, j_bt, j_bt * mp.cos(g1.beta_b), a - a_thin, a - g1.d_a / 2 - g2.d_f / 2,
              a - g2.d_a / 2 - g1.d_f / 2, *zeta(rho_A1), *zeta(rho_E1), d_Nf1, d_Nf2]
    return dict(zip(MESH_COLUMNS, values))


# ---------------------------------------------------------------- numbers known from elsewhere

A = (1, 1.25, 0.38)  # ISO 53 A: haP, hfP, rhofP


def plain(m, z, x=0.0, alpha=20.0, beta=0.0, thin=0.0, rack=A, d_a=None):
    return Gear(m, z, alpha, beta, x, *rack, thin, d_a)


def M_of(g, D):
    return g.over_pins(D, g.pin(D)[0])


def land_on_first_numbers():
    """Numbers computed with 60 digits elsewhere, for a first orientation."""
    if plain(1, 17).pin(1.2) is not None:
        sys.exit("m 1, z 17, pin 1.2 must not touch the involute")
    g = plain(2, 8)
    d_K, contact, _ = g.pin(2.8)
    land(d_K + mpf(2.8), "18.283103715", "m 2, z 8, M")
    land(contact, "15.0619", "m 2, z 8, contact")
    land(g.form_diameters()[0], "15.2271", "m 2, z 8, d_Ff")
    g = plain(2, 40, -0.4)
    land(M_of(g, 2.4)[0], "77.910809676", "m 2, z 40, M")
    if not (g.pin(2.4)[0] - mpf(2.4) < g.d_f and g.pin(5.5)[1] > g.d_a):
        sys.exit("m 2, z 40: pin 2.4 goes below the root, 5.5 touches above the tip")
    g = plain(1.5, 13, 0.5, 17.5, 33.0)
    for value, known in zip((M_of(g, 3.25)[i] for i in (0, 1, 4)), ("29.818831124", "30.013970603", "29.590016982")):
        land(value, known, "m 1.5, z 13, beta 33")
    land(plain(3, 17).form_diameters()[0], "47.924349242", "m 3, z 17, d_Ff")
    row = mesh_row(plain(2, 10), plain(2, 40), 50.0, 10.0)
    land(row["eps_alpha_tips"], "1.541508", "eps_alpha by tips")
    land(row["eps_alpha"], "1.092709", "eps_alpha")


def land_on_single_gears():
    """Traps of the trade with numbers computed elsewhere in double precision."""
    g = plain(2, 17)  # odd tooth numbers over pins
    for value, known in zip((g.pin(3.5)[0], *M_of(g, 3.5)[:3:2]), ("35.407885", "38.756841", "38.60644")):
        land(value, known, "m 2, z 17, pin 3.5")
    g = plain(2, 17, beta=25.0)
    M, opposed, _, _, free, offset = M_of(g, 3.5)
    for value, known in ((g.pin(3.5)[0], "38.961148"), (M, "42.294947"), (opposed, "42.461148"),
                         (free, "42.244636"), (offset, "2.249")):
        land(value, known, "m_n 2, z 17, beta 25, ball 3.5")
    land(mp.pi * g.m / mp.sin(g.beta) / 2, "7.4336", "half axial pitch")
    for z, known in ((10, "9.4512"), (8, "7.6136"), (14, "13.1650")):  # form diameter, undercut
        land(plain(1, z).form_diameters()[0], known, f"m 1, z {z}, d_Ff")
    g = plain(1, 20)  # span over every k
    spans = ((1, "1.7562", "18.876"), (2, "4.7083", "19.375"), (3, "7.6604", "20.295"), (4, "10.6126", "21.583"),
             (5, "13.5647", "23.178"))
    for k, W, d_W in spans:
        land(g.span(k)[0], W, f"W_{k}")
        land(g.span(k)[1], d_W, f"contact of W_{k}")
    land(g.form_diameters()[0], "18.820", "m 1, z 20, d_Ff")
    g = plain(4, 30, beta=25.0)
    land(g.span(5)[0], "55.3614", "m_n 4, z 30, beta 25, W_5")
    land(g.beta_b * 180 / mp.pi, "23.3990", "beta_b")
    land(g.span(5)[0] * mp.sin(g.beta_b), "21.986", "W sin beta_b")
    nominal = M_of(plain(2, 20), 3.5)[0]  # M is not linear in the thickness
    land(nominal, "44.929290", "m 2, z 20, M")
    for t, known in ((0.05, "0.11244"), (0.2, "0.45909"), (0.5, "1.20579")):
        land(nominal - M_of(plain(2, 20, thin=t), 3.5)[0], known, f"M thinner by {t}")
    g = plain(25.4 / 6, 20)  # a rounded pin
    land(M_of(g, 7.3152)[0], "94.78441", "P 6, z 20, pin 0.288 in")
    land(M_of(g, 7.3)[0], "94.73259", "P 6, z 20, pin 7.3")
    land(1 + 1 / mp.sin(g.pin(7.3152)[2]), "3.407", "dM/dD")
    g = plain(2.5, 18)  # caliper on an undersize blank
    land(g.chords()[0], "3.92201", "chord")
    land(g.chords()[1], "2.58562", "chord height")
    y = mpf("24.95") - g.chords()[1]
    chord = root(lambda c: mp.atan2(c / 2, y) - mp.pi / 18 + g.cut.flank_angle(mp.hypot(c / 2, y)), mpf(3), mpf(5))
    land(chord, "3.94844", "chord at the nominal height of an undersize blank")
    g = plain(2, 20)  # pins that do not fit
    for value, known in ((M_of(g, 2.8)[0], "42.3338"), (g.pin(3.5)[0], "41.4293"), (g.pin(3.5)[1], "40.0834")):
        land(value, known, "m 2, z 20")
    g = plain(1, 16, beta=25.0)  # three virtual tooth numbers
    land(g.z / mp.cos(g.beta) ** 3, "21.4928", "z/cos^3 beta")
    land(g.z / (mp.cos(g.beta_b) ** 2 * mp.cos(g.beta)), "20.9597", "z/(cos^2 beta_b cos beta)")
    land(g.z * inv(g.alpha_t) / inv(g.alpha_n), "21.1638", "z inv alpha_t/inv alpha_n")
    for x, known in ((0.5, "0.1989"), (0.6, "0.1023"), (0.65, "0.0517"), (0.7, "-0.0004")):  # pointed teeth
        land(plain(1, 10, x).tip_thickness(), known, f"z 10, x {x}, tip")
    g = plain(5, 16, 0.2, beta=25.0)  # a metric handbook's chordal thickness, helical, h_a 6
    land(g.chords()[0], "8.5728", "handbook chord")
    land(g.chords()[1], "6.1712", "handbook chord height")
    land(plain(3, 24, 0.4).span(4)[0], "32.8266", "handbook span")
    land(plain(3, 24, 0.4, beta=25.0).span(5)[0], "42.0085", "handbook helical span")
    land(M_of(plain(3, 20, 0.4, beta=15.0), 5.5)[0], "72.18125438", "m_n 3, z 20, beta 15, ball 5.5")
    # over wires, 1 diametral pitch, wire 1.728 (Machinery's Handbook, recalled): lengths in inches
    for z, old, new in ((6, "8.2846", "8.3032"), (12, "14.3590", "14.3578"), (30, "32.4429", "32.4102")):
        land(M_of(plain(1, z, alpha=14.5, rack=(1, 1.157, 0.209)), 1.728)[0], old, f"14.5 deg, z {z}")
        land(M_of(plain(1, z), 1.728)[0], new, f"20 deg, z {z}")
    land(M_of(plain(1, 15), 1.728)[0], "17.2871", "20 deg, z 15")


def land_on_pairs():
    """Traps and tables of backlash and sliding, computed elsewhere in double precision."""
    g1, g2 = plain(3, 12, 0.6, thin=0.05), plain(3, 24, 0.36, thin=0.05)
    a_tight = tight_center(g1, g2, False)[0]
    land(a_tight, "56.499870", "m 3, z 12/24, tight center")
    row = mesh_row(g1, g2, float(a_tight), 20.0)
    for name, known in (("c1", "0.36987"), ("c2", "0.36987"), ("j_wt", "0.104629"), ("j_bn", "0.093969"),
                        ("eps_alpha_tips", "1.3478"), ("alpha_wt_deg", "26.088563")):
        land(row[name], known, "m 3, z 12/24, " + name)
    row = mesh_row(plain(3, 12, 0.6), plain(3, 24, 0.36), 56.88, 20.0)
    land(row["j_wt"], "0.3799", "m 3, z 12/24 at 56.88")
    pinion, wheel = plain(1, 10), plain(1, 30)
    beyond = 20 * mp.sin(pinion.alpha_t) - mp.sqrt(wheel.d_a**2 - wheel.d_b**2) / 2
    land(beyond, "-0.7306", "z 10/30, wheel tip beyond the base tangent point")
    land(mp.sqrt(pinion.full.form_radius() ** 2 - (pinion.d_b / 2) ** 2), "0.5057", "z 10, start of the involute")
    row = mesh_row(pinion, wheel, 20.0, 10.0)
    land(row["eps_alpha_tips"], "1.5115", "z 10/30 by tips")
    land(row["eps_alpha"], "1.0927", "z 10/30")
    for (m, z, x, beta, t, a, alpha), known in (
            ((3, (20, 40), (0, 0), 0, (.05, .05), 90, 20), "0.100000 0.093969 0.093969 0.138179"),
            ((3, (20, 40), (0, 0), 0, (0, 0), 90.1, 20), "0.073179 0.068690 0.068690 0.100000"),
            ((3, (20, 40), (0, 0), 0, (.05, .05), 90.03, 20), "0.121906 0.114516 0.114516 0.168179"),
            ((3, (12, 24), (.6, .36), 0, (.05, .05), None, 20), "0.104629 0.093969 0.093969 0.107268"),
            ((2, (18, 45), (.2, -.1), 15, (.04, .06), 65.45, 20), "0.126853 0.118292 0.114740 0.165184"),
            ((1.5875, (18, 45), (0, 0), 0, (.0254, .0254), 50.0063, 20), "0.050836 0.047771 0.047771 0.070209"),
            ((4, (16, 30), (0, 0), 0, (.05, .08), 92.05, 14.5), "0.156051 0.150999 0.150999 0.306787"),
            ((2.54, (24, 60), (0, 0), 30, (.03, .05), 123.25, 20), "0.148478 0.136806 0.120765 0.176725")):
        pair = (plain(m, z[i], x[i], alpha, beta, t[i]) for i in (0, 1))
        g1, g2 = pair
        row = mesh_row(g1, g2, float(a or tight_center(g1, g2, False)[0]), 20.0)
        for name, value in zip(("j_wt", "j_bt", "j_bn", "j_r"), known.split()):
            land(row[name], value, f"backlash table, m {m}, z {z}: {name}")
    for z, x, known in (
            ((20, 60), (0, 0), "-4.469676 0.817174 0.535832 -1.154393 1.670776"),
            ((20, 60), (.3, -.3), "-1.657522 0.623710 0.606709 -1.542649 1.609424"),
            ((12, 24), (.6, .36), "-1.552832 0.608278 0.655786 -1.905168 1.202102"),
            ((17, 34), (.25, .25), "-2.503471 0.714569 0.596113 -1.475943 1.452325"),
            ((18, 54), (.35, -.05), "-1.717507 0.632016 0.597355 -1.483577 1.529627")):
        a = tight_center(plain(1, z[0], x[0]), plain(1, z[1], x[1]), False)[0]
        cut = a - mpf(z[0] + z[1]) / 2 - mpf(x[0]) - mpf(x[1])  # k m_n, tips shortened to the rack's clearance
        pair = (plain(1, z[i], x[i], d_a=z[i] + 2 * (1 + mpf(x[i]) + cut)) for i in (0, 1))
        row = mesh_row(*pair, float(a), 10.0)
        for name, value in zip(("zeta_A1", "zeta_A2", "zeta_E1", "zeta_E2", "eps_alpha"), known.split()):
            land(row[name], value, f"sliding table, z {z}: {name}")


# ---------------------------------------------------------------- the spread of inputs

METRIC = [0.1, 0.12, 0.15, 0.2, 0.25, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1.0, 1.125, 1.25, 1.5, 1.75, 2.0, 2.25, 2.5,
          2.75, 3.0, 3.5, 4.0, 4.5, 5.0, 5.5, 6.0, 7.0, 8.0, 9.0, 10.0, 12.0, 14.0, 16.0, 18.0, 20.0, 25.0, 32.0, 40.0,
          50.0]
PITCHES = [200, 120, 96, 80, 72, 64, 48, 40, 32, 24, 20, 16, 14, 12, 10, 9, 8, 7, 6, 5, 4, 3.5, 3, 2.5, 2, 1.5, 1, 0.6]
ANGLES = [20.0] * 8 + [14.5] * 4 + [25.0] * 4 + [30.0] * 3 + [17.5] * 3 + [12.0, 15.0, 18.25, 22.5, 27.5, 28.0, 35.0]
HELICES = [8.0, 10.0, 12.5, 15.0, 17.25, 20.0, 21.789, 23.0, 25.0, 28.125, 30.0, 33.0, 35.0, 37.5, 40.0, 42.0, 45.0]
TEETH = [(4, 9), (10, 17), (10, 17), (18, 30), (18, 30), (31, 60), (61, 150), (151, 500), (501, 1000)]


def fitting_rack(dice, alpha, pitch):
    """haP, hfP, rhofP that suit the pressure angle; the tip radius fits between the rack's flanks."""
    stub = (0.8, 1.0, 0.3)
    if alpha > 30:
        rack = stub
    elif alpha == 14.5:
        rack = dice.pick([(1.0, 1.157, 0.209), (1.0, 1.157, 0.209), (1.0, 1.25, 0.38)])
    elif pitch and pitch >= 20:
        rack = (1.0, round(1.2 + 0.002 * pitch, 4), 0.3)  # fine pitch: 1.2/P + 0.002 in
    else:
        rack = dice.pick([(1.0, 1.25, 0.38), (1.0, 1.25, 0.3), (1.0, 1.25, 0.25), (1.0, 1.4, 0.39), stub,
                          (1.0, 1.35, 0.2), (1.1, 1.3, 0.1)])
    tan = math.tan(math.radians(alpha))
    room = lambda hfP: (math.pi / 4 - hfP * tan) / math.tan(math.radians((90 - alpha) / 2))
    haP, hfP, rhofP = rack if room(rack[1]) > 0.05 else stub
    return haP, hfP, min(rhofP, int(room(hfP) * 100) / 100)


def possible(m, z, alpha, beta, x, haP, hfP, rhofP, thin):
    """Both the nominal and the thinned gear can be made."""
    a, b = math.radians(alpha), math.radians(beta)
    r_a = z * m / fp.cos(b) / 2 + m * (haP + x)
    shifts = (x, x - thin / (2 * m * fp.tan(a)))
    return all(Space(fp, m, z, a, b, s, hfP, rhofP).tooth_possible(r_a) for s in shifts)


def draw_teeth(dice, m, teeth, alpha, beta, rack, thinned):
    """z, x and thinning of a possible gear of this pitch, or None after some tries."""
    for _ in range(40):
        z = int(dice.between(teeth[0], teeth[1] + 1))
        x = dice.pick([0.0, round(dice.between(-0.6, 1.0), dice.pick([1, 2, 3, 4])), round(dice.between(-0.1, 0.6), 2)])
        thin = max(round(m * dice.between(0.005, 0.08), 4), 0.001) if thinned else 0.0
        if possible(m, z, alpha, beta, x, *rack, thin):
            return z, x, thin
    return None


def choose_gears():
    """Inputs of gears.csv: cases that have caught programs before, then a spread."""
    D = (1.0, 1.4, 0.39)
    old = (1.0, 1.157, 0.209)
    yield from (
        ((2.0, 17, 20.0, 0.0, 0.0, *A, 0.0), 3.5), ((2.0, 17, 20.0, 25.0, 0.0, *A, 0.0), 3.5),
        ((1.5, 13, 17.5, 33.0, 0.5, *A, 0.0), 3.25), ((2.0, 8, 20.0, 0.0, 0.0, *A, 0.0), 2.8),
        ((2.0, 40, 20.0, 0.0, -0.4, *A, 0.0), 2.4), ((2.0, 40, 20.0, 0.0, -0.4, *A, 0.0), 5.5),
        ((3.0, 17, 20.0, 0.0, 0.0, *A, 0.0), 5.25), ((1.0, 10, 20.0, 0.0, 0.0, *A, 0.0), 1.9),
        ((2.0, 20, 20.0, 0.0, 0.0, *A, 0.5), 3.5), ((25.4 / 6, 20, 20.0, 0.0, 0.0, *A, 0.0), 7.3152),
        ((25.4 / 6, 20, 20.0, 0.0, 0.0, *A, 0.0), 7.3), ((2.0, 20, 20.0, 0.0, 0.0, *A, 0.0), 2.8),
        ((1.0, 10, 20.0, 0.0, 0.65, *A, 0.0), 2.2), ((0.1, 1000, 20.0, 0.0, 0.0, *A, 0.0), 0.1728),
        ((50.0, 1000, 20.0, 0.0, 0.3, *A, 2.0), 86.4), ((50.0, 999, 14.5, 30.0, -0.25, *old, 1.5), 86.4),
        ((50.0, 4, 25.0, 0.0, 0.45, 0.8, 1.0, 0.26, 0.5), 100.0), ((0.1, 4, 20.0, 0.0, 0.7, 0.7, 1.25, 0.38, 0.001), 0.24),
        ((5.0, 5, 20.0, 30.0, 0.5, *A, 0.05), 10.5), ((1.0, 1000, 30.0, 45.0, 1.0, 1.0, 1.25, 0.1, 0.02), 2.0),
        ((8.0, 60, 20.0, 0.0, 0.0, *D, 0.1), 14.0), ((0.5, 7, 20.0, 0.0, 0.45, *A, 0.01), 1.05),
        ((1.0, 18, 20.0, 0.0, 0.0, 1.0, 1.25, 0.0, 0.0), 1.728), ((2.0, 12, 20.0, 0.0, 0.0, 1.0, 1.25, 0.0, 0.02), 3.6),
        ((3.0, 11, 20.0, 20.0, 0.0, 1.0, 1.25, 0.0, 0.0), 5.5), ((25.4 / 16, 18, 20.0, 0.0, 0.25, *A, 0.05), 3.0))
    dice, i = Dice(20), 0
    while True:
        pitch = dice.pick(PITCHES) if dice.next() < 0.4 else None
        m = 25.4 / pitch if pitch else dice.pick(METRIC)
        alpha = dice.pick(ANGLES)
        beta = dice.pick(HELICES) if dice.next() < 0.45 else 0.0
        rack = fitting_rack(dice, alpha, pitch)
        drawn = draw_teeth(dice, m, TEETH[i % len(TEETH)], alpha, beta, rack, dice.next() < 0.65)
        if drawn is None:
            continue
        i += 1
        z, x, thin = drawn
        factor = dice.pick([1.728, 1.728, 1.728, 1.68, 1.92, 1.6, 2.1, 1.44])
        yield (m, z, alpha, beta, x, *rack, thin), round(factor * m, 3 if m >= 1 else 4)


def all_gears():
    """Rows of gears.csv; a pin without contact on the involute gives way to a larger one."""
    rows = []
    for inputs, D in choose_gears():
        g, row = Gear(*inputs), None
        for _ in range(12):
            row = gear_row(g, D)
            if row:
                break
            D = round(D * 1.1, 4)
        if row:
            rows.append(row)
        if len(rows) == MAX_GEARS:
            return rows


def choose_meshes():
    """Pairs for meshes.csv: (gear, gear, amount to open the tight center or center, face width)."""
    stub, old = (0.8, 1.0, 0.3), (1.0, 1.157, 0.209)
    pair = lambda m, z, x, t, a, alpha=20.0, beta=0.0, b=20.0, rack=A: (
        *(plain(m, z[i], x[i], alpha, beta, t[i], rack) for i in (0, 1)), a, b)
    yield from (
        pair(3, (12, 24), (0.6, 0.36), (0.05, 0.05), None), pair(3, (12, 24), (0.6, 0.36), (0, 0), 56.88),
        pair(1, (10, 30), (0, 0), (0, 0), 20.0), pair(2, (10, 40), (0, 0), (0.03, 0.02), 50.0),
        pair(3, (20, 40), (0, 0), (0.05, 0.05), 90.03), pair(2, (18, 45), (0.2, -0.1), (0.04, 0.06), 65.45, 20.0, 15.0),
        pair(4, (16, 30), (0, 0), (0.05, 0.08), 92.05, 14.5, rack=old),
        pair(2.54, (24, 60), (0, 0), (0.03, 0.05), 123.25, 20.0, 30.0, 25.4),
        pair(3, (12, 60), (0.09809, 0), (0.04, 0.04), 125.0, 20.0, 30.0, 30.0),
        pair(25.4 / 16, (18, 45), (0.25, 0.278), (0.03, 0.03), 50.8, b=12.7),
        pair(50, (20, 100), (0.3, -0.3), (0.5, 0.5), 3001.0, b=500.0),
        pair(0.1, (17, 200), (0, 0), (0.002, 0.002), None, b=1.0),
        pair(6, (14, 17), (0, 0), (0.05, 0.05), None, b=50.0, rack=stub), pair(2, (17, 1000), (0.2, 0.1), (0, 0.05), None),
        pair(2, (50, 20), (0.1, 0.4), (0.04, 0.02), None, 25.0, 12.0, 30.0, (1, 1.25, 0.3)))
    dice = Dice(1328)
    while True:
        pitch = dice.pick(PITCHES[2:]) if dice.next() < 0.4 else None
        m = 25.4 / pitch if pitch else dice.pick(METRIC)
        alpha = dice.pick(ANGLES)
        beta = dice.pick(HELICES) if dice.next() < 0.5 else 0.0
        racks = fitting_rack(dice, alpha, pitch), fitting_rack(dice, alpha, pitch)
        if racks[0][0] != racks[1][0]:
            continue
        thinned = dice.next() < 0.7
        drawn = [draw_teeth(dice, m, dice.pick(TEETH[1:7]), alpha, beta, racks[i], thinned) for i in (0, 1)]
        if None in drawn:
            continue
        g1, g2 = (Gear(m, z, alpha, beta, x, *racks[i], thin) for i, (z, x, thin) in enumerate(drawn))
        wider = dice.pick([None, round(dice.between(0, 0.12) * m, 4), round(dice.between(0, 0.03) * m, 4)])
        a0 = tight_center(g1, g2, False)[0]
        a = None if wider is None else round(float(a0) + wider, 3 if m >= 1 else 4)
        yield g1, g2, a, round(dice.between(4, 14) * m, 1)


def all_meshes():
    """Rows of meshes.csv: backlash not negative, clearance, and contact somewhere."""
    rows = []
    for g1, g2, a, b in choose_meshes():
        given = float(tight_center(g1, g2, False)[0]) if a is None else float(a)
        row = mesh_row(g1, g2, given, float(b))
        if min(row["c1"], row["c2"]) > 0 and row["eps_alpha"] > mpf("0.3") and row["j_wt"] > mpf("-1e-12"):
            rows.append(row)
        if len(rows) == MAX_MESHES:
            return rows


def all_inverses():
    """Rows of inverse.csv, dense at both ends of (0, pi/2)."""
    half_pi = fp.pi / 2
    alphas = [round(10.0 ** (-6 + i * 5 / 69), 10) for i in range(70)]  # 1e-6 to 0.1
    alphas += [round(0.1 + i * 0.0125, 4) for i in range(1, 110)]  # to 1.4625
    alphas += [half_pi - round(10.0 ** (-1 - i * 5 / 40), 9) for i in range(41)]  # to pi/2 - 1e-6
    rows = []
    for alpha in alphas + [math.radians(a) for a in (14.5, 17.5, 20.0, 22.5, 25.0, 30.0)]:
        value = inv(mpf(alpha))
        y = float(value)
        back = arcinv(mpf(y))
        with mp.extradps(40):  # second route: tan a - a = y in a bracket
            y_exact = mpf(y)
            other = root(lambda a: mp.tan(a) - a - y_exact, back * (1 - mpf("1e-7")),
                         min(back * (1 + mpf("1e-7")), mp.pi / 2 * (1 - mpf("1e-12"))))
        agree(back / mpf(alpha), other / mpf(alpha), "inverse involute")
        rows.append(dict(alpha=alpha, inv_alpha=value, y=y, alpha_of_y=back))
    return rows


# ---------------------------------------------------------------- files

NOTE = {
    "gears.csv": "External gears, computed with 50 digits by forty.py (its docstring explains the columns). mm; *_deg degrees;\n"
                 "# z, k count; x, haP, hfP, rhofP in normal modules; undercut 0/1; empty: does not exist for this gear.",
    "meshes.csv": "External pairs, computed with 50 digits by forty.py (its docstring explains the columns). mm; *_deg degrees;\n"
                  "# z counts; x, haP, hfP, rhofP in normal modules; eps_*, zeta_* dimensionless.",
    "inverse.csv": "inv alpha = tan alpha - alpha and its inverse, computed with 50 digits by forty.py. alpha, inv_alpha, y,\n"
                   "# alpha_of_y in radians; alpha and y are exact float64, y the nearest to inv_alpha.",
}


def table(name, rows, digits):
    cell = lambda v: short(v) if isinstance(v, float) else text(v, digits)
    lines = ["# " + NOTE[name], ",".join(rows[0])]
    return "\n".join(lines + [",".join(map(cell, row.values())) for row in rows]) + "\n"


def main(args):
    if args not in ([], ["--check"]):
        sys.exit(__doc__)
    land_on_first_numbers()
    land_on_single_gears()
    land_on_pairs()
    files = {
        "gears.csv": table("gears.csv", all_gears(), 25),
        "meshes.csv": table("meshes.csv", all_meshes(), 25),
        "inverse.csv": table("inverse.csv", all_inverses(), 30),
    }
    for name, wanted in files.items():
        path = HERE / name
        if not args:
            path.write_text(wanted, encoding="ascii")
        elif not path.exists() or path.read_text(encoding="ascii") != wanted:
            sys.exit(f"{name} differs from what forty.py computes")


if __name__ == "__main__":
    main(sys.argv[1:])
