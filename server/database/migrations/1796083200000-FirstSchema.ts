import type { MigrationInterface, QueryRunner } from 'typeorm';

/** People, shared reference values, assemblies with drafts and revisions, decisions with their events. */
export class FirstSchema1796083200000 implements MigrationInterface {
  name = 'FirstSchema1796083200000';

  async up(runner: QueryRunner): Promise<void> {
    await runner.query(
      `CREATE TABLE "users" ("id" uuid NOT NULL, "email" text NOT NULL, "name" text NOT NULL, "password_hash" text NOT NULL, "created_at" TIMESTAMP WITH TIME ZONE NOT NULL, CONSTRAINT "users_email_lower" CHECK (email = lower(email)), CONSTRAINT "PK_a3ffb1c0c8416b9fc6f907b7433" PRIMARY KEY ("id"))`,
    );
    await runner.query(`CREATE UNIQUE INDEX "users_email_key" ON "users"  ("email")`);
    await runner.query(
      `CREATE TABLE "teams" ("id" uuid NOT NULL, "name" text NOT NULL, "created_at" TIMESTAMP WITH TIME ZONE NOT NULL, CONSTRAINT "PK_7e5523774a38b08a6236d322403" PRIMARY KEY ("id"))`,
    );
    await runner.query(
      `CREATE TABLE "memberships" ("team_id" uuid NOT NULL, "user_id" uuid NOT NULL, "roles" text array NOT NULL, CONSTRAINT "memberships_roles_known" CHECK (roles <@ ARRAY['viewer','designer','engineer','reviewer','admin']), CONSTRAINT "PK_d555e1e7b060aeefc7f9fb8b893" PRIMARY KEY ("team_id", "user_id"))`,
    );
    await runner.query(`CREATE INDEX "memberships_user" ON "memberships"  ("user_id")`);
    await runner.query(
      `CREATE TABLE "sessions" ("id" uuid NOT NULL, "user_id" uuid NOT NULL, "team_id" uuid NOT NULL, "refresh_hash" text NOT NULL, "previous_refresh_hash" text, "rotated_at" TIMESTAMP WITH TIME ZONE NOT NULL, "expires_at" TIMESTAMP WITH TIME ZONE NOT NULL, "created_at" TIMESTAMP WITH TIME ZONE NOT NULL, CONSTRAINT "PK_3238ef96f18b355b671619111bc" PRIMARY KEY ("id"))`,
    );
    await runner.query(`CREATE INDEX "sessions_membership" ON "sessions"  ("team_id", "user_id")`);
    await runner.query(`CREATE INDEX "sessions_user" ON "sessions"  ("user_id")`);
    await runner.query(
      `CREATE TABLE "sign_in_failures" ("email_key" text NOT NULL, "failures" integer NOT NULL, "first_at" TIMESTAMP WITH TIME ZONE NOT NULL, "locked_until" TIMESTAMP WITH TIME ZONE, CONSTRAINT "PK_10893486632c8b1b7fbd2993c92" PRIMARY KEY ("email_key"))`,
    );
    await runner.query(
      `CREATE TABLE "audit_entries" ("id" uuid NOT NULL, "team_id" uuid NOT NULL, "actor_id" uuid NOT NULL, "kind" text NOT NULL, "detail" jsonb NOT NULL, "at" TIMESTAMP WITH TIME ZONE NOT NULL, CONSTRAINT "PK_6b1623bcad4d04530b76548d619" PRIMARY KEY ("id"))`,
    );
    await runner.query(`CREATE INDEX "audit_entries_actor" ON "audit_entries"  ("actor_id")`);
    await runner.query(`CREATE INDEX "audit_entries_team_at" ON "audit_entries"  ("team_id", "at")`);
    await runner.query(
      `CREATE TABLE "assemblies" ("team_id" uuid NOT NULL, "id" uuid NOT NULL, "name" text NOT NULL, "created_by" uuid NOT NULL, "created_at" TIMESTAMP WITH TIME ZONE NOT NULL, "archived_at" TIMESTAMP WITH TIME ZONE, "duplicated_from" uuid, "request_id" uuid, CONSTRAINT "PK_0d456199871450872a9843d465a" PRIMARY KEY ("team_id", "id"))`,
    );
    await runner.query(
      `CREATE UNIQUE INDEX "assemblies_request_key" ON "assemblies"  ("team_id", "created_by", "request_id")`,
    );
    await runner.query(`CREATE INDEX "assemblies_duplicated_from" ON "assemblies"  ("team_id", "duplicated_from")`);
    await runner.query(`CREATE INDEX "assemblies_created_by" ON "assemblies"  ("created_by")`);
    await runner.query(
      `CREATE TABLE "assembly_drafts" ("team_id" uuid NOT NULL, "assembly_id" uuid NOT NULL, "version" integer NOT NULL, "document" jsonb NOT NULL, "updated_by" uuid NOT NULL, "updated_at" TIMESTAMP WITH TIME ZONE NOT NULL, "verdict" jsonb, "verdict_version" integer, "verdict_engine" text, CONSTRAINT "assembly_drafts_version_positive" CHECK (version >= 1), CONSTRAINT "PK_ce2e737b85db504f2d26083062f" PRIMARY KEY ("team_id", "assembly_id"))`,
    );
    await runner.query(`CREATE INDEX "assembly_drafts_updated_at" ON "assembly_drafts"  ("team_id", "updated_at")`);
    await runner.query(`CREATE INDEX "assembly_drafts_updated_by" ON "assembly_drafts"  ("updated_by")`);
    await runner.query(
      `CREATE TABLE "assembly_contributions" ("team_id" uuid NOT NULL, "assembly_id" uuid NOT NULL, "user_id" uuid NOT NULL, "last_edited_at" TIMESTAMP WITH TIME ZONE NOT NULL, CONSTRAINT "PK_2dcd823653bf9a91db8ca501228" PRIMARY KEY ("team_id", "assembly_id", "user_id"))`,
    );
    await runner.query(`CREATE INDEX "assembly_contributions_user" ON "assembly_contributions"  ("user_id")`);
    await runner.query(
      `CREATE TABLE "revisions" ("team_id" uuid NOT NULL, "id" uuid NOT NULL, "assembly_id" uuid NOT NULL, "number" integer NOT NULL, "document" jsonb NOT NULL, "draft_version" integer NOT NULL, "note" text NOT NULL, "engine_version" text NOT NULL, "created_by" uuid NOT NULL, "created_at" TIMESTAMP WITH TIME ZONE NOT NULL, CONSTRAINT "revisions_number_positive" CHECK (number >= 1), CONSTRAINT "PK_460b719d29a2a6f2ffd7330362f" PRIMARY KEY ("team_id", "id"))`,
    );
    await runner.query(`CREATE INDEX "revisions_created_by" ON "revisions"  ("created_by")`);
    await runner.query(
      `CREATE UNIQUE INDEX "revisions_assembly_number_key" ON "revisions"  ("team_id", "assembly_id", "number")`,
    );
    await runner.query(
      `CREATE TABLE "revision_contributors" ("team_id" uuid NOT NULL, "revision_id" uuid NOT NULL, "user_id" uuid NOT NULL, CONSTRAINT "PK_5a48d162247e4acbb138ac56421" PRIMARY KEY ("team_id", "revision_id", "user_id"))`,
    );
    await runner.query(`CREATE INDEX "revision_contributors_user" ON "revision_contributors"  ("user_id")`);
    await runner.query(
      `CREATE TABLE "decisions" ("team_id" uuid NOT NULL, "id" uuid NOT NULL, "number" integer NOT NULL, "version" integer NOT NULL, "state" text NOT NULL, "assembly_id" uuid NOT NULL, "revision_id" uuid NOT NULL, "statement" text NOT NULL, "covers" jsonb NOT NULL, "outline" jsonb NOT NULL, "asked_by" uuid NOT NULL, "asked_at" TIMESTAMP WITH TIME ZONE NOT NULL, "decided_by" uuid, "decided_at" TIMESTAMP WITH TIME ZONE, "request_id" uuid, CONSTRAINT "decisions_state_known" CHECK (state IN ('asked','accepted','accepted-with-conditions','returned','declined','withdrawn','superseded','self-checked')), CONSTRAINT "PK_7b54fa03b6fa8567d72b0812241" PRIMARY KEY ("team_id", "id"))`,
    );
    await runner.query(
      `CREATE UNIQUE INDEX "decisions_request_key" ON "decisions"  ("team_id", "asked_by", "request_id")`,
    );
    await runner.query(`CREATE INDEX "decisions_decided_by" ON "decisions"  ("decided_by")`);
    await runner.query(`CREATE INDEX "decisions_asked_by" ON "decisions"  ("asked_by")`);
    await runner.query(`CREATE INDEX "decisions_state" ON "decisions"  ("team_id", "state")`);
    await runner.query(`CREATE INDEX "decisions_revision" ON "decisions"  ("team_id", "revision_id")`);
    await runner.query(`CREATE INDEX "decisions_assembly" ON "decisions"  ("team_id", "assembly_id")`);
    await runner.query(`CREATE UNIQUE INDEX "decisions_number_key" ON "decisions"  ("team_id", "number")`);
    await runner.query(
      `CREATE TABLE "decision_events" ("team_id" uuid NOT NULL, "sequence" integer NOT NULL, "decision_id" uuid NOT NULL, "kind" text NOT NULL, "actor_id" uuid NOT NULL, "at" TIMESTAMP WITH TIME ZONE NOT NULL, "reason" text NOT NULL, "conditions" jsonb NOT NULL, "flags_taken" jsonb NOT NULL, "revision_id" uuid, "snapshot" text, "snapshot_sha256" text, CONSTRAINT "decision_events_sequence_positive" CHECK (sequence >= 1), CONSTRAINT "decision_events_kind_known" CHECK (kind IN ('asked','accepted','accepted-with-conditions','returned','declined','withdrawn','superseded','self-checked')), CONSTRAINT "PK_201d02f0bb27c4236af537ae961" PRIMARY KEY ("team_id", "sequence"))`,
    );
    await runner.query(`CREATE INDEX "decision_events_actor" ON "decision_events"  ("actor_id")`);
    await runner.query(`CREATE INDEX "decision_events_revision" ON "decision_events"  ("team_id", "revision_id")`);
    await runner.query(`CREATE INDEX "decision_events_decision" ON "decision_events"  ("team_id", "decision_id")`);
    await runner.query(
      `CREATE TABLE "reference_values" ("id" uuid NOT NULL, "kind" text NOT NULL, "slug" text NOT NULL, CONSTRAINT "reference_values_kind_known" CHECK (kind IN ('material','finish','part-type','rule-set')), CONSTRAINT "PK_23035e79dd480af32857192a609" PRIMARY KEY ("id"))`,
    );
    await runner.query(`CREATE UNIQUE INDEX "reference_values_kind_slug_key" ON "reference_values"  ("kind", "slug")`);
    await runner.query(
      `CREATE TABLE "reference_value_versions" ("id" uuid NOT NULL, "value_id" uuid NOT NULL, "number" integer NOT NULL, "name" text NOT NULL, "content" jsonb NOT NULL, "content_sha256" text NOT NULL, "created_at" TIMESTAMP WITH TIME ZONE NOT NULL, CONSTRAINT "reference_value_versions_number_positive" CHECK (number >= 1), CONSTRAINT "PK_e54083851051827066f22d0b08b" PRIMARY KEY ("id"))`,
    );
    await runner.query(
      `CREATE UNIQUE INDEX "reference_value_versions_value_number_key" ON "reference_value_versions"  ("value_id", "number")`,
    );
    await runner.query(
      `ALTER TABLE "memberships" ADD CONSTRAINT "memberships_team_fk" FOREIGN KEY ("team_id") REFERENCES "teams"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "memberships" ADD CONSTRAINT "memberships_user_fk" FOREIGN KEY ("user_id") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "sessions" ADD CONSTRAINT "sessions_membership_fk" FOREIGN KEY ("team_id", "user_id") REFERENCES "memberships"("team_id","user_id") ON DELETE CASCADE ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_team_fk" FOREIGN KEY ("team_id") REFERENCES "teams"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_actor_fk" FOREIGN KEY ("actor_id") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "assemblies" ADD CONSTRAINT "assemblies_team_fk" FOREIGN KEY ("team_id") REFERENCES "teams"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "assemblies" ADD CONSTRAINT "assemblies_created_by_fk" FOREIGN KEY ("created_by") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "assembly_drafts" ADD CONSTRAINT "assembly_drafts_assembly_fk" FOREIGN KEY ("team_id", "assembly_id") REFERENCES "assemblies"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "assembly_drafts" ADD CONSTRAINT "assembly_drafts_updated_by_fk" FOREIGN KEY ("updated_by") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "assembly_contributions" ADD CONSTRAINT "assembly_contributions_assembly_fk" FOREIGN KEY ("team_id", "assembly_id") REFERENCES "assemblies"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "assembly_contributions" ADD CONSTRAINT "assembly_contributions_user_fk" FOREIGN KEY ("user_id") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "revisions" ADD CONSTRAINT "revisions_assembly_fk" FOREIGN KEY ("team_id", "assembly_id") REFERENCES "assemblies"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "revisions" ADD CONSTRAINT "revisions_created_by_fk" FOREIGN KEY ("created_by") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "revision_contributors" ADD CONSTRAINT "revision_contributors_revision_fk" FOREIGN KEY ("team_id", "revision_id") REFERENCES "revisions"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "revision_contributors" ADD CONSTRAINT "revision_contributors_user_fk" FOREIGN KEY ("user_id") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "decisions" ADD CONSTRAINT "decisions_assembly_fk" FOREIGN KEY ("team_id", "assembly_id") REFERENCES "assemblies"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "decisions" ADD CONSTRAINT "decisions_revision_fk" FOREIGN KEY ("team_id", "revision_id") REFERENCES "revisions"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "decisions" ADD CONSTRAINT "decisions_asked_by_fk" FOREIGN KEY ("asked_by") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "decisions" ADD CONSTRAINT "decisions_decided_by_fk" FOREIGN KEY ("decided_by") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "decision_events" ADD CONSTRAINT "decision_events_decision_fk" FOREIGN KEY ("team_id", "decision_id") REFERENCES "decisions"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "decision_events" ADD CONSTRAINT "decision_events_revision_fk" FOREIGN KEY ("team_id", "revision_id") REFERENCES "revisions"("team_id","id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "decision_events" ADD CONSTRAINT "decision_events_actor_fk" FOREIGN KEY ("actor_id") REFERENCES "users"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
    await runner.query(
      `ALTER TABLE "reference_value_versions" ADD CONSTRAINT "reference_value_versions_value_fk" FOREIGN KEY ("value_id") REFERENCES "reference_values"("id") ON DELETE NO ACTION ON UPDATE NO ACTION`,
    );
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query(`ALTER TABLE "reference_value_versions" DROP CONSTRAINT "reference_value_versions_value_fk"`);
    await runner.query(`ALTER TABLE "decision_events" DROP CONSTRAINT "decision_events_actor_fk"`);
    await runner.query(`ALTER TABLE "decision_events" DROP CONSTRAINT "decision_events_revision_fk"`);
    await runner.query(`ALTER TABLE "decision_events" DROP CONSTRAINT "decision_events_decision_fk"`);
    await runner.query(`ALTER TABLE "decisions" DROP CONSTRAINT "decisions_decided_by_fk"`);
    await runner.query(`ALTER TABLE "decisions" DROP CONSTRAINT "decisions_asked_by_fk"`);
    await runner.query(`ALTER TABLE "decisions" DROP CONSTRAINT "decisions_revision_fk"`);
    await runner.query(`ALTER TABLE "decisions" DROP CONSTRAINT "decisions_assembly_fk"`);
    await runner.query(`ALTER TABLE "revision_contributors" DROP CONSTRAINT "revision_contributors_user_fk"`);
    await runner.query(`ALTER TABLE "revision_contributors" DROP CONSTRAINT "revision_contributors_revision_fk"`);
    await runner.query(`ALTER TABLE "revisions" DROP CONSTRAINT "revisions_created_by_fk"`);
    await runner.query(`ALTER TABLE "revisions" DROP CONSTRAINT "revisions_assembly_fk"`);
    await runner.query(`ALTER TABLE "assembly_contributions" DROP CONSTRAINT "assembly_contributions_user_fk"`);
    await runner.query(`ALTER TABLE "assembly_contributions" DROP CONSTRAINT "assembly_contributions_assembly_fk"`);
    await runner.query(`ALTER TABLE "assembly_drafts" DROP CONSTRAINT "assembly_drafts_updated_by_fk"`);
    await runner.query(`ALTER TABLE "assembly_drafts" DROP CONSTRAINT "assembly_drafts_assembly_fk"`);
    await runner.query(`ALTER TABLE "assemblies" DROP CONSTRAINT "assemblies_created_by_fk"`);
    await runner.query(`ALTER TABLE "assemblies" DROP CONSTRAINT "assemblies_team_fk"`);
    await runner.query(`ALTER TABLE "audit_entries" DROP CONSTRAINT "audit_entries_actor_fk"`);
    await runner.query(`ALTER TABLE "audit_entries" DROP CONSTRAINT "audit_entries_team_fk"`);
    await runner.query(`ALTER TABLE "sessions" DROP CONSTRAINT "sessions_membership_fk"`);
    await runner.query(`ALTER TABLE "memberships" DROP CONSTRAINT "memberships_user_fk"`);
    await runner.query(`ALTER TABLE "memberships" DROP CONSTRAINT "memberships_team_fk"`);
    await runner.query(`DROP INDEX "public"."reference_value_versions_value_number_key"`);
    await runner.query(`DROP TABLE "reference_value_versions"`);
    await runner.query(`DROP INDEX "public"."reference_values_kind_slug_key"`);
    await runner.query(`DROP TABLE "reference_values"`);
    await runner.query(`DROP INDEX "public"."decision_events_decision"`);
    await runner.query(`DROP INDEX "public"."decision_events_revision"`);
    await runner.query(`DROP INDEX "public"."decision_events_actor"`);
    await runner.query(`DROP TABLE "decision_events"`);
    await runner.query(`DROP INDEX "public"."decisions_number_key"`);
    await runner.query(`DROP INDEX "public"."decisions_assembly"`);
    await runner.query(`DROP INDEX "public"."decisions_revision"`);
    await runner.query(`DROP INDEX "public"."decisions_state"`);
    await runner.query(`DROP INDEX "public"."decisions_asked_by"`);
    await runner.query(`DROP INDEX "public"."decisions_decided_by"`);
    await runner.query(`DROP INDEX "public"."decisions_request_key"`);
    await runner.query(`DROP TABLE "decisions"`);
    await runner.query(`DROP INDEX "public"."revision_contributors_user"`);
    await runner.query(`DROP TABLE "revision_contributors"`);
    await runner.query(`DROP INDEX "public"."revisions_assembly_number_key"`);
    await runner.query(`DROP INDEX "public"."revisions_created_by"`);
    await runner.query(`DROP TABLE "revisions"`);
    await runner.query(`DROP INDEX "public"."assembly_contributions_user"`);
    await runner.query(`DROP TABLE "assembly_contributions"`);
    await runner.query(`DROP INDEX "public"."assembly_drafts_updated_by"`);
    await runner.query(`DROP INDEX "public"."assembly_drafts_updated_at"`);
    await runner.query(`DROP TABLE "assembly_drafts"`);
    await runner.query(`DROP INDEX "public"."assemblies_created_by"`);
    await runner.query(`DROP INDEX "public"."assemblies_duplicated_from"`);
    await runner.query(`DROP INDEX "public"."assemblies_request_key"`);
    await runner.query(`DROP TABLE "assemblies"`);
    await runner.query(`DROP INDEX "public"."audit_entries_team_at"`);
    await runner.query(`DROP INDEX "public"."audit_entries_actor"`);
    await runner.query(`DROP TABLE "audit_entries"`);
    await runner.query(`DROP TABLE "sign_in_failures"`);
    await runner.query(`DROP INDEX "public"."sessions_user"`);
    await runner.query(`DROP INDEX "public"."sessions_membership"`);
    await runner.query(`DROP TABLE "sessions"`);
    await runner.query(`DROP INDEX "public"."memberships_user"`);
    await runner.query(`DROP TABLE "memberships"`);
    await runner.query(`DROP TABLE "teams"`);
    await runner.query(`DROP INDEX "public"."users_email_key"`);
    await runner.query(`DROP TABLE "users"`);
  }
}
