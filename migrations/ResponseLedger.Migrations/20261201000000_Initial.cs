using System;
using Microsoft.EntityFrameworkCore.Migrations;
using Npgsql.EntityFrameworkCore.PostgreSQL.Metadata;

#nullable disable

namespace ResponseLedger.Migrations
{
    /// <inheritdoc />
    public partial class Initial : Migration
    {
        /// <inheritdoc />
        protected override void Up(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.CreateTable(
                name: "bench",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    name = table.Column<string>(type: "text", nullable: false, collation: "C"),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_bench", x => x.id);
                    table.CheckConstraint("ck_bench_name", "name <> ''");
                });

            migrationBuilder.CreateTable(
                name: "data_protection_key",
                columns: table => new
                {
                    id = table.Column<int>(type: "integer", nullable: false)
                        .Annotation("Npgsql:ValueGenerationStrategy", NpgsqlValueGenerationStrategy.IdentityByDefaultColumn),
                    friendly_name = table.Column<string>(type: "text", nullable: true),
                    xml = table.Column<string>(type: "text", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_data_protection_key", x => x.id);
                });

            migrationBuilder.CreateTable(
                name: "device",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    part_number = table.Column<string>(type: "text", nullable: false, collation: "C"),
                    revision = table.Column<string>(type: "text", nullable: false, collation: "C"),
                    kind = table.Column<string>(type: "text", nullable: false),
                    gain_unit = table.Column<string>(type: "text", nullable: false),
                    critical_phase_deg = table.Column<short>(type: "smallint", nullable: true),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_device", x => x.id);
                    table.CheckConstraint("ck_device_critical_phase", "critical_phase_deg is null or (kind = 'loop' and critical_phase_deg in (-180, 0))");
                    table.CheckConstraint("ck_device_kind", "kind in ('transfer', 'loop')");
                    table.CheckConstraint("ck_device_names", "part_number <> '' and revision <> ''");
                });

