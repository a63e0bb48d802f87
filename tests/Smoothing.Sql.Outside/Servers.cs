using System.Globalization;
using Npgsql;

namespace Smoothing.Sql.Outside;

/// <summary>The three servers that .ci/outside-postgresql started: a coordinator and two that hold a part of the table each.</summary>
public sealed class Servers : IDisposable
{
    private const string Columns = "(shard integer, x double precision, w double precision, g text, whole integer, price numeric(12, 4))";

    private readonly string[] _ports = (Environment.GetEnvironmentVariable("SMOOTHING_POSTGRESQL")
        ?? throw new InvalidOperationException("SMOOTHING_POSTGRESQL must hold three ports: run .ci/outside-postgresql.")).Split(' ');

    private readonly List<NpgsqlConnection> _open = [];

    /// <summary>Fills each part, and joins them under the coordinator as one partitioned table.</summary>
    public Servers()
    {
        for (int part = 1; part <= 2; part++)
        {
            using NpgsqlConnection connection = Open(part);
            Run(connection, $"create table obs_{part} {Columns}");
            using (NpgsqlBinaryImporter import = connection.BeginBinaryImport($"copy obs_{part} from stdin (format binary)"))
            {
                foreach ((double? x, double w, string g) in Rows[part])
                {
                    import.StartRow();
                    import.Write(part);
                    if (x is double value)
                    {
                        import.Write(value);
                    }
                    else
                    {
                        import.WriteNull();
                    }

                    import.Write(w);
                    import.Write(g);
                    import.Write(double.IsFinite(x ?? double.NaN) ? (int)Math.Round(x!.Value * 10) : 0);
                    import.Write(double.IsFinite(x ?? double.NaN) ? Math.Round((decimal)x!.Value, 4) : 0m);
                }

                import.Complete();
            }

            Run(connection, $"analyze obs_{part}");
        }

        using NpgsqlConnection coordinator = Open(0);
        Run(coordinator, "create extension postgres_fdw");
        Run(coordinator, $"create table obs {Columns} partition by list (shard)");
        for (int part = 1; part <= 2; part++)
        {
            Run(coordinator, $"create server part_{part} foreign data wrapper postgres_fdw options (host '127.0.0.1', port '{_ports[part]}', dbname 'postgres', async_capable 'true')");
            Run(coordinator, $"create user mapping for current_user server part_{part} options (user 'postgres')");
            Run(coordinator, $"create foreign table obs_{part} partition of obs for values in ({part}) server part_{part} options (table_name 'obs_{part}')");
        }
    }

    /// <summary>The rows of each part, seeded; index 0 is empty. NULL, NaN and infinite values among them.</summary>
    public IReadOnlyList<IReadOnlyList<(double? X, double W, string G)>> Rows { get; } = [[], Draw(1), Draw(2)];

    public IEnumerable<(double? X, double W, string G)> All => Rows[1].Concat(Rows[2]);

    public NpgsqlConnection Open(int server)
    {
        // Aggregation by partition is off by default; without it a coordinator fetches every row.
        var connection = new NpgsqlConnection($"Host=127.0.0.1;Port={_ports[server]};Username=postgres;Database=postgres;Pooling=false;Options=-c enable_partitionwise_aggregate=on");
        connection.Open();
        _open.Add(connection);
        return connection;
    }

    public static void Run(NpgsqlConnection connection, string sql)
    {
        using var command = new NpgsqlCommand(sql, connection);
        command.ExecuteNonQuery();
    }

    public static string Scalar(NpgsqlConnection connection, string sql)
    {
        using var command = new NpgsqlCommand(sql, connection);
        return Convert.ToString(command.ExecuteScalar(), CultureInfo.InvariantCulture)!;
    }

    public void Dispose() => _open.ForEach(connection => connection.Dispose());

    private static List<(double? X, double W, string G)> Draw(int seed)
    {
        var random = new Random(seed);
        var rows = new List<(double?, double, string)>();
        for (int i = 0; i < 20_000; i++)
        {
            double normal = Math.Sqrt(-2 * Math.Log(1 - random.NextDouble())) * Math.Cos(2 * Math.PI * random.NextDouble());
            rows.Add((random.NextDouble() < 0.4 ? -3 + (0.7 * normal) : 2 + normal, random.Next(0, 5), random.NextDouble() < 0.5 ? "north" : "south"));
        }

        rows.AddRange([(null, 1, "north"), (double.NaN, 1, "south"), (double.PositiveInfinity, 1, "south"), (double.NegativeInfinity, 1, "north")]);
        return rows;
    }
}
