import type { MigrationInterface, QueryRunner } from 'typeorm';

export class AddCompanions1796128000000 implements MigrationInterface {
  name = 'AddCompanions1796128000000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
            ALTER TABLE "captures"
            ADD "companion_id" uuid
        `);
    await queryRunner.query(`
            ALTER TABLE "captures"
            ADD "companion_basis" character(64)
        `);
    await queryRunner.query(`
            ALTER TABLE "captures"
            ADD "companion_note" text
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_fd8eefd9a361f9639bf0722877" ON "captures" ("project_id")
            WHERE "companion_note" IS NOT NULL
        `);
    await queryRunner.query(`
            CREATE INDEX "IDX_74a352e6543b34281f2fe44fd0" ON "captures" ("companion_id")
        `);
    await queryRunner.query(`
            ALTER TABLE "captures"
            ADD CONSTRAINT "FK_74a352e6543b34281f2fe44fd0d" FOREIGN KEY ("companion_id") REFERENCES "captures"("id") ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
            ALTER TABLE "captures" DROP CONSTRAINT "FK_74a352e6543b34281f2fe44fd0d"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_74a352e6543b34281f2fe44fd0"
        `);
    await queryRunner.query(`
            DROP INDEX "public"."IDX_fd8eefd9a361f9639bf0722877"
        `);
    await queryRunner.query(`
            ALTER TABLE "captures" DROP COLUMN "companion_note"
        `);
    await queryRunner.query(`
            ALTER TABLE "captures" DROP COLUMN "companion_basis"
        `);
    await queryRunner.query(`
            ALTER TABLE "captures" DROP COLUMN "companion_id"
        `);
  }
}