            migrationBuilder.CreateTable(
                name: "file",
                columns: table => new
                {
                    sha256 = table.Column<byte[]>(type: "bytea", nullable: false),
                    content = table.Column<byte[]>(type: "bytea", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_file", x => x.sha256);
                    table.CheckConstraint("ck_file_content", "octet_length(content) > 0");
                    table.CheckConstraint("ck_file_sha256", "sha256 = sha256(content)");
                });

            migrationBuilder.CreateTable(
                name: "grid",
                columns: table => new
                {
                    sha256 = table.Column<byte[]>(type: "bytea", nullable: false),
                    points = table.Column<int>(type: "integer", nullable: false),
                    planes = table.Column<byte[]>(type: "bytea", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_grid", x => x.sha256);
                    table.CheckConstraint("ck_grid_planes", "points >= 2 and octet_length(planes) = 8 * points");
                    table.CheckConstraint("ck_grid_sha256", "sha256 = sha256(planes)");
                });

            migrationBuilder.CreateTable(
                name: "ledger_entry",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    kind = table.Column<string>(type: "text", nullable: false),
                    bytes = table.Column<byte[]>(type: "bytea", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_ledger_entry", x => x.id);
                    table.CheckConstraint("ck_ledger_entry_bytes", "octet_length(bytes) > 0");
                });

            migrationBuilder.CreateTable(
                name: "person",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    display_name = table.Column<string>(type: "text", nullable: false),
                    must_change_password = table.Column<bool>(type: "boolean", nullable: false),
                    created_at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    user_name = table.Column<string>(type: "character varying(256)", maxLength: 256, nullable: true),
                    normalized_user_name = table.Column<string>(type: "character varying(256)", maxLength: 256, nullable: true),
                    email = table.Column<string>(type: "character varying(256)", maxLength: 256, nullable: true),
                    normalized_email = table.Column<string>(type: "character varying(256)", maxLength: 256, nullable: true),
                    email_confirmed = table.Column<bool>(type: "boolean", nullable: false),
                    password_hash = table.Column<string>(type: "text", nullable: true),
                    security_stamp = table.Column<string>(type: "text", nullable: true),
                    concurrency_stamp = table.Column<string>(type: "text", nullable: true),
                    phone_number = table.Column<string>(type: "text", nullable: true),
                    phone_number_confirmed = table.Column<bool>(type: "boolean", nullable: false),
                    two_factor_enabled = table.Column<bool>(type: "boolean", nullable: false),
                    lockout_end = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: true),
                    lockout_enabled = table.Column<bool>(type: "boolean", nullable: false),
                    access_failed_count = table.Column<int>(type: "integer", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_person", x => x.id);
                });

            migrationBuilder.CreateTable(
                name: "role",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    name = table.Column<string>(type: "character varying(256)", maxLength: 256, nullable: true),
                    normalized_name = table.Column<string>(type: "character varying(256)", maxLength: 256, nullable: true),
                    concurrency_stamp = table.Column<string>(type: "text", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_role", x => x.id);
                });

            migrationBuilder.CreateTable(
                name: "bench_columns",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    bench_id = table.Column<Guid>(type: "uuid", nullable: false),
                    heads_digest = table.Column<string>(type: "text", nullable: false),
                    choices = table.Column<string>(type: "text", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_bench_columns", x => x.id);
                    table.ForeignKey(
                        name: "fk_bench_columns_bench_bench_id",
                        column: x => x.bench_id,
                        principalTable: "bench",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "bench_setting",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    bench_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<int>(type: "integer", nullable: false),
                    serial_pattern = table.Column<string>(type: "text", nullable: true),
                    noise_floor_db = table.Column<double>(type: "double precision", nullable: true),
                    remark = table.Column<string>(type: "text", nullable: true),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_bench_setting", x => x.id);
                    table.ForeignKey(
                        name: "fk_bench_setting_bench_bench_id",
                        column: x => x.bench_id,
                        principalTable: "bench",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "bench_token",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    name = table.Column<string>(type: "text", nullable: false),
                    bench_id = table.Column<Guid>(type: "uuid", nullable: true),
                    scopes = table.Column<string[]>(type: "text[]", nullable: false),
                    secret_hash = table.Column<byte[]>(type: "bytea", nullable: false),
                    expires_at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_bench_token", x => x.id);
                    table.CheckConstraint("ck_bench_token_secret_hash", "octet_length(secret_hash) = 32");
                    table.ForeignKey(
                        name: "fk_bench_token_bench_bench_id",
                        column: x => x.bench_id,
                        principalTable: "bench",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "bench_uncertainty",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    bench_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<int>(type: "integer", nullable: false),
                    document = table.Column<string>(type: "text", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_bench_uncertainty", x => x.id);
                    table.ForeignKey(
                        name: "fk_bench_uncertainty_bench_bench_id",
                        column: x => x.bench_id,
                        principalTable: "bench",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "condition",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    device_id = table.Column<Guid>(type: "uuid", nullable: false),
                    ordinal = table.Column<int>(type: "integer", nullable: false),
                    name = table.Column<string>(type: "text", nullable: false, collation: "C"),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_condition", x => x.id);
                    table.ForeignKey(
                        name: "fk_condition_device_device_id",
                        column: x => x.device_id,
                        principalTable: "device",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "device_setting",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    device_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<int>(type: "integer", nullable: false),
                    title = table.Column<string>(type: "text", nullable: false),
                    signing_needs_quality = table.Column<bool>(type: "boolean", nullable: false),
                    signing_needs_two = table.Column<bool>(type: "boolean", nullable: false),
                    signing_excludes_own_runs = table.Column<bool>(type: "boolean", nullable: false),
                    retests_allowed = table.Column<int>(type: "integer", nullable: true),
                    decision_rule = table.Column<string>(type: "text", nullable: false),
                    conditional_is_nonconforming = table.Column<bool>(type: "boolean", nullable: false),
                    inverting = table.Column<bool>(type: "boolean", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_device_setting", x => x.id);
                    table.CheckConstraint("ck_device_setting_decision_rule", "decision_rule in ('simple', 'guarded', 'fourOutcomes')");
                    table.CheckConstraint("ck_device_setting_retests_allowed", "retests_allowed >= 0");
                    table.ForeignKey(
                        name: "fk_device_setting_device_device_id",
                        column: x => x.device_id,
                        principalTable: "device",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "lot",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    device_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<string>(type: "text", nullable: false, collation: "C"),
                    size = table.Column<int>(type: "integer", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_lot", x => x.id);
                    table.CheckConstraint("ck_lot_number", "number <> ''");
                    table.CheckConstraint("ck_lot_size", "size > 0");
                    table.ForeignKey(
                        name: "fk_lot_device_device_id",
                        column: x => x.device_id,
                        principalTable: "device",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "unit",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    device_id = table.Column<Guid>(type: "uuid", nullable: false),
                    serial = table.Column<string>(type: "text", nullable: false, collation: "C"),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_unit", x => x.id);
                    table.CheckConstraint("ck_unit_serial", "serial <> ''");
                    table.ForeignKey(
                        name: "fk_unit_device_device_id",
                        column: x => x.device_id,
                        principalTable: "device",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "ledger_position",
                columns: table => new
                {
                    position = table.Column<long>(type: "bigint", nullable: false),
                    entry_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_ledger_position", x => x.position);
                    table.CheckConstraint("ck_ledger_position_position", "position >= 0");
                    table.ForeignKey(
                        name: "fk_ledger_position_ledger_entry_entry_id",
                        column: x => x.entry_id,
                        principalTable: "ledger_entry",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "ledger_queue",
                columns: table => new
                {
                    no = table.Column<long>(type: "bigint", nullable: false)
                        .Annotation("Npgsql:ValueGenerationStrategy", NpgsqlValueGenerationStrategy.IdentityAlwaysColumn),
                    entry_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_ledger_queue", x => x.no);
                    table.ForeignKey(
                        name: "fk_ledger_queue_ledger_entry_entry_id",
                        column: x => x.entry_id,
                        principalTable: "ledger_entry",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "person_claim",
                columns: table => new
                {
                    id = table.Column<int>(type: "integer", nullable: false)
                        .Annotation("Npgsql:ValueGenerationStrategy", NpgsqlValueGenerationStrategy.IdentityByDefaultColumn),
                    user_id = table.Column<Guid>(type: "uuid", nullable: false),
                    claim_type = table.Column<string>(type: "text", nullable: true),
                    claim_value = table.Column<string>(type: "text", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_person_claim", x => x.id);
                    table.ForeignKey(
                        name: "fk_person_claim_person_user_id",
                        column: x => x.user_id,
                        principalTable: "person",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Cascade);
                });

            migrationBuilder.CreateTable(
                name: "person_login",
                columns: table => new
                {
                    login_provider = table.Column<string>(type: "text", nullable: false),
                    provider_key = table.Column<string>(type: "text", nullable: false),
                    provider_display_name = table.Column<string>(type: "text", nullable: true),
                    user_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_person_login", x => new { x.login_provider, x.provider_key });
                    table.ForeignKey(
                        name: "fk_person_login_person_user_id",
                        column: x => x.user_id,
                        principalTable: "person",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Cascade);
                });

            migrationBuilder.CreateTable(
                name: "person_token",
                columns: table => new
                {
                    user_id = table.Column<Guid>(type: "uuid", nullable: false),
                    login_provider = table.Column<string>(type: "text", nullable: false),
                    name = table.Column<string>(type: "text", nullable: false),
                    value = table.Column<string>(type: "text", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_person_token", x => new { x.user_id, x.login_provider, x.name });
                    table.ForeignKey(
                        name: "fk_person_token_person_user_id",
                        column: x => x.user_id,
                        principalTable: "person",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Cascade);
                });

            migrationBuilder.CreateTable(
                name: "person_role",
                columns: table => new
                {
                    user_id = table.Column<Guid>(type: "uuid", nullable: false),
                    role_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_person_role", x => new { x.user_id, x.role_id });
                    table.ForeignKey(
                        name: "fk_person_role_person_user_id",
                        column: x => x.user_id,
                        principalTable: "person",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Cascade);
                    table.ForeignKey(
                        name: "fk_person_role_role_role_id",
                        column: x => x.role_id,
                        principalTable: "role",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Cascade);
                });

            migrationBuilder.CreateTable(
                name: "role_claim",
                columns: table => new
                {
                    id = table.Column<int>(type: "integer", nullable: false)
                        .Annotation("Npgsql:ValueGenerationStrategy", NpgsqlValueGenerationStrategy.IdentityByDefaultColumn),
                    role_id = table.Column<Guid>(type: "uuid", nullable: false),
                    claim_type = table.Column<string>(type: "text", nullable: true),
                    claim_value = table.Column<string>(type: "text", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_role_claim", x => x.id);
                    table.ForeignKey(
                        name: "fk_role_claim_role_role_id",
                        column: x => x.role_id,
                        principalTable: "role",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Cascade);
                });

            migrationBuilder.CreateTable(
                name: "token_binding",
                columns: table => new
                {
                    token_id = table.Column<Guid>(type: "uuid", nullable: false),
                    bench_id = table.Column<Guid>(type: "uuid", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_token_binding", x => x.token_id);
                    table.ForeignKey(
                        name: "fk_token_binding_bench_bench_id",
                        column: x => x.bench_id,
                        principalTable: "bench",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_token_binding_bench_token_token_id",
                        column: x => x.token_id,
                        principalTable: "bench_token",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "token_revocation",
                columns: table => new
                {
                    token_id = table.Column<Guid>(type: "uuid", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_token_revocation", x => x.token_id);
                    table.ForeignKey(
                        name: "fk_token_revocation_bench_token_token_id",
                        column: x => x.token_id,
                        principalTable: "bench_token",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "mask",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    device_id = table.Column<Guid>(type: "uuid", nullable: false),
                    condition_id = table.Column<Guid>(type: "uuid", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_mask", x => x.id);
                    table.ForeignKey(
                        name: "fk_mask_condition_condition_id",
                        column: x => x.condition_id,
                        principalTable: "condition",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_mask_device_device_id",
                        column: x => x.device_id,
                        principalTable: "device",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "decision",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    lot_id = table.Column<Guid>(type: "uuid", nullable: false),
                    ordinal = table.Column<int>(type: "integer", nullable: false),
                    kind = table.Column<string>(type: "text", nullable: false),
                    reason = table.Column<string>(type: "text", nullable: false),
                    record = table.Column<byte[]>(type: "bytea", nullable: false),
                    sha256 = table.Column<byte[]>(type: "bytea", nullable: false),
                    needs_second_signature = table.Column<bool>(type: "boolean", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_decision", x => x.id);
                    table.CheckConstraint("ck_decision_kind", "kind in ('approve', 'approveWithConcession', 'reject')");
                    table.CheckConstraint("ck_decision_ordinal", "ordinal >= 1");
                    table.CheckConstraint("ck_decision_sha256", "sha256 = sha256(record)");
                    table.ForeignKey(
                        name: "fk_decision_lot_lot_id",
                        column: x => x.lot_id,
                        principalTable: "lot",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "disposition",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    lot_id = table.Column<Guid>(type: "uuid", nullable: false),
                    unit_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<int>(type: "integer", nullable: false),
                    kind = table.Column<string>(type: "text", nullable: false),
                    reason = table.Column<string>(type: "text", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_disposition", x => x.id);
                    table.CheckConstraint("ck_disposition_kind", "kind in ('rework', 'scrap', 'return', 'concession')");
                    table.ForeignKey(
                        name: "fk_disposition_lot_lot_id",
                        column: x => x.lot_id,
                        principalTable: "lot",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_disposition_unit_unit_id",
                        column: x => x.unit_id,
                        principalTable: "unit",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "lot_unit",
                columns: table => new
                {
                    lot_id = table.Column<Guid>(type: "uuid", nullable: false),
                    unit_id = table.Column<Guid>(type: "uuid", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_lot_unit", x => new { x.lot_id, x.unit_id });
                    table.ForeignKey(
                        name: "fk_lot_unit_lot_lot_id",
                        column: x => x.lot_id,
                        principalTable: "lot",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_lot_unit_unit_unit_id",
                        column: x => x.unit_id,
                        principalTable: "unit",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "run",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    received_no = table.Column<long>(type: "bigint", nullable: false)
                        .Annotation("Npgsql:ValueGenerationStrategy", NpgsqlValueGenerationStrategy.IdentityAlwaysColumn),
                    device_id = table.Column<Guid>(type: "uuid", nullable: false),
                    unit_id = table.Column<Guid>(type: "uuid", nullable: false),
                    lot_id = table.Column<Guid>(type: "uuid", nullable: true),
                    bench_id = table.Column<Guid>(type: "uuid", nullable: false),
                    purpose = table.Column<string>(type: "text", nullable: false),
                    files_digest = table.Column<byte[]>(type: "bytea", nullable: false),
                    measured_at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    circumstances = table.Column<string>(type: "text", nullable: true),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: true),
                    token_id = table.Column<Guid>(type: "uuid", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_run", x => x.id);
                    table.CheckConstraint("ck_run_files_digest", "octet_length(files_digest) = 32");
                    table.CheckConstraint("ck_run_lot", "purpose <> 'production' or lot_id is not null");
                    table.CheckConstraint("ck_run_purpose", "purpose in ('production', 'golden', 'through', 'check', 'study')");
                    table.CheckConstraint("ck_run_sender", "num_nonnulls(by_id, token_id) <= 1");
                    table.ForeignKey(
                        name: "fk_run_bench_bench_id",
                        column: x => x.bench_id,
                        principalTable: "bench",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_run_bench_token_token_id",
                        column: x => x.token_id,
                        principalTable: "bench_token",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_run_device_device_id",
                        column: x => x.device_id,
                        principalTable: "device",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_run_lot_lot_id",
                        column: x => x.lot_id,
                        principalTable: "lot",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_run_unit_unit_id",
                        column: x => x.unit_id,
                        principalTable: "unit",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "mask_draft",
                columns: table => new
                {
                    mask_id = table.Column<Guid>(type: "uuid", nullable: false),
                    condition_id = table.Column<Guid>(type: "uuid", nullable: false),
                    document = table.Column<string>(type: "text", nullable: false),
                    version = table.Column<int>(type: "integer", nullable: false),
                    changed_at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    changed_by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_mask_draft", x => x.mask_id);
                    table.ForeignKey(
                        name: "fk_mask_draft_condition_condition_id",
                        column: x => x.condition_id,
                        principalTable: "condition",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_mask_draft_mask_mask_id",
                        column: x => x.mask_id,
                        principalTable: "mask",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "mask_revision",
                columns: table => new
                {
                    mask_id = table.Column<Guid>(type: "uuid", nullable: false),
                    device_id = table.Column<Guid>(type: "uuid", nullable: false),
                    condition_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<int>(type: "integer", nullable: false),
                    document = table.Column<byte[]>(type: "bytea", nullable: false),
                    sha256 = table.Column<byte[]>(type: "bytea", nullable: false),
                    reason = table.Column<string>(type: "text", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_mask_revision", x => x.mask_id);
                    table.CheckConstraint("ck_mask_revision_number", "number >= 1");
                    table.CheckConstraint("ck_mask_revision_sha256", "sha256 = sha256(document)");
                    table.ForeignKey(
                        name: "fk_mask_revision_condition_condition_id",
                        column: x => x.condition_id,
                        principalTable: "condition",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_mask_revision_device_device_id",
                        column: x => x.device_id,
                        principalTable: "device",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_mask_revision_mask_mask_id",
                        column: x => x.mask_id,
                        principalTable: "mask",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "reopening",
                columns: table => new
                {
                    decision_id = table.Column<Guid>(type: "uuid", nullable: false),
                    lot_id = table.Column<Guid>(type: "uuid", nullable: false),
                    reason = table.Column<string>(type: "text", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_reopening", x => x.decision_id);
                    table.ForeignKey(
                        name: "fk_reopening_decision_decision_id",
                        column: x => x.decision_id,
                        principalTable: "decision",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_reopening_lot_lot_id",
                        column: x => x.lot_id,
                        principalTable: "lot",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "second_signature",
                columns: table => new
                {
                    decision_id = table.Column<Guid>(type: "uuid", nullable: false),
                    record = table.Column<byte[]>(type: "bytea", nullable: false),
                    sha256 = table.Column<byte[]>(type: "bytea", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_second_signature", x => x.decision_id);
                    table.CheckConstraint("ck_second_signature_sha256", "sha256 = sha256(record)");
                    table.ForeignKey(
                        name: "fk_second_signature_decision_decision_id",
                        column: x => x.decision_id,
                        principalTable: "decision",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "reading",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    run_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<int>(type: "integer", nullable: false),
                    reader = table.Column<string>(type: "text", nullable: false),
                    reader_version = table.Column<int>(type: "integer", nullable: false),
                    columns = table.Column<string>(type: "text", nullable: true),
                    through_reading_id = table.Column<Guid>(type: "uuid", nullable: true),
                    noise_floor_db = table.Column<double>(type: "double precision", nullable: true),
                    grid_sha256 = table.Column<byte[]>(type: "bytea", nullable: false),
                    form = table.Column<short>(type: "smallint", nullable: false),
                    points = table.Column<int>(type: "integer", nullable: false),
                    notes = table.Column<string>(type: "text", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_reading", x => x.id);
                    table.CheckConstraint("ck_reading_form", "form between 1 and 5");
                    table.CheckConstraint("ck_reading_points", "points >= 2");
                    table.ForeignKey(
                        name: "fk_reading_grid_grid_sha256",
                        column: x => x.grid_sha256,
                        principalTable: "grid",
                        principalColumn: "sha256",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_reading_reading_through_reading_id",
                        column: x => x.through_reading_id,
                        principalTable: "reading",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_reading_runs_run_id",
                        column: x => x.run_id,
                        principalTable: "run",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "run_assignment",
                columns: table => new
                {
                    run_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<int>(type: "integer", nullable: false),
                    unit_id = table.Column<Guid>(type: "uuid", nullable: false),
                    lot_id = table.Column<Guid>(type: "uuid", nullable: true),
                    condition_id = table.Column<Guid>(type: "uuid", nullable: false),
                    reason = table.Column<string>(type: "text", nullable: true),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_run_assignment", x => new { x.run_id, x.number });
                    table.CheckConstraint("ck_run_assignment_number", "number >= 0");
                    table.ForeignKey(
                        name: "fk_run_assignment_condition_condition_id",
                        column: x => x.condition_id,
                        principalTable: "condition",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_run_assignment_lot_lot_id",
                        column: x => x.lot_id,
                        principalTable: "lot",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_run_assignment_run_run_id",
                        column: x => x.run_id,
                        principalTable: "run",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_run_assignment_unit_unit_id",
                        column: x => x.unit_id,
                        principalTable: "unit",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "run_file",
                columns: table => new
                {
                    run_id = table.Column<Guid>(type: "uuid", nullable: false),
                    ordinal = table.Column<int>(type: "integer", nullable: false),
                    sha256 = table.Column<byte[]>(type: "bytea", nullable: false),
                    name = table.Column<string>(type: "text", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_run_file", x => new { x.run_id, x.ordinal });
                    table.CheckConstraint("ck_run_file_ordinal", "ordinal >= 0");
                    table.ForeignKey(
                        name: "fk_run_file_file_sha256",
                        column: x => x.sha256,
                        principalTable: "file",
                        principalColumn: "sha256",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_run_file_run_run_id",
                        column: x => x.run_id,
                        principalTable: "run",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "run_invalidation",
                columns: table => new
                {
                    run_id = table.Column<Guid>(type: "uuid", nullable: false),
                    cause = table.Column<string>(type: "text", nullable: false),
                    reason = table.Column<string>(type: "text", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_run_invalidation", x => x.run_id);
                    table.ForeignKey(
                        name: "fk_run_invalidation_run_run_id",
                        column: x => x.run_id,
                        principalTable: "run",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "basis",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    condition_id = table.Column<Guid>(type: "uuid", nullable: false),
                    mask_id = table.Column<Guid>(type: "uuid", nullable: false),
                    golden_reading_id = table.Column<Guid>(type: "uuid", nullable: true),
                    golden_uncertainty_id = table.Column<Guid>(type: "uuid", nullable: true),
                    decision_rule = table.Column<string>(type: "text", nullable: false),
                    engine_version = table.Column<int>(type: "integer", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_basis", x => x.id);
                    table.CheckConstraint("ck_basis_decision_rule", "decision_rule <> '' and engine_version >= 1");
                    table.ForeignKey(
                        name: "fk_basis_bench_uncertainty_golden_uncertainty_id",
                        column: x => x.golden_uncertainty_id,
                        principalTable: "bench_uncertainty",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_basis_condition_condition_id",
                        column: x => x.condition_id,
                        principalTable: "condition",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_basis_mask_revision_mask_id",
                        column: x => x.mask_id,
                        principalTable: "mask_revision",
                        principalColumn: "mask_id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_basis_reading_golden_reading_id",
                        column: x => x.golden_reading_id,
                        principalTable: "reading",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "curve",
                columns: table => new
                {
                    reading_id = table.Column<Guid>(type: "uuid", nullable: false),
                    planes = table.Column<byte[]>(type: "bytea", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_curve", x => x.reading_id);
                    table.CheckConstraint("ck_curve_planes", "octet_length(planes) >= 16 and octet_length(planes) % 8 = 0");
                    table.ForeignKey(
                        name: "fk_curve_reading_reading_id",
                        column: x => x.reading_id,
                        principalTable: "reading",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "golden_choice",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    device_id = table.Column<Guid>(type: "uuid", nullable: false),
                    condition_id = table.Column<Guid>(type: "uuid", nullable: false),
                    number = table.Column<int>(type: "integer", nullable: false),
                    run_id = table.Column<Guid>(type: "uuid", nullable: false),
                    reading_id = table.Column<Guid>(type: "uuid", nullable: false),
                    reason = table.Column<string>(type: "text", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false),
                    by_id = table.Column<Guid>(type: "uuid", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_golden_choice", x => x.id);
                    table.ForeignKey(
                        name: "fk_golden_choice_condition_condition_id",
                        column: x => x.condition_id,
                        principalTable: "condition",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_golden_choice_device_device_id",
                        column: x => x.device_id,
                        principalTable: "device",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_golden_choice_readings_reading_id",
                        column: x => x.reading_id,
                        principalTable: "reading",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_golden_choice_runs_run_id",
                        column: x => x.run_id,
                        principalTable: "run",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "verdict",
                columns: table => new
                {
                    id = table.Column<Guid>(type: "uuid", nullable: false),
                    reading_id = table.Column<Guid>(type: "uuid", nullable: false),
                    basis_id = table.Column<Guid>(type: "uuid", nullable: false),
                    uncertainty_id = table.Column<Guid>(type: "uuid", nullable: true),
                    outcome = table.Column<short>(type: "smallint", nullable: false),
                    worst_index = table.Column<short>(type: "smallint", nullable: true),
                    margins = table.Column<double?[]>(type: "double precision[]", nullable: false),
                    outcomes = table.Column<short[]>(type: "smallint[]", nullable: false),
                    frequencies_hz = table.Column<double?[]>(type: "double precision[]", nullable: false),
                    reasons = table.Column<string[]>(type: "text[]", nullable: false),
                    at = table.Column<DateTimeOffset>(type: "timestamp with time zone", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_verdict", x => x.id);
                    table.CheckConstraint("ck_verdict_criteria", "cardinality(margins) = cardinality(outcomes) and cardinality(frequencies_hz) = cardinality(outcomes) and cardinality(reasons) = cardinality(outcomes)");
                    table.CheckConstraint("ck_verdict_finite", "not ('NaN' = any (margins) or 'Infinity' = any (margins) or '-Infinity' = any (margins)) and not ('NaN' = any (frequencies_hz) or 'Infinity' = any (frequencies_hz) or '-Infinity' = any (frequencies_hz))");
                    table.CheckConstraint("ck_verdict_outcome", "outcome between 0 and 4 and 0 <= all (outcomes) and 4 >= all (outcomes)");
                    table.CheckConstraint("ck_verdict_worst_index", "worst_index >= 0 and worst_index < cardinality(outcomes)");
                    table.ForeignKey(
                        name: "fk_verdict_basis_basis_id",
                        column: x => x.basis_id,
                        principalTable: "basis",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_verdict_bench_uncertainty_uncertainty_id",
                        column: x => x.uncertainty_id,
                        principalTable: "bench_uncertainty",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_verdict_reading_reading_id",
                        column: x => x.reading_id,
                        principalTable: "reading",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "decision_verdict",
                columns: table => new
                {
                    decision_id = table.Column<Guid>(type: "uuid", nullable: false),
                    unit_id = table.Column<Guid>(type: "uuid", nullable: false),
                    condition_id = table.Column<Guid>(type: "uuid", nullable: false),
                    run_id = table.Column<Guid>(type: "uuid", nullable: false),
                    reading_id = table.Column<Guid>(type: "uuid", nullable: false),
                    verdict_id = table.Column<Guid>(type: "uuid", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("pk_decision_verdict", x => new { x.decision_id, x.unit_id, x.condition_id });
                    table.ForeignKey(
                        name: "fk_decision_verdict_condition_condition_id",
                        column: x => x.condition_id,
                        principalTable: "condition",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_decision_verdict_decision_decision_id",
                        column: x => x.decision_id,
                        principalTable: "decision",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_decision_verdict_readings_reading_id",
                        column: x => x.reading_id,
                        principalTable: "reading",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_decision_verdict_runs_run_id",
                        column: x => x.run_id,
                        principalTable: "run",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_decision_verdict_unit_unit_id",
                        column: x => x.unit_id,
                        principalTable: "unit",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "fk_decision_verdict_verdicts_verdict_id",
                        column: x => x.verdict_id,
                        principalTable: "verdict",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateIndex(
                name: "ix_basis_condition_id_mask_id_golden_reading_id_golden_uncerta",
                table: "basis",
                columns: new[] { "condition_id", "mask_id", "golden_reading_id", "golden_uncertainty_id", "decision_rule", "engine_version" },
                unique: true)
                .Annotation("Npgsql:NullsDistinct", false);

            migrationBuilder.CreateIndex(
                name: "ix_basis_golden_reading_id",
                table: "basis",
                column: "golden_reading_id");

            migrationBuilder.CreateIndex(
                name: "ix_basis_golden_uncertainty_id",
                table: "basis",
                column: "golden_uncertainty_id");

            migrationBuilder.CreateIndex(
                name: "ix_basis_mask_id",
                table: "basis",
                column: "mask_id");

            migrationBuilder.CreateIndex(
                name: "ix_bench_name",
                table: "bench",
                column: "name",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_bench_columns_bench_id_heads_digest_at",
                table: "bench_columns",
                columns: new[] { "bench_id", "heads_digest", "at" });

            migrationBuilder.CreateIndex(
                name: "ix_bench_setting_bench_id_number",
                table: "bench_setting",
                columns: new[] { "bench_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_bench_token_bench_id",
                table: "bench_token",
                column: "bench_id");

            migrationBuilder.CreateIndex(
                name: "ix_bench_uncertainty_bench_id_number",
                table: "bench_uncertainty",
                columns: new[] { "bench_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_condition_device_id_name",
                table: "condition",
                columns: new[] { "device_id", "name" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_condition_device_id_ordinal",
                table: "condition",
                columns: new[] { "device_id", "ordinal" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_decision_lot_id_ordinal",
                table: "decision",
                columns: new[] { "lot_id", "ordinal" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_decision_verdict_condition_id",
                table: "decision_verdict",
                column: "condition_id");

            migrationBuilder.CreateIndex(
                name: "ix_decision_verdict_reading_id",
                table: "decision_verdict",
                column: "reading_id");

            migrationBuilder.CreateIndex(
                name: "ix_decision_verdict_run_id",
                table: "decision_verdict",
                column: "run_id");

            migrationBuilder.CreateIndex(
                name: "ix_decision_verdict_unit_id",
                table: "decision_verdict",
                column: "unit_id");

            migrationBuilder.CreateIndex(
                name: "ix_decision_verdict_verdict_id",
                table: "decision_verdict",
                column: "verdict_id");

            migrationBuilder.CreateIndex(
                name: "ix_device_part_number_revision",
                table: "device",
                columns: new[] { "part_number", "revision" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_device_setting_device_id_number",
                table: "device_setting",
                columns: new[] { "device_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_disposition_lot_id_unit_id_number",
                table: "disposition",
                columns: new[] { "lot_id", "unit_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_disposition_unit_id",
                table: "disposition",
                column: "unit_id");

            migrationBuilder.CreateIndex(
                name: "ix_golden_choice_condition_id_number",
                table: "golden_choice",
                columns: new[] { "condition_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_golden_choice_device_id",
                table: "golden_choice",
                column: "device_id");

            migrationBuilder.CreateIndex(
                name: "ix_golden_choice_reading_id",
                table: "golden_choice",
                column: "reading_id");

            migrationBuilder.CreateIndex(
                name: "ix_golden_choice_run_id",
                table: "golden_choice",
                column: "run_id");

            migrationBuilder.CreateIndex(
                name: "ix_ledger_position_entry_id",
                table: "ledger_position",
                column: "entry_id",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_ledger_queue_entry_id",
                table: "ledger_queue",
                column: "entry_id",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_lot_device_id_number",
                table: "lot",
                columns: new[] { "device_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_lot_number",
                table: "lot",
                column: "number");

            migrationBuilder.CreateIndex(
                name: "ix_lot_unit_unit_id",
                table: "lot_unit",
                column: "unit_id");

            migrationBuilder.CreateIndex(
                name: "ix_mask_condition_id",
                table: "mask",
                column: "condition_id");

            migrationBuilder.CreateIndex(
                name: "ix_mask_device_id",
                table: "mask",
                column: "device_id");

            migrationBuilder.CreateIndex(
                name: "ix_mask_draft_condition_id",
                table: "mask_draft",
                column: "condition_id",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_mask_revision_condition_id_number",
                table: "mask_revision",
                columns: new[] { "condition_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_mask_revision_device_id",
                table: "mask_revision",
                column: "device_id");

            migrationBuilder.CreateIndex(
                name: "EmailIndex",
                table: "person",
                column: "normalized_email");

            migrationBuilder.CreateIndex(
                name: "UserNameIndex",
                table: "person",
                column: "normalized_user_name",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_person_claim_user_id",
                table: "person_claim",
                column: "user_id");

            migrationBuilder.CreateIndex(
                name: "ix_person_login_user_id",
                table: "person_login",
                column: "user_id");

            migrationBuilder.CreateIndex(
                name: "ix_person_role_role_id",
                table: "person_role",
                column: "role_id");

            migrationBuilder.CreateIndex(
                name: "ix_reading_grid_sha256",
                table: "reading",
                column: "grid_sha256");

            migrationBuilder.CreateIndex(
                name: "ix_reading_run_id_number",
                table: "reading",
                columns: new[] { "run_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_reading_through_reading_id",
                table: "reading",
                column: "through_reading_id");

            migrationBuilder.CreateIndex(
                name: "ix_reopening_lot_id",
                table: "reopening",
                column: "lot_id");

            migrationBuilder.CreateIndex(
                name: "RoleNameIndex",
                table: "role",
                column: "normalized_name",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_role_claim_role_id",
                table: "role_claim",
                column: "role_id");

            migrationBuilder.CreateIndex(
                name: "ix_run_bench_id_received_no",
                table: "run",
                columns: new[] { "bench_id", "received_no" });

            migrationBuilder.CreateIndex(
                name: "ix_run_device_id_received_no",
                table: "run",
                columns: new[] { "device_id", "received_no" });

            migrationBuilder.CreateIndex(
                name: "ix_run_lot_id_files_digest",
                table: "run",
                columns: new[] { "lot_id", "files_digest" });

            migrationBuilder.CreateIndex(
                name: "ix_run_received_no",
                table: "run",
                column: "received_no",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_run_token_id",
                table: "run",
                column: "token_id");

            migrationBuilder.CreateIndex(
                name: "ix_run_unit_id_lot_id_purpose_files_digest",
                table: "run",
                columns: new[] { "unit_id", "lot_id", "purpose", "files_digest" },
                unique: true)
                .Annotation("Npgsql:NullsDistinct", false);

            migrationBuilder.CreateIndex(
                name: "ix_run_assignment_condition_id",
                table: "run_assignment",
                column: "condition_id");

            migrationBuilder.CreateIndex(
                name: "ix_run_assignment_lot_id_unit_id_condition_id",
                table: "run_assignment",
                columns: new[] { "lot_id", "unit_id", "condition_id" });

            migrationBuilder.CreateIndex(
                name: "ix_run_assignment_unit_id",
                table: "run_assignment",
                column: "unit_id");

            migrationBuilder.CreateIndex(
                name: "ix_run_file_sha256",
                table: "run_file",
                column: "sha256");

            migrationBuilder.CreateIndex(
                name: "ix_token_binding_bench_id",
                table: "token_binding",
                column: "bench_id");

            migrationBuilder.CreateIndex(
                name: "ix_unit_device_id_serial",
                table: "unit",
                columns: new[] { "device_id", "serial" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_unit_serial",
                table: "unit",
                column: "serial");

            migrationBuilder.CreateIndex(
                name: "ix_verdict_basis_id",
                table: "verdict",
                column: "basis_id");

            migrationBuilder.CreateIndex(
                name: "ix_verdict_reading_id_basis_id_uncertainty_id",
                table: "verdict",
                columns: new[] { "reading_id", "basis_id", "uncertainty_id" },
                unique: true)
                .Annotation("Npgsql:NullsDistinct", false);

            migrationBuilder.CreateIndex(
                name: "ix_verdict_uncertainty_id",
                table: "verdict",
                column: "uncertainty_id");

            Keep(migrationBuilder);
        }

        /// <inheritdoc />
        protected override void Down(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.DropTable(
                name: "bench_columns");

            migrationBuilder.DropTable(
                name: "bench_setting");

            migrationBuilder.DropTable(
                name: "curve");

            migrationBuilder.DropTable(
                name: "data_protection_key");

            migrationBuilder.DropTable(
                name: "decision_verdict");

            migrationBuilder.DropTable(
                name: "device_setting");

            migrationBuilder.DropTable(
                name: "disposition");

            migrationBuilder.DropTable(
                name: "golden_choice");

            migrationBuilder.DropTable(
                name: "ledger_position");

            migrationBuilder.DropTable(
                name: "ledger_queue");

            migrationBuilder.DropTable(
                name: "lot_unit");

            migrationBuilder.DropTable(
                name: "mask_draft");

            migrationBuilder.DropTable(
                name: "person_claim");

            migrationBuilder.DropTable(
                name: "person_login");

            migrationBuilder.DropTable(
                name: "person_role");

            migrationBuilder.DropTable(
                name: "person_token");

            migrationBuilder.DropTable(
                name: "reopening");

            migrationBuilder.DropTable(
                name: "role_claim");

            migrationBuilder.DropTable(
                name: "run_assignment");

            migrationBuilder.DropTable(
                name: "run_file");

            migrationBuilder.DropTable(
                name: "run_invalidation");

            migrationBuilder.DropTable(
                name: "second_signature");

            migrationBuilder.DropTable(
                name: "token_binding");

            migrationBuilder.DropTable(
                name: "token_revocation");

            migrationBuilder.DropTable(
                name: "verdict");

            migrationBuilder.DropTable(
                name: "ledger_entry");

            migrationBuilder.DropTable(
                name: "person");

            migrationBuilder.DropTable(
                name: "role");

            migrationBuilder.DropTable(
                name: "file");

            migrationBuilder.DropTable(
                name: "decision");

            migrationBuilder.DropTable(
                name: "basis");

            migrationBuilder.DropTable(
                name: "bench_uncertainty");

            migrationBuilder.DropTable(
                name: "mask_revision");

            migrationBuilder.DropTable(
                name: "reading");

            migrationBuilder.DropTable(
                name: "mask");

            migrationBuilder.DropTable(
                name: "grid");

            migrationBuilder.DropTable(
                name: "run");

            migrationBuilder.DropTable(
                name: "condition");

            migrationBuilder.DropTable(
                name: "bench_token");

            migrationBuilder.DropTable(
                name: "lot");

            migrationBuilder.DropTable(
                name: "unit");

            migrationBuilder.DropTable(
                name: "bench");

            migrationBuilder.DropTable(
                name: "device");

            Unkeep(migrationBuilder);
        }
    }
}
