using Microsoft.EntityFrameworkCore.Migrations;

#nullable disable

namespace Campaigns.Migrations.Sqlite.Migrations
{
    /// <inheritdoc />
    public partial class Record : Migration
    {
        /// <inheritdoc />
        protected override void Up(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.AddColumn<long>(
                name: "last_amendment_id",
                table: "test_runs",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "last_withdrawal_id",
                table: "test_runs",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "last_amendment_id",
                table: "reviews",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "last_exclusion_id",
                table: "reviews",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "last_load_id",
                table: "reviews",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "last_withdrawal_id",
                table: "reviews",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "group_set_id",
                table: "measurements",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "amendment_id",
                table: "experiments",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.AddColumn<long>(
                name: "first_load_id",
                table: "experiments",
                type: "INTEGER",
                nullable: true);

            migrationBuilder.CreateTable(
                name: "ledger",
                columns: table => new
                {
                    sequence = table.Column<long>(type: "INTEGER", nullable: false),
                    at = table.Column<long>(type: "INTEGER", nullable: false),
                    account = table.Column<string>(type: "TEXT", nullable: false),
                    acting_as = table.Column<string>(type: "TEXT", nullable: true),
                    program_version = table.Column<string>(type: "TEXT", nullable: false),
                    action = table.Column<string>(type: "TEXT", nullable: false),
                    campaign = table.Column<string>(type: "TEXT", nullable: true),
                    subject = table.Column<string>(type: "TEXT", nullable: true),
                    reason = table.Column<string>(type: "TEXT", nullable: true),
                    hash = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_ledger", x => x.sequence);
                    table.CheckConstraint("ck_ledger_hash", "length(hash) = 64");
                    table.CheckConstraint("ck_ledger_sequence", "sequence > 0");
                    table.CheckConstraint("ck_ledger_words", "length(account) > 0 and length(program_version) > 0 and length(action) > 0");
                });

            migrationBuilder.CreateTable(
                name: "original_pieces",
                columns: table => new
                {
                    load_id = table.Column<long>(type: "INTEGER", nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    byte_count = table.Column<int>(type: "INTEGER", nullable: false),
                    content = table.Column<byte[]>(type: "BLOB", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_original_pieces", x => new { x.load_id, x.position });
                    table.CheckConstraint("ck_original_pieces_counts", "position > 0 and byte_count > 0");
                    table.ForeignKey(
                        name: "FK_original_pieces_loads_load_id",
                        column: x => x.load_id,
                        principalTable: "loads",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "originals",
                columns: table => new
                {
                    load_id = table.Column<long>(type: "INTEGER", nullable: false),
                    encoding = table.Column<string>(type: "TEXT", nullable: false),
                    separator = table.Column<string>(type: "TEXT", nullable: false),
                    decimal_mark = table.Column<string>(type: "TEXT", nullable: false),
                    columns = table.Column<string>(type: "TEXT", nullable: false),
                    compression = table.Column<string>(type: "TEXT", nullable: false),
                    piece_count = table.Column<int>(type: "INTEGER", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_originals", x => x.load_id);
                    table.CheckConstraint("ck_originals_pieces", "piece_count > 0");
                    table.ForeignKey(
                        name: "FK_originals_loads_load_id",
                        column: x => x.load_id,
                        principalTable: "loads",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "plan_amendments",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    campaign_id = table.Column<long>(type: "INTEGER", nullable: false),
                    number = table.Column<int>(type: "INTEGER", nullable: false),
                    reason = table.Column<string>(type: "TEXT", nullable: false),
                    named_by = table.Column<string>(type: "TEXT", nullable: false),
                    made_at = table.Column<long>(type: "INTEGER", nullable: false),
                    program_version = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_plan_amendments", x => x.id);
                    table.CheckConstraint("ck_plan_amendments_number", "number > 0");
                    table.CheckConstraint("ck_plan_amendments_words", "length(reason) > 0 and length(named_by) > 0");
                    table.ForeignKey(
                        name: "FK_plan_amendments_campaigns_campaign_id",
                        column: x => x.campaign_id,
                        principalTable: "campaigns",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "withdrawals",
                columns: table => new
                {
                    id = table.Column<long>(type: "INTEGER", nullable: false),
                    experiment_id = table.Column<long>(type: "INTEGER", nullable: false),
                    is_withdrawn = table.Column<bool>(type: "INTEGER", nullable: false),
                    had_data = table.Column<bool>(type: "INTEGER", nullable: false),
                    reason = table.Column<string>(type: "TEXT", nullable: false),
                    named_by = table.Column<string>(type: "TEXT", nullable: false),
                    made_at = table.Column<long>(type: "INTEGER", nullable: false),
                    program_version = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_withdrawals", x => x.id);
                    table.CheckConstraint("ck_withdrawals_truths", "is_withdrawn in (0, 1) and had_data in (0, 1)");
                    table.CheckConstraint("ck_withdrawals_words", "length(reason) > 0 and length(named_by) > 0");
                    table.ForeignKey(
                        name: "FK_withdrawals_experiments_experiment_id",
                        column: x => x.experiment_id,
                        principalTable: "experiments",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "ledger_changes",
                columns: table => new
                {
                    sequence = table.Column<long>(type: "INTEGER", nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    what = table.Column<string>(type: "TEXT", nullable: false),
                    before = table.Column<string>(type: "TEXT", nullable: true),
                    after = table.Column<string>(type: "TEXT", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_ledger_changes", x => new { x.sequence, x.position });
                    table.ForeignKey(
                        name: "FK_ledger_changes_ledger_sequence",
                        column: x => x.sequence,
                        principalTable: "ledger",
                        principalColumn: "sequence",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "ledger_evidence",
                columns: table => new
                {
                    sequence = table.Column<long>(type: "INTEGER", nullable: false),
                    position = table.Column<int>(type: "INTEGER", nullable: false),
                    kind = table.Column<string>(type: "TEXT", nullable: false),
                    owner = table.Column<long>(type: "INTEGER", nullable: false),
                    first = table.Column<long>(type: "INTEGER", nullable: false),
                    last = table.Column<long>(type: "INTEGER", nullable: false),
                    digest = table.Column<string>(type: "TEXT", nullable: false)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_ledger_evidence", x => new { x.sequence, x.position });
                    table.CheckConstraint("ck_ledger_evidence_digest", "length(digest) = 64");
                    table.CheckConstraint("ck_ledger_evidence_range", "first between 0 and last");
                    table.ForeignKey(
                        name: "FK_ledger_evidence_ledger_sequence",
                        column: x => x.sequence,
                        principalTable: "ledger",
                        principalColumn: "sequence",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateTable(
                name: "plan_amendment_changes",
                columns: table => new
                {
                    amendment_id = table.Column<long>(type: "INTEGER", nullable: false),
                    experiment_id = table.Column<long>(type: "INTEGER", nullable: false),
                    field = table.Column<string>(type: "TEXT", nullable: false),
                    before = table.Column<string>(type: "TEXT", nullable: true),
                    after = table.Column<string>(type: "TEXT", nullable: true)
                },
                constraints: table =>
                {
                    table.PrimaryKey("PK_plan_amendment_changes", x => new { x.amendment_id, x.experiment_id, x.field });
                    table.ForeignKey(
                        name: "FK_plan_amendment_changes_experiments_experiment_id",
                        column: x => x.experiment_id,
                        principalTable: "experiments",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                    table.ForeignKey(
                        name: "FK_plan_amendment_changes_plan_amendments_amendment_id",
                        column: x => x.amendment_id,
                        principalTable: "plan_amendments",
                        principalColumn: "id",
                        onDelete: ReferentialAction.Restrict);
                });

            migrationBuilder.CreateIndex(
                name: "ux_plan_amendments_number",
                table: "plan_amendments",
                columns: new[] { "campaign_id", "number" },
                unique: true);

            migrationBuilder.CreateIndex(
                name: "ix_withdrawals_experiment",
                table: "withdrawals",
                column: "experiment_id");

            migrationBuilder.Sql(RecordByHand.FromBefore);
            migrationBuilder.Sql(RecordByHand.Rules);
        }

        /// <inheritdoc />
        protected override void Down(MigrationBuilder migrationBuilder)
        {
            migrationBuilder.DropTable(
                name: "ledger_changes");

            migrationBuilder.DropTable(
                name: "ledger_evidence");

            migrationBuilder.DropTable(
                name: "original_pieces");

            migrationBuilder.DropTable(
                name: "originals");

            migrationBuilder.DropTable(
                name: "plan_amendment_changes");

            migrationBuilder.DropTable(
                name: "withdrawals");

            migrationBuilder.DropTable(
                name: "ledger");

            migrationBuilder.DropTable(
                name: "plan_amendments");

            migrationBuilder.DropColumn(
                name: "last_amendment_id",
                table: "test_runs");

            migrationBuilder.DropColumn(
                name: "last_withdrawal_id",
                table: "test_runs");

            migrationBuilder.DropColumn(
                name: "last_amendment_id",
                table: "reviews");

            migrationBuilder.DropColumn(
                name: "last_exclusion_id",
                table: "reviews");

            migrationBuilder.DropColumn(
                name: "last_load_id",
                table: "reviews");

            migrationBuilder.DropColumn(
                name: "last_withdrawal_id",
                table: "reviews");

            migrationBuilder.DropColumn(
                name: "group_set_id",
                table: "measurements");

            migrationBuilder.DropColumn(
                name: "amendment_id",
                table: "experiments");

            migrationBuilder.DropColumn(
                name: "first_load_id",
                table: "experiments");
        }
    }
}
