import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * Contributions know the draft’s version: whether an edit is part of a revision is then a comparison of numbers, not
 * of clocks. And invariants that only the services held so far.
 */
export class ContributionVersions1796086800000 implements MigrationInterface {
  name = 'ContributionVersions1796086800000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "assembly_contributions" ADD "last_version" integer`);
    // Which version it was is not known any more: the present one is the cautious answer.
    await runner.query(
      `UPDATE "assembly_contributions" c SET "last_version" = d."version" FROM "assembly_drafts" d
       WHERE d."team_id" = c."team_id" AND d."assembly_id" = c."assembly_id"`,
    );
    await runner.query(`ALTER TABLE "assembly_contributions" ALTER COLUMN "last_version" SET NOT NULL`);
    await runner.query(
      `ALTER TABLE "assemblies" ADD CONSTRAINT "assemblies_duplicated_from_fk" FOREIGN KEY ("team_id", "duplicated_from") REFERENCES "assemblies"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `CREATE UNIQUE INDEX "decisions_one_waiting" ON "decisions" ("team_id", "assembly_id") WHERE state = 'asked'`,
    );
    await runner.query(
      `ALTER TABLE "decisions" ADD CONSTRAINT "decisions_decided_whole" CHECK ((decided_by IS NULL) = (decided_at IS NULL))`,
    );
    await runner.query(
      `ALTER TABLE "decisions" ADD CONSTRAINT "decisions_decided_by_somebody" CHECK (state NOT IN ('accepted','accepted-with-conditions','returned','declined') OR decided_by IS NOT NULL)`,
    );
    await runner.query(
      `ALTER TABLE "decision_events" ADD CONSTRAINT "decision_events_snapshot_whole" CHECK ((snapshot IS NULL) = (snapshot_sha256 IS NULL))`,
    );
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "decision_events" DROP CONSTRAINT "decision_events_snapshot_whole"`);
    await runner.query(`ALTER TABLE "decisions" DROP CONSTRAINT "decisions_decided_by_somebody"`);
    await runner.query(`ALTER TABLE "decisions" DROP CONSTRAINT "decisions_decided_whole"`);
    await runner.query(`DROP INDEX "public"."decisions_one_waiting"`);
    await runner.query(`ALTER TABLE "assemblies" DROP CONSTRAINT "assemblies_duplicated_from_fk"`);
    await runner.query(`ALTER TABLE "assembly_contributions" DROP COLUMN "last_version"`);
  }
}
