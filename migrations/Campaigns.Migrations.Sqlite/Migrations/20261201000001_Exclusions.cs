using Microsoft.EntityFrameworkCore.Migrations;

#nullable disable

namespace Campaigns.Migrations.Sqlite.Migrations
{
    /// <inheritdoc />
    public partial class Exclusions : Migration
    {
        /// <inheritdoc />
        protected override void Up(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.AddColumn<long>(
                name: "last_exclusion_id",
                table: "test_runs",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "arrangements",
                table: "test_results",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "as_extreme",
                table: "test_results",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "seed",
                table: "test_results",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<int>(
                name: "specimen_count",
                table: "test_results",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.CreateTable(
                name: "exclusions",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    experiment_id = table.Column<long>(type: "INTEGER", nullable: false),
                    load_id = table.Column<long>(type: "INTEGER", nullable: false),
                    line = table.Column<long>(type: "INTEGER", nullable: false),
                    is_excluded = table.Column<bool>(type: "INTEGER", nullable: false),
                    group_label = table.Column<string>(type: "TEXT", nullable: false),
                    value = table.Column<string>(type: "TEXT", nullable: false),
                    reason = table.Column<string>(type: "TEXT", nullable: false),
                    named_by = table.Column<string>(type: "TEXT", nullable: false),
                    made_at = table.Column<long>(type: "INTEGER", nullable: false),
                    program_version = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_exclusions", x => x.id);
                    table.CheckConstraint("ck_exclusions_is_excluded", "is_excluded in (0, 1)");
                    table.CheckConstraint("ck_exclusions_line", "line > 0");
                    table.CheckConstraint("ck_exclusions_words", "length(reason) > 0 and length(named_by) > 0");
                    table.ForeignKey(
                        name: "FK_exclusions_measurements_experiment_id_load_id",
                        columns: x => new { x.experiment_id, x.load_id },
                        principalTable: "measurements",
                        principalColumns: new[] { "experiment_id", "load_id" },
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateIndex(
                name: "ix_exclusions_measurement",
                table: "exclusions",
                columns: new[] { "experiment_id", "load_id" });

            migrationBuilder.Sql(ExclusionsByHand.Rules);
        }

        /// <inheritdoc />
        protected override void Down(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.DropTable(
                name: "exclusions");

            migrationBuilder.DropColumn(
                name: "last_exclusion_id",
                table: "test_runs");

            migrationBuilder.DropColumn(
                name: "arrangements",
                table: "test_results");

            migrationBuilder.DropColumn(
                name: "as_extreme",
                table: "test_results");

            migrationBuilder.DropColumn(
                name: "seed",
                table: "test_results");

            migrationBuilder.DropColumn(
                name: "specimen_count",
                table: "test_results");
        }
    }
}
