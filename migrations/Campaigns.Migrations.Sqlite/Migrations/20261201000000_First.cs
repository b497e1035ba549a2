using Microsoft.EntityFrameworkCore.Migrations;

#nullable disable

namespace Campaigns.Migrations.Sqlite.Migrations
{
    /// <inheritdoc />
    public partial class First : Migration
    {
        /// <inheritdoc />
        protected override void Up(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.CreateTable(
                name: "campaigns",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    code = table.Column<string>(type: "TEXT", nullable: false),
                    title = table.Column<string>(type: "TEXT", nullable: false),
                    purpose = table.Column<string>(type: "TEXT", nullable: false),
                    error_rate = table.Column<string>(type: "TEXT", nullable: false),
                    level = table.Column<double>(type: "REAL", nullable: false),
                    correction = table.Column<string>(type: "TEXT", nullable: false),
                    default_test = table.Column<string>(type: "TEXT", nullable: false),
                    default_follow_up = table.Column<string>(type: "TEXT", nullable: false),
                    is_exploratory = table.Column<bool>(type: "INTEGER", nullable: false),
                    opened_at = table.Column<long>(type: "INTEGER", nullable: false),
                    sealed_at = table.Column<long>(type: "INTEGER", nullable: true),
                    plan_digest = table.Column<string>(type: "TEXT", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_campaigns", x => x.id);
                    table.CheckConstraint("ck_campaigns_code", "length(code) > 0");
                    table.CheckConstraint("ck_campaigns_error_rate", "error_rate in ('familywise', 'false-discovery')");
                    table.CheckConstraint("ck_campaigns_exploratory", "is_exploratory in (0, 1)");
                    table.CheckConstraint("ck_campaigns_level", "level > 0 and level < 1");
                    table.CheckConstraint("ck_campaigns_sealed", "(sealed_at is null) = (plan_digest is null)");
                });

            migrationBuilder.CreateTable(
                name: "group_sets",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_group_sets", x => x.id);
                    table.ForeignKey(
                        name: "FK_group_sets_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "loads",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false),
                    file_name = table.Column<string>(type: "TEXT", nullable: false),
                    sha256 = table.Column<string>(type: "TEXT", nullable: false),
                    byte_count = table.Column<long>(type: "INTEGER", nullable: false),
                    row_count = table.Column<long>(type: "INTEGER", nullable: false),
                    missing_count = table.Column<long>(type: "INTEGER", nullable: false),
                    experiment_count = table.Column<int>(type: "INTEGER", nullable: false),
                    loaded_at = table.Column<long>(type: "INTEGER", nullable: false),
                    amendment_reason = table.Column<string>(type: "TEXT", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_loads", x => x.id);
                    table.CheckConstraint("ck_loads_counts", "byte_count >= 0 and row_count > 0 and missing_count between 0 and row_count and experiment_count > 0");
                    table.CheckConstraint("ck_loads_reason", "amendment_reason is null or length(amendment_reason) > 0");
                    table.CheckConstraint("ck_loads_sha256", "length(sha256) = 64");
                    table.ForeignKey(
                        name: "FK_loads_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "experiments",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false),
                    code = table.Column<string>(type: "TEXT", nullable: false),
                    title = table.Column<string>(type: "TEXT", nullable: true),
                    response = table.Column<string>(type: "TEXT", nullable: true),
                    unit = table.Column<string>(type: "TEXT", nullable: true),
                    group_set_id = table.Column<long>(type: "INTEGER", nullable: true),
                    groups_are_planned = table.Column<bool>(type: "INTEGER", nullable: false),
                    control = table.Column<string>(type: "TEXT", nullable: true),
                    test = table.Column<string>(type: "TEXT", nullable: false),
                    follow_up = table.Column<string>(type: "TEXT", nullable: false),
                    replicates = table.Column<int>(type: "INTEGER", nullable: true),
                    smallest_effect = table.Column<double>(type: "REAL", nullable: true),
                    assumed_sd = table.Column<double>(type: "REAL", nullable: true),
                    weight = table.Column<double>(type: "REAL", nullable: true),
                    family = table.Column<string>(type: "TEXT", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_experiments", x => x.id);
                    table.CheckConstraint("ck_experiments_assumed_sd", "assumed_sd is null or assumed_sd > 0");
                    table.CheckConstraint("ck_experiments_code", "length(code) > 0");
                    table.CheckConstraint("ck_experiments_groups_are_planned", "groups_are_planned in (0, 1) and (groups_are_planned = 0 or group_set_id is not null)");
                    table.CheckConstraint("ck_experiments_replicates", "replicates is null or replicates >= 2");
                    table.CheckConstraint("ck_experiments_smallest_effect", "smallest_effect is null or smallest_effect > 0");
                    table.CheckConstraint("ck_experiments_weight", "weight is null or weight >= 0");
                    table.ForeignKey(
                        name: "FK_experiments_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "FK_experiments_group_sets_group_set_id",
                        column: x => x.group_set_id,
                        principalTable: "group_sets",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "groups",
                columns: table => new
                {
                    group_set_id = table.Column<long>(type: "INTEGER", nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    label = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_groups", x => new { x.group_set_id, x.position });
                    table.CheckConstraint("ck_groups_label", "length(label) > 0");
                    table.CheckConstraint("ck_groups_position", "position >= 0 and position < 65536");
                    table.ForeignKey(
                        name: "FK_groups_group_sets_group_set_id",
                        column: x => x.group_set_id,
                        principalTable: "group_sets",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "test_runs",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false),
                    last_load_id = table.Column<long>(type: "INTEGER", nullable: true),
                    ran_at = table.Column<long>(type: "INTEGER", nullable: false),
                    includes_incomplete = table.Column<bool>(type: "INTEGER", nullable: false),
                    program_version = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_test_runs", x => x.id);
                    table.CheckConstraint("ck_test_runs_includes_incomplete", "includes_incomplete in (0, 1)");
                    table.ForeignKey(
                        name: "FK_test_runs_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "FK_test_runs_loads_last_load_id",
                        column: x => x.last_load_id,
                        principalTable: "loads",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.Sql(FirstByHand.Measurements);

            migrationBuilder.CreateTable(
                name: "reviews",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false),
                    number = table.Column<int>(type: "INTEGER", nullable: false),
                    taken_at = table.Column<long>(type: "INTEGER", nullable: false),
                    correction = table.Column<string>(type: "TEXT", nullable: false),
                    level = table.Column<double>(type: "REAL", nullable: false),
                    family_size = table.Column<int>(type: "INTEGER", nullable: false),
                    tested_count = table.Column<int>(type: "INTEGER", nullable: false),
                    survivor_count = table.Column<int>(type: "INTEGER", nullable: false),
                    is_interim = table.Column<bool>(type: "INTEGER", nullable: false),
                    last_test_run_id = table.Column<long>(type: "INTEGER", nullable: true),
                    program_version = table.Column<string>(type: "TEXT", nullable: false),
                    lines = table.Column<byte[]>(type: "BLOB", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_reviews", x => x.id);
                    table.CheckConstraint("ck_reviews_counts", "tested_count between 0 and family_size and survivor_count between 0 and tested_count");
                    table.CheckConstraint("ck_reviews_interim", "is_interim in (0, 1)");
                    table.CheckConstraint("ck_reviews_level", "level > 0 and level < 1");
                    table.CheckConstraint("ck_reviews_number", "number > 0");
                    table.ForeignKey(
                        name: "FK_reviews_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "FK_reviews_test_runs_last_test_run_id",
                        column: x => x.last_test_run_id,
                        principalTable: "test_runs",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.Sql(FirstByHand.TestResults);

            migrationBuilder.CreateIndex(
                name: "ux_campaigns_code",
                table: "campaigns",
                column: "code",
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_experiments_campaign",
                table: "experiments",
                column: "campaign_id");

            migrationBuilder.CreateIndex(
                name: "ux_experiments_code",
                table: "experiments",
                columns: new[] { "campaign_id", "code" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_group_sets_campaign",
                table: "group_sets",
                column: "campaign_id");

            migrationBuilder.CreateIndex(
                name: "ux_groups_label",
                table: "groups",
                columns: new[] { "group_set_id", "label" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ux_loads_sha256",
                table: "loads",
                columns: new[] { "campaign_id", "sha256" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_measurements_load",
                table: "measurements",
                column: "load_id");

            migrationBuilder.CreateIndex(
                name: "ux_reviews_number",
                table: "reviews",
                columns: new[] { "campaign_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_test_results_run",
                table: "test_results",
                column: "test_run_id");

            migrationBuilder.Sql(FirstByHand.Rules);
        }
    }
}
