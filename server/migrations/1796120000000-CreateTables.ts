import type { MigrationInterface, QueryRunner } from 'typeorm';

export class CreateTables1796120000000 implements MigrationInterface {
  name = 'CreateTables1796120000000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
            CREATE TABLE "audit_entries" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "actor_id" uuid,
                "actor_name" character varying(120),
                "project_id" uuid,
                "entity_type" character varying(20) NOT NULL,
                "entity_id" uuid,
                "action" character varying(40) NOT NULL,
                "text" text NOT NULL,
                "details" jsonb NOT NULL DEFAULT '{}',
                CONSTRAINT "PK_6b1623bcad4d04530b76548d619" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_c222e56c80d4579b64bd51c2cf" ON "audit_entries" ("project_id", "created_at")
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_1094ef41c030dd1b4d2e5a6ccf" ON "audit_entries" ("entity_type", "entity_id", "created_at")
        `);
    await queryRunner.query(`
            CREATE TABLE "projects" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "name" character varying(120) NOT NULL,
                "description" text NOT NULL DEFAULT '',
                "is_archived" boolean NOT NULL DEFAULT false,
                CONSTRAINT "PK_6271df0a7aed1d6c0691ce6ac50" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE UNIQUE INDEX "IDX_2187088ab5ef2a918473cb9900" ON "projects" ("name")
        `);
    await queryRunner.query(`
            CREATE TABLE "users" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "email" character varying(254) NOT NULL,
                "name" character varying(120) NOT NULL,
                "password_hash" character varying(100),
                "is_admin" boolean NOT NULL DEFAULT false,
                "is_active" boolean NOT NULL DEFAULT true,
                "last_seen_at" TIMESTAMP WITH TIME ZONE,
                CONSTRAINT "PK_a3ffb1c0c8416b9fc6f907b7433" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE UNIQUE INDEX "IDX_97672ac88f789774dd47f7c8be" ON "users" ("email")
        `);
    await queryRunner.query(`
            CREATE TABLE "batches" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "project_id" uuid NOT NULL,
                "name" character varying(120) NOT NULL,
                "state" character varying(20) NOT NULL DEFAULT 'receiving',
                "acquisition" jsonb NOT NULL DEFAULT '{}',
                "created_by_id" uuid,
                "completed_at" TIMESTAMP WITH TIME ZONE,
                "screened_at" TIMESTAMP WITH TIME ZONE,
                CONSTRAINT "PK_55e7ff646e969b61d37eea5be7a" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_80305d9299879ef5fce7acf05e" ON "batches" ("project_id", "created_at")
        `);
    await queryRunner.query(`
            CREATE TABLE "captures" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "batch_id" uuid NOT NULL,
                "project_id" uuid NOT NULL,
                "file_name" character varying(1024) NOT NULL,
                "format" character varying(8) NOT NULL,
                "size_bytes" bigint NOT NULL,
                "sha256" character(64) NOT NULL,
                "storage_key" character varying(120) NOT NULL,
                "state" character varying(12) NOT NULL DEFAULT 'received',
                "acquisition" jsonb NOT NULL DEFAULT '{}',
                "csv_layout" jsonb,
                "attempt" integer NOT NULL DEFAULT '0',
                "fault_count" integer NOT NULL DEFAULT '0',
                "progress" real NOT NULL DEFAULT '0',
                "queued_at" TIMESTAMP WITH TIME ZONE,
                "started_at" TIMESTAMP WITH TIME ZONE,
                "screened_at" TIMESTAMP WITH TIME ZONE,
                "failure_code" character varying(40),
                "failure_message" text,
                "failure_line" integer,
                "verdict" character varying(12),
                "fold_score" double precision,
                "clear_to_hz" double precision,
                "headline" text,
                "sample_rate_hz" double precision,
                "duration_s" double precision,
                "channel_count" integer,
                "engine_version" character varying(20),
                "thresholds_version" integer,
                "uploaded_by_id" uuid,
                "duplicate_of_id" uuid,
                "decision_version" integer NOT NULL DEFAULT '0',
                CONSTRAINT "UQ_c3df5db60d083a1f27d9b4297a1" UNIQUE ("batch_id", "file_name"),
                CONSTRAINT "PK_857700c9fac22f0181b1fee6fc3" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_332282a4e11ce693c0bbd9be23" ON "captures" ("state", "queued_at")
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_57576cf116060bf7ef9d86aa40" ON "captures" ("project_id", "sha256")
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_512dc18764525f1dc5bde0da8f" ON "captures" ("project_id", "state")
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_d02b42b60d318b764f3fec168b" ON "captures" ("batch_id", "created_at", "id")
        `);
    await queryRunner.query(`
            CREATE TABLE "channel_results" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "capture_id" uuid NOT NULL,
                "channel_index" integer NOT NULL,
                "measurement" jsonb NOT NULL,
                "screen" jsonb NOT NULL,
                "verdict" character varying(12) NOT NULL,
                CONSTRAINT "UQ_082b7dd5e4d6c05fa089c0e2233" UNIQUE ("capture_id", "channel_index"),
                CONSTRAINT "PK_4d73869393f6a19800faf491f95" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE TABLE "decisions" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "capture_id" uuid NOT NULL,
                "version" integer NOT NULL,
                "decision" character varying(12) NOT NULL,
                "limit_hz" double precision,
                "reason" text NOT NULL,
                "decided_by_id" uuid NOT NULL,
                CONSTRAINT "UQ_97c39f2382b83c727f1886c8344" UNIQUE ("capture_id", "version"),
                CONSTRAINT "PK_48eee6fa229cd5e43648f6a2ec3" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE TABLE "findings" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "capture_id" uuid NOT NULL,
                "channel_index" integer NOT NULL,
                "position" integer NOT NULL,
                "kind" character varying(40) NOT NULL,
                "severity" character varying(12) NOT NULL,
                "confidence" real NOT NULL,
                "frequency_hz" double precision,
                "finding" jsonb NOT NULL,
                CONSTRAINT "PK_ae9807d6293c23c13ff8804d09c" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_c8ff95a7513db0ea5116449e0d" ON "findings" ("kind")
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_aada0e75d2383a71019f3ec668" ON "findings" ("capture_id", "channel_index", "position")
        `);
    await queryRunner.query(`
            CREATE TABLE "mail_messages" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "dedupe_key" character varying(200) NOT NULL,
                "kind" character varying(20) NOT NULL,
                "recipient" character varying(254) NOT NULL,
                "subject" character varying(255) NOT NULL,
                "text" text NOT NULL,
                "html" text NOT NULL,
                "message_id" character varying(200) NOT NULL,
                "state" character varying(10) NOT NULL DEFAULT 'pending',
                "attempts" integer NOT NULL DEFAULT '0',
                "next_attempt_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "sent_at" TIMESTAMP WITH TIME ZONE,
                "last_error" text,
                CONSTRAINT "PK_1bd6e76ef3b3d4aff7d0510a509" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE UNIQUE INDEX "IDX_306a3a20a8c5d426f810c3ff2f" ON "mail_messages" ("dedupe_key")
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_5a9ffa97ee1d3fbe3ed959dc6c" ON "mail_messages" ("state", "next_attempt_at")
        `);
    await queryRunner.query(`
            CREATE TABLE "memberships" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "project_id" uuid NOT NULL,
                "user_id" uuid NOT NULL,
                "roles" character varying(20) array NOT NULL,
                CONSTRAINT "UQ_246faae84ffe34c04db7c91ae50" UNIQUE ("project_id", "user_id"),
                CONSTRAINT "PK_25d28bd932097a9e90495ede7b4" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_7c1e2fdfed4f6838e0c05ae505" ON "memberships" ("user_id")
        `);
    await queryRunner.query(`
            CREATE TABLE "one_time_links" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "user_id" uuid NOT NULL,
                "kind" character varying(20) NOT NULL,
                "token_hash" character(64) NOT NULL,
                "expires_at" TIMESTAMP WITH TIME ZONE NOT NULL,
                "used_at" TIMESTAMP WITH TIME ZONE,
                CONSTRAINT "PK_a9c0872042c6d77795be5924fa2" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_a2dabfd365675680eba5f3304f" ON "one_time_links" ("user_id")
        `);
    await queryRunner.query(`
            CREATE UNIQUE INDEX "IDX_aacfd2b9e82ddfd3bcc285ea9a" ON "one_time_links" ("token_hash")
        `);
    await queryRunner.query(`
            CREATE TABLE "sessions" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "user_id" uuid NOT NULL,
                "renewal_hash" character(64) NOT NULL,
                "previous_renewal_hash" character(64),
                "rotated_at" TIMESTAMP WITH TIME ZONE,
                "last_used_at" TIMESTAMP WITH TIME ZONE NOT NULL,
                "expires_at" TIMESTAMP WITH TIME ZONE NOT NULL,
                "revoked_at" TIMESTAMP WITH TIME ZONE,
                CONSTRAINT "PK_3238ef96f18b355b671619111bc" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_085d540d9f418cfbdc7bd55bb1" ON "sessions" ("user_id")
        `);
    await queryRunner.query(`
            CREATE UNIQUE INDEX "IDX_eb6b772bc848f2ddbb230a3ea6" ON "sessions" ("renewal_hash")
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_7a5f3ff6bed70d67d865b4551a" ON "sessions" ("previous_renewal_hash")
        `);
    await queryRunner.query(`
            CREATE TABLE "spectra" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "channel_result_id" uuid NOT NULL,
                "kind" character varying(8) NOT NULL,
                "resolution_hz" double precision NOT NULL,
                "segments" integer NOT NULL,
                "density_mean" bytea NOT NULL,
                "density_median" bytea,
                CONSTRAINT "UQ_70004f18fec501ea4ce482ee106" UNIQUE ("channel_result_id", "kind"),
                CONSTRAINT "PK_7696bdd462845017cdaaeb9a437" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE TABLE "thresholds_versions" (
                "id" uuid NOT NULL DEFAULT gen_random_uuid(),
                "created_at" TIMESTAMP WITH TIME ZONE NOT NULL DEFAULT now(),
                "project_id" uuid NOT NULL,
                "version" integer NOT NULL,
                "values" jsonb NOT NULL,
                "author_id" uuid,
                "reason" text NOT NULL,
                CONSTRAINT "UQ_bbb2484cce6ce13f01dddfe426c" UNIQUE ("project_id", "version"),
                CONSTRAINT "PK_9325c07ffbe46487fdaff262b45" PRIMARY KEY ("id")
            )
        `);
    await queryRunner.query(`
            CREATE TABLE "worker_heartbeats" (
                "worker_id" character varying(120) NOT NULL,
                "seen_at" TIMESTAMP WITH TIME ZONE NOT NULL,
                "started_at" TIMESTAMP WITH TIME ZONE NOT NULL,
                CONSTRAINT "PK_35082e5e316be8465333d9c09d8" PRIMARY KEY ("worker_id")
            )
        `);
    await queryRunner.query(`
            ALTER TABLE "batches"
            ADD CONSTRAINT "FK_bb612130ea34ffa96f1c36c1fab" FOREIGN KEY ("project_id") REFERENCES "projects"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "batches"
            ADD CONSTRAINT "FK_f974a4ff77f041c9be43ff026b4" FOREIGN KEY ("created_by_id") REFERENCES "users"("id") ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "captures"
            ADD CONSTRAINT "FK_9aa8d20a36f71b64d2fdc8a7626" FOREIGN KEY ("batch_id") REFERENCES "batches"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "captures"
            ADD CONSTRAINT "FK_3ce29d557c60b8441e60267a290" FOREIGN KEY ("project_id") REFERENCES "projects"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "captures"
            ADD CONSTRAINT "FK_776c7b2c9c6ac726207de3329b5" FOREIGN KEY ("uploaded_by_id") REFERENCES "users"("id") ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "channel_results"
            ADD CONSTRAINT "FK_6e626d8786144d050f17df1a8fb" FOREIGN KEY ("capture_id") REFERENCES "captures"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "decisions"
            ADD CONSTRAINT "FK_414eb7cc660c73e814e6e7b879c" FOREIGN KEY ("capture_id") REFERENCES "captures"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "decisions"
            ADD CONSTRAINT "FK_e87b8c8be53423f2f20aa06a7a7" FOREIGN KEY ("decided_by_id") REFERENCES "users"("id") ON DELETE RESTRICT ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "findings"
            ADD CONSTRAINT "FK_7e7114ecdf4b1e462acc62c21f0" FOREIGN KEY ("capture_id") REFERENCES "captures"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "memberships"
            ADD CONSTRAINT "FK_6ab5ba6eb101e826e5a86561083" FOREIGN KEY ("project_id") REFERENCES "projects"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "memberships"
            ADD CONSTRAINT "FK_7c1e2fdfed4f6838e0c05ae5051" FOREIGN KEY ("user_id") REFERENCES "users"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "one_time_links"
            ADD CONSTRAINT "FK_a2dabfd365675680eba5f3304f8" FOREIGN KEY ("user_id") REFERENCES "users"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "sessions"
            ADD CONSTRAINT "FK_085d540d9f418cfbdc7bd55bb19" FOREIGN KEY ("user_id") REFERENCES "users"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "spectra"
            ADD CONSTRAINT "FK_7763c11414303464dd0fa7d8ab8" FOREIGN KEY ("channel_result_id") REFERENCES "channel_results"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "thresholds_versions"
            ADD CONSTRAINT "FK_1dea38d2defa2ece77a584fd377" FOREIGN KEY ("project_id") REFERENCES "projects"("id") ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE "thresholds_versions"
            ADD CONSTRAINT "FK_c63d69edb20217e2e9211d31b8e" FOREIGN KEY ("author_id") REFERENCES "users"("id") ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
            ALTER TABLE "thresholds_versions" DROP CONSTRAINT "FK_c63d69edb20217e2e9211d31b8e"
        `);
    await queryRunner.query(`
            ALTER TABLE "thresholds_versions" DROP CONSTRAINT "FK_1dea38d2defa2ece77a584fd377"
        `);
    await queryRunner.query(`
            ALTER TABLE "spectra" DROP CONSTRAINT "FK_7763c11414303464dd0fa7d8ab8"
        `);
    await queryRunner.query(`
            ALTER TABLE "sessions" DROP CONSTRAINT "FK_085d540d9f418cfbdc7bd55bb19"
        `);
    await queryRunner.query(`
            ALTER TABLE "one_time_links" DROP CONSTRAINT "FK_a2dabfd365675680eba5f3304f8"
        `);
    await queryRunner.query(`
            ALTER TABLE "memberships" DROP CONSTRAINT "FK_7c1e2fdfed4f6838e0c05ae5051"
        `);
    await queryRunner.query(`
            ALTER TABLE "memberships" DROP CONSTRAINT "FK_6ab5ba6eb101e826e5a86561083"
        `);
    await queryRunner.query(`
            ALTER TABLE "findings" DROP CONSTRAINT "FK_7e7114ecdf4b1e462acc62c21f0"
        `);
    await queryRunner.query(`
            ALTER TABLE "decisions" DROP CONSTRAINT "FK_e87b8c8be53423f2f20aa06a7a7"
        `);
    await queryRunner.query(`
            ALTER TABLE "decisions" DROP CONSTRAINT "FK_414eb7cc660c73e814e6e7b879c"
        `);
    await queryRunner.query(`
            ALTER TABLE "channel_results" DROP CONSTRAINT "FK_6e626d8786144d050f17df1a8fb"
        `);
    await queryRunner.query(`
            ALTER TABLE "captures" DROP CONSTRAINT "FK_776c7b2c9c6ac726207de3329b5"
        `);
    await queryRunner.query(`
            ALTER TABLE "captures" DROP CONSTRAINT "FK_3ce29d557c60b8441e60267a290"
        `);
    await queryRunner.query(`
            ALTER TABLE "captures" DROP CONSTRAINT "FK_9aa8d20a36f71b64d2fdc8a7626"
        `);
    await queryRunner.query(`
            ALTER TABLE "batches" DROP CONSTRAINT "FK_f974a4ff77f041c9be43ff026b4"
        `);
    await queryRunner.query(`
            ALTER TABLE "batches" DROP CONSTRAINT "FK_bb612130ea34ffa96f1c36c1fab"
        `);
    await queryRunner.query(`
            DROP TABLE "worker_heartbeats"
        `);
    await queryRunner.query(`
            DROP TABLE "thresholds_versions"
        `);
    await queryRunner.query(`
            DROP TABLE "spectra"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_7a5f3ff6bed70d67d865b4551a"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_eb6b772bc848f2ddbb230a3ea6"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_085d540d9f418cfbdc7bd55bb1"
        `);
    await queryRunner.query(`
            DROP TABLE "sessions"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_aacfd2b9e82ddfd3bcc285ea9a"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_a2dabfd365675680eba5f3304f"
        `);
    await queryRunner.query(`
            DROP TABLE "one_time_links"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_7c1e2fdfed4f6838e0c05ae505"
        `);
    await queryRunner.query(`
            DROP TABLE "memberships"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_5a9ffa97ee1d3fbe3ed959dc6c"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_306a3a20a8c5d426f810c3ff2f"
        `);
    await queryRunner.query(`
            DROP TABLE "mail_messages"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_aada0e75d2383a71019f3ec668"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_c8ff95a7513db0ea5116449e0d"
        `);
    await queryRunner.query(`
            DROP TABLE "findings"
        `);
    await queryRunner.query(`
            DROP TABLE "decisions"
        `);
    await queryRunner.query(`
            DROP TABLE "channel_results"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_d02b42b60d318b764f3fec168b"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_512dc18764525f1dc5bde0da8f"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_57576cf116060bf7ef9d86aa40"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_332282a4e11ce693c0bbd9be23"
        `);
    await queryRunner.query(`
            DROP TABLE "captures"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_80305d9299879ef5fce7acf05e"
        `);
    await queryRunner.query(`
            DROP TABLE "batches"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_97672ac88f789774dd47f7c8be"
        `);
    await queryRunner.query(`
            DROP TABLE "users"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_2187088ab5ef2a918473cb9900"
        `);
    await queryRunner.query(`
            DROP TABLE "projects"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_1094ef41c030dd1b4d2e5a6ccf"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_c222e56c80d4579b64bd51c2cf"
        `);
    await queryRunner.query(`
            DROP TABLE "audit_entries"
        `);
  }
}
