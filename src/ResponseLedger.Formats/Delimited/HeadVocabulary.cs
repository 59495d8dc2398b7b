using System.Collections.Frozen;

namespace ResponseLedger.Formats.Delimited;

/// <summary>The English and German words of heads, in lower case.</summary>
internal static class HeadVocabulary
{
    private static readonly FrozenDictionary<string, Said> Meanings = Table(
        (Said.Frequency, "frequency frequencies freq frequenz frq f"),
        (Said.Omega, "omega \u03C9 w kreisfrequenz winkelfrequenz"),
        (Said.Gain, "gain verst\u00E4rkung verstaerkung transfer response frequenzgang \u00FCbertragung h s21 transmission"),
        (Said.Level, "level pegel"),
        (Said.Magnitude, "magnitude mag betrag abs amplitude amp ampl modulus amplitudengang amplitudenverh\u00E4ltnis"),
        (Said.Attenuation, "attenuation att atten loss"),
        (Said.Real, "real re realteil"),
        (Said.Imaginary, "imaginary imag im imagin\u00E4r imaginaerteil imagin\u00E4rteil"),
        (Said.Phase, "phase ph phasenwinkel phasenverschiebung phasengang angle ang winkel arg phi \u03C6 \u03D5 \u2220 phs"),
        (Said.Input, "input in vin uin ein eingang ue ch1 channel1 chan1 kanal1 k1 v1 u1 cha eingangsspannung eingangsamplitude"),
        (Said.Output, "output out vout uout aus ausgang ua ch2 channel2 chan2 kanal2 k2 v2 u2 chb ausgangsspannung ausgangsamplitude"),
        (Said.Input | Said.Phase, "eingangsphase"),
        (Said.Output | Said.Phase, "ausgangsphase"),
        (Said.Power, "power leistung"),
        (Said.Power | Said.Gain, "leistungsverst\u00E4rkung"),
        (Said.Power | Said.Magnitude, "leistungsverh\u00E4ltnis"),
        (Said.Phase | Said.Lag, "phasennacheilung phasenr\u00FCckstand"),
        (Said.Lag, "lag lagging nacheilung nacheilend"),
        (Said.Other, "delay laufzeit gruppenlaufzeit coherence koh\u00E4renz index point punkt points nr no limit grenze tolerance toleranz uncertainty unsicherheit"
            + " sigma std time zeit temperature temperatur noise rauschen s11 s12 s22 status thd"));

    // Words that leave the quantity and its unit as they are.
    private static readonly FrozenSet<string> Neutral = Words(
        "the of and at to from via for over minus vs versus re in is as by on und von vom zu zum zur bei im durch gegen nach als \u00FCber"
        + " function funktion characteristic curve kurve gang value values wert werte data daten sweep plot trace result ergebnis"
        + " measured measurement meas gemessen messung mess actual ist raw average avg mean mittelwert"
        + " open closed loop offen geschlossen filter amplifier dut uut unit board sensor probe test"
        + " insertion einf\u00FCge transfer complex komplex part teil component signal voltage spannung volt channel chan ch kanal port"
        + " lin linear ratio verh\u00E4ltnis shift difference differenz diff lead voreilung wrapped unwrapped unwrap continuous"
        + " v u z y j jw j\u03C9 left right links rechts");

    // Words with a number behind them that only tell one thing from the next: "Trc1", "Mem2".
    private static readonly FrozenSet<string> Indexed = Words("trc tr mem trace marker mkr ch port dut uut unit board curve sweep run sample");

    // Words of units that may stand inside a head: "dB(S21)".
    private static readonly FrozenSet<string> Units = Words("db db20 vdb dbv deg grad rad hz khz mhz ghz");

    // Words that change what the numbers are.
    private static readonly FrozenSet<string> Changing = Words(
        "norm normalised normalized normiert normierte normierter normiertes normalisiert period periode periodendauer inverse inverted invers invertiert"
        + " reciprocal kehrwert negative negated negiert squared quadrat quadriert error fehler deviation abweichung delta \u03B4 derivative ableitung min max minimum maximum"
        + " target soll sollwert ideal simulated simuliert");

    private static readonly FrozenSet<string> Logarithmic = Words("log log10 log2 loge lg ln lb logarithmic logarithm logarithmus logarithmisch");

    private static readonly FrozenSet<string> Relative = Words("relative relativ rel bezogen");

    /// <summary>What a word says; null where it is not known.</summary>
    public static Said? Meaning(string word)
    {
        if (Meanings.TryGetValue(word, out Said said))
            return said;
        if (word.EndsWith("d\u00E4mpfung", StringComparison.Ordinal) || word.EndsWith("daempfung", StringComparison.Ordinal))
            return Said.Attenuation;
        if (Neutral.Contains(word) || Units.Contains(word) || Relative.Contains(word) || IsTwentyLog(word))
            return Said.None;
        string stem = word.TrimEnd('0', '1', '2', '3', '4', '5', '6', '7', '8', '9');
        // A number of three digits and more is no channel.
        return (stem.Length == 0 && word.Length <= 2) || (stem.Length < word.Length && Indexed.Contains(stem)) ? Said.None : null;
    }

    /// <summary>Whether a word changes what the numbers are, beside this unit and the other words.</summary>
    public static bool Changes(string word, UnitText? unit, Said all) => word switch
    {
        // A logarithm of the magnitude in dB is what dB are.
        _ when Logarithmic.Contains(word) => word is "ln" or "lb" or "log2" or "loge" || unit?.Family != UnitFamily.Decibel,
        _ when Relative.Contains(word) => (all & (Said.Input | Said.Output)) == 0,
        _ => Changing.Contains(word) || word.StartsWith("10log", StringComparison.Ordinal) || word.StartsWith("10lg", StringComparison.Ordinal)
            || IsFactor(word),
    };

    public static bool IsTwentyLog(string word) => word.StartsWith("20log", StringComparison.Ordinal) || word.StartsWith("20lg", StringComparison.Ordinal);

    // "x10", "10x", "1e3".
    private static bool IsFactor(string word)
    {
        bool digits = word.Length >= 2 && word.Count(char.IsAsciiDigit) == word.Length - 1;
        return digits && (word[0] == 'x' || word[^1] == 'x' || (char.IsAsciiDigit(word[0]) && word.Contains('e', StringComparison.Ordinal)));
    }

    private static FrozenSet<string> Words(string words) => words.Split(' ').ToFrozenSet(StringComparer.Ordinal);

    private static FrozenDictionary<string, Said> Table(params (Said Said, string Words)[] rows)
        => rows.SelectMany(r => r.Words.Split(' ').Select(w => (Word: w, r.Said))).ToFrozenDictionary(r => r.Word, r => r.Said, StringComparer.Ordinal);
}
