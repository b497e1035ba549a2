using Microsoft.EntityFrameworkCore.Migrations;

#nullable disable

namespace Campaigns.Migrations.Sqlite.Migrations
{
    /// <inheritdoc />
    public partial class ErrorControl : Migration
    {
        /// <inheritdoc />
        protected override void Up(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.AddColumn<string>(
                name: "confirms",
                table: "experiments",
                type: "TEXT",
                nullable: true);

            migrationBuilder.AddColumn<string>(
                name: "shared_control",
                table: "experiments",
                type: "TEXT",
                nullable: true);

            migrationBuilder.CreateTable(
                name: "families",
                columns: table => new
                {
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    name = table.Column<string>(type: "TEXT", nullable: false),
                    correction = table.Column<string>(type: "TEXT", nullable: true),
                    level = table.Column<double>(type: "REAL", nullable: true),
                    opens_after = table.Column<string>(type: "TEXT", nullable: true),
                    opens_when = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_families", x => new { x.campaign_id, x.position });
                    table.CheckConstraint("ck_families_level", "level is null or (level > 0 and level < 1)");
                    table.CheckConstraint("ck_families_name", "length(name) > 0");
                    table.CheckConstraint("ck_families_opens", "opens_when in ('any', 'all') and opens_after is not name");
                    table.CheckConstraint("ck_families_position", "position > 0");
                    table.ForeignKey(
                        name: "FK_families_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "online_settings",
                columns: table => new
                {
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false),
                    horizon = table.Column<int>(type: "INTEGER", nullable: true),
                    shape = table.Column<string>(type: "TEXT", nullable: true),
                    initial_wealth = table.Column<double>(type: "REAL", nullable: true),
                    lambda = table.Column<double>(type: "REAL", nullable: true),
                    tau = table.Column<double>(type: "REAL", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_online_settings", x => x.campaign_id);
                    table.CheckConstraint("ck_online_settings_horizon", "horizon is null or horizon >= 0");
                    table.ForeignKey(
                        name: "FK_online_settings_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "review_families",
                columns: table => new
                {
                    review_id = table.Column<long>(type: "INTEGER", nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    name = table.Column<string>(type: "TEXT", nullable: false),
                    correction = table.Column<string>(type: "TEXT", nullable: false),
                    level = table.Column<double>(type: "REAL", nullable: false),
                    family_size = table.Column<int>(type: "INTEGER", nullable: false),
                    planned_count = table.Column<int>(type: "INTEGER", nullable: false),
                    tested_count = table.Column<int>(type: "INTEGER", nullable: false),
                    survivor_count = table.Column<int>(type: "INTEGER", nullable: false),
                    is_open = table.Column<bool>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_review_families", x => new { x.review_id, x.position });
                    table.CheckConstraint("ck_review_families_counts", "tested_count between 0 and family_size and family_size <= planned_count and survivor_count between 0 and tested_count");
                    table.CheckConstraint("ck_review_families_level", "level > 0 and level < 1");
                    table.CheckConstraint("ck_review_families_open", "is_open in (0, 1) and (is_open = 1 or survivor_count = 0)");
                    table.ForeignKey(
                        name: "FK_review_families_reviews_review_id",
                        column: x => x.review_id,
                        principalTable: "reviews",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "streams",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false),
                    number = table.Column<int>(type: "INTEGER", nullable: false),
                    procedure = table.Column<string>(type: "TEXT", nullable: false),
                    level = table.Column<double>(type: "REAL", nullable: false),
                    horizon = table.Column<int>(type: "INTEGER", nullable: true),
                    shape = table.Column<string>(type: "TEXT", nullable: false),
                    initial_wealth = table.Column<double>(type: "REAL", nullable: true),
                    lambda = table.Column<double>(type: "REAL", nullable: true),
                    tau = table.Column<double>(type: "REAL", nullable: true),
                    reason = table.Column<string>(type: "TEXT", nullable: true),
                    started_at = table.Column<long>(type: "INTEGER", nullable: false),
                    program_version = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_streams", x => x.id);
                    table.CheckConstraint("ck_streams_horizon", "horizon is null or horizon > 0");
                    table.CheckConstraint("ck_streams_level", "level > 0 and level < 1");
                    table.CheckConstraint("ck_streams_number", "number > 0");
                    table.CheckConstraint("ck_streams_reason", "(reason is null) = (number = 1) and (reason is null or length(reason) > 0)");
                    table.ForeignKey(
                        name: "FK_streams_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "stream_entries",
                columns: table => new
                {
                    stream_id = table.Column<long>(type: "INTEGER", nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    experiment_id = table.Column<long>(type: "INTEGER", nullable: false),
                    level = table.Column<double>(type: "REAL", nullable: false),
                    known_count = table.Column<int>(type: "INTEGER", nullable: false),
                    registered_at = table.Column<long>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_stream_entries", x => new { x.stream_id, x.position });
                    table.CheckConstraint("ck_stream_entries_level", "level >= 0 and level < 1");
                    table.CheckConstraint("ck_stream_entries_position", "position > 0 and known_count between 0 and position - 1");
                    table.ForeignKey(
                        name: "FK_stream_entries_experiments_experiment_id",
                        column: x => x.experiment_id,
                        principalTable: "experiments",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "FK_stream_entries_streams_stream_id",
                        column: x => x.stream_id,
                        principalTable: "streams",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "standing_decisions",
                columns: table => new
                {
                    stream_id = table.Column<long>(type: "INTEGER", nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    known_order = table.Column<int>(type: "INTEGER", nullable: false),
                    test_run_id = table.Column<long>(type: "INTEGER", nullable: false),
                    p = table.Column<double>(type: "REAL", nullable: true),
                    log_p = table.Column<double>(type: "REAL", nullable: true),
                    survives = table.Column<bool>(type: "INTEGER", nullable: false),
                    decided_at = table.Column<long>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_standing_decisions", x => new { x.stream_id, x.position });
                    table.CheckConstraint("ck_standing_decisions_order", "known_order > 0");
                    table.CheckConstraint("ck_standing_decisions_p", "(p is null or (p >= 0 and p <= 1 and (p > 0 or log_p is not null))) and (log_p is null or (p is not null and log_p <= 0))");
                    table.CheckConstraint("ck_standing_decisions_survives", "survives in (0, 1) and (survives = 0 or p is not null)");
                    table.ForeignKey(
                        name: "FK_standing_decisions_stream_entries_stream_id_position",
                        columns: x => new { x.stream_id, x.position },
                        principalTable: "stream_entries",
                        principalColumns: new[] { "stream_id", "position" },
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "FK_standing_decisions_test_runs_test_run_id",
                        column: x => x.test_run_id,
                        principalTable: "test_runs",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateIndex(
                name: "ix_experiments_confirms",
                table: "experiments",
                column: "confirms",
                filter: "confirms is not null");

            migrationBuilder.CreateIndex(
                name: "ux_families_name",
                table: "families",
                columns: new[] { "campaign_id", "name" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ux_standing_decisions_order",
                table: "standing_decisions",
                columns: new[] { "stream_id", "known_order" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ux_stream_entries_experiment",
                table: "stream_entries",
                column: "experiment_id",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ux_streams_number",
                table: "streams",
                columns: new[] { "campaign_id", "number" },
                unique: true);

            migrationBuilder.Sql(ErrorControlByHand.Rules);
        }

        /// <inheritdoc />
        protected override void Down(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.DropTable(
                name: "families");

            migrationBuilder.DropTable(
                name: "online_settings");

            migrationBuilder.DropTable(
                name: "review_families");

            migrationBuilder.DropTable(
                name: "standing_decisions");

            migrationBuilder.DropTable(
                name: "stream_entries");

            migrationBuilder.DropTable(
                name: "streams");

            migrationBuilder.DropIndex(
                name: "ix_experiments_confirms",
                table: "experiments");

            migrationBuilder.DropColumn(
                name: "confirms",
                table: "experiments");

            migrationBuilder.DropColumn(
                name: "shared_control",
                table: "experiments");
        }
    }
}
