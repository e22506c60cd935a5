import type { MigrationInterface, QueryRunner } from 'typeorm';

/** Where rate-limiter-flexible counts wrong passwords, so that all processes count together. */
export class SignInFailures1796126400011 implements MigrationInterface {
  name = 'SignInFailures1796126400011';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`CREATE TABLE sign_in_failure (
        key character varying(255) NOT NULL,
        points integer NOT NULL DEFAULT '0',
        expire bigint,
        CONSTRAINT pk_sign_in_failure PRIMARY KEY (key)
      )`);
    await queryRunner.query('GRANT SELECT, INSERT, UPDATE, DELETE ON sign_in_failure TO tracehead_app');
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE sign_in_failure');
  }
}
