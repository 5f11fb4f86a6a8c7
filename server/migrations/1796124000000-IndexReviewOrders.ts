import type { MigrationInterface, QueryRunner } from 'typeorm';

/**
 * The orders of the review list, over what still waits for a decision: a page is read off the index instead of sorting
 * everything first. `project_id` stands last, so that foreign rows are passed over without touching the table.
 */
export class IndexReviewOrders1796124000000 implements MigrationInterface {
  name = 'IndexReviewOrders1796124000000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
            CREATE INDEX "IDX_captures_review_fold_score" ON "captures" (coalesce("fold_score", -1) DESC, "id" DESC, "project_id")
            WHERE "state" = 'screened' AND "decision_version" = 0
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_captures_review_created_at" ON "captures" ("created_at" DESC, "id" DESC, "project_id")
            WHERE "state" = 'screened' AND "decision_version" = 0
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_captures_review_clear_to" ON "captures" (coalesce("clear_to_hz", -1), "id", "project_id")
            WHERE "state" = 'screened' AND "decision_version" = 0
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_captures_review_file_name" ON "captures" ((lower("file_name") COLLATE "C"), "id", "project_id")
            WHERE "state" = 'screened' AND "decision_version" = 0
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_captures_review_project" ON "captures" ("project_id")
            WHERE "state" = 'screened' AND "decision_version" = 0
        `);
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
            DROP INDEX "IDX_captures_review_project"
        `);
    await queryRunner.query(`
            DROP INDEX "IDX_captures_review_file_name"
        `);
    await queryRunner.query(`
            DROP INDEX "IDX_captures_review_clear_to"
        `);
    await queryRunner.query(`
            DROP INDEX "IDX_captures_review_created_at"
        `);
    await queryRunner.query(`
            DROP INDEX "IDX_captures_review_fold_score"
        `);
  }
}
