using ResponseLedger.Engine.Sweeps;

namespace ResponseLedger.Engine.Measures;

/// <summary>
/// The least distance of a loop gain from the critical point, |1 + L| or |1 - L|. On a piece the level and the phase are straight
/// in t = 0..1, so with psi the phase from the critical one, L = g e^(j psi) up to sign, g = e^(q + p t), psi = s + r t and
/// d^2 = 1 + g^2 - 2 g cos psi. Its stationary points are the roots of F(t) = p (g - cos psi) + r sin psi. Each is bracketed: an
/// interval is split until F is proved free of roots or monotone on it by the bounds |F'| and |F''|, with the largest gain of that
/// interval, and a monotone root is bisected to 1e-14 of the piece, which leaves d exact to about 1e-15 since d is stationary there. An
/// interval that cannot come nearer than the least so far is left: d is at least |1 - g|, and changes by at most g times the way.
/// </summary>
internal static class LeastDistance
{
    // An interval of this share of a piece that is still undecided holds a double root at most; its middle is taken as it is.
    private const double SmallestInterval = 1e-9;

    // ln g from which d is g itself to a double, and e^(ln g) soon exceeds one.
    private const double FarOut = 40;

    // On a piece whose way in the plane is shorter than this the ends tell the distance.
    private const double NegligibleWay = 1e-14;

    /// <summary>The least distance and its frequency; NaN where no point has both level and phase.</summary>
    internal static (double Distance, double FrequencyHz) Of(Sweep run, double criticalPhaseDeg)
    {
        var f = run.FrequencyHz;
        var level = run.GainDb;
        var phase = run.PhaseDeg;
        double best = double.PositiveInfinity;
        double bestHz = double.NaN;
        for (int i = 0; i < f.Length; i++)
        {
            // A gain of exactly zero stands at distance 1, whatever its phase.
            double distance = double.IsNegativeInfinity(level[i]) ? 1
                : double.IsNaN(phase[i]) ? double.PositiveInfinity
                : Distance(Math.Log(10) / 20 * level[i], Radians(phase[i] - criticalPhaseDeg));
            if (distance < best)
                (best, bestHz) = (distance, f[i]);
        }

        for (int i = 0; i + 1 < f.Length; i++)
        {
            var piece = new Piece(
                Math.Log(10) / 20 * level[i], Math.Log(10) / 20 * level[i + 1],
                Radians(phase[i] - criticalPhaseDeg), Radians(phase[i + 1] - criticalPhaseDeg));
            if (!piece.IsFinite || piece.LowerBound() >= best)
                continue;
            var (distance, t) = piece.Least();
            if (distance < best)
                (best, bestHz) = (distance, LogAxis.FrequencyHzAt(f[i], f[i + 1], t));
        }

        return double.IsFinite(best) ? (best, bestHz) : (double.NaN, double.NaN);
    }

    private static double Radians(double deg) => deg * (Math.PI / 180);

    private static double Distance(double logGain, double psi)
    {
        double g = Math.Exp(logGain);
        if (logGain > FarOut)
            return g;
        // 1 - g cos psi without cancellation near the critical point: -(expm1(logGain)) + 2 g sin^2(psi/2).
        double half = Math.Sin(psi / 2);
        double real = 2 * g * half * half - ExpLessOne(logGain);
        return double.Hypot(real, g * Math.Sin(psi));
    }

    private static double ExpLessOne(double x)
    {
        if (Math.Abs(x) > 0.5)
            return Math.Exp(x) - 1;
        double half = Math.Sinh(x / 2);
        return 2 * half * Math.Exp(x / 2);
    }

    /// <summary>One piece in natural units: ln g and psi in radians at either end.</summary>
    private readonly struct Piece(double logGainStart, double logGainEnd, double psiStart, double psiEnd)
    {
        private readonly double q = logGainStart;
        private readonly double p = logGainEnd - logGainStart;
        private readonly double s = psiStart;
        private readonly double r = psiEnd - psiStart;

        internal bool IsFinite => double.IsFinite(p) && double.IsFinite(r);

        /// <summary>A distance that the piece cannot come under.</summary>
        internal double LowerBound() => LowerBound(0, 1);

        internal (double Distance, double T) Least()
        {
            var best = At(0) <= At(1) ? (At(0), 0.0) : (At(1), 1.0);
            Search(0, 1, ref best);
            return best;
        }

        private double Way(double share) => share * Math.Sqrt(p * p + r * r);

        private double MaxGain(double from, double to) => Math.Exp(Math.Max(q + p * from, q + p * to));

        private double LowerBound(double from, double to)
        {
            double largest = MaxGain(from, to);
            double smallest = Math.Exp(Math.Min(q + p * from, q + p * to));
            double ofGain = smallest > 1 ? smallest - 1 : largest < 1 ? 1 - largest : 0;
            double ofWay = (At(from) + At(to) - largest * Way(to - from)) / 2;
            return double.IsNaN(ofWay) ? ofGain : Math.Max(ofGain, ofWay);
        }

        private double At(double t) => Distance(q + p * t, s + r * t);

        private double F(double t)
        {
            double psi = s + r * t;
            return p * (Math.Exp(q + p * t) - Math.Cos(psi)) + r * Math.Sin(psi);
        }

        private double FPrime(double t)
        {
            double psi = s + r * t;
            return p * p * Math.Exp(q + p * t) + p * r * Math.Sin(psi) + r * r * Math.Cos(psi);
        }

        private void Search(double from, double to, ref (double Distance, double T) best)
        {
            double largest = MaxGain(from, to);
            if (largest * Way(to - from) <= NegligibleWay || LowerBound(from, to) >= best.Distance)
                return;
            double middle = (from + to) / 2;
            double half = (to - from) / 2;
            var (p1, r1) = (Math.Abs(p), Math.Abs(r));
            double firstBound = p * p * largest + p1 * r1 + r * r;
            if (Math.Abs(F(middle)) > firstBound * half)
                return;
            double secondBound = p1 * p1 * p1 * largest + p1 * r * r + r1 * r1 * r1;
            if (Math.Abs(FPrime(middle)) > secondBound * half)
            {
                // F is monotone here: one root at most, and it is a minimum where F rises through it.
                if (F(from) < 0 && F(to) > 0)
                    Take(Bisect(from, to), ref best);
                return;
            }

            if (half < SmallestInterval)
            {
                Take(middle, ref best);
                return;
            }

            Search(from, middle, ref best);
            Take(middle, ref best);
            Search(middle, to, ref best);
        }

        private double Bisect(double from, double to)
        {
            while (to - from > 1e-14)
            {
                double middle = (from + to) / 2;
                if (middle <= from || middle >= to)
                    break;
                if (F(middle) < 0)
                    from = middle;
                else
                    to = middle;
            }

            return (from + to) / 2;
        }

        private void Take(double t, ref (double Distance, double T) best)
        {
            double distance = At(t);
            if (distance < best.Distance)
                best = (distance, t);
        }
    }
}
