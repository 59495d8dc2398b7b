using System.Text;

namespace ResponseLedger.Store.Embedded;

/// <summary>PostgreSQL's log: a file and the one before it, neither larger than a bound. The last lines are at hand for messages.</summary>
internal sealed class BoundedLog(string path, long bytesPerFile = 4 * 1024 * 1024)
{
    private const int LinesAtHand = 20;

    private readonly Lock gate = new();
    private readonly Queue<string> last = new();

    public string Path => path;

    /// <summary>Copies a stream of lines into the log until the stream ends.</summary>
    public async Task CopyAsync(StreamReader lines)
    {
        while (await lines.ReadLineAsync() is { } line)
            Write(line);
    }

    /// <summary>The newest lines, oldest first.</summary>
    public string Tail()
    {
        lock (gate)
            return string.Join('\n', last);
    }

    /// <summary>Starts anew with the lines at hand; the file stays.</summary>
    public void ForgetTail()
    {
        lock (gate)
            last.Clear();
    }

    private void Write(string line)
    {
        lock (gate)
        {
            last.Enqueue(line);
            if (last.Count > LinesAtHand)
                last.Dequeue();
            try
            {
                var file = new FileInfo(path);
                if (file.Exists && file.Length + line.Length > bytesPerFile)
                    file.MoveTo(path + ".1", overwrite: true);
                File.AppendAllText(path, line + "\n", Encoding.UTF8);
            }
            catch (IOException)
            {
                // A full disk must not stop the reader: PostgreSQL would block on a full pipe.
            }
        }
    }
}
