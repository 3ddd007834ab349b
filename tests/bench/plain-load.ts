import { database } from '@/db/connection';

const columns = `row_no INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY, frame INT UNSIGNED NOT NULL, star VARCHAR(80) NOT NULL,
  ra DOUBLE NOT NULL, decl DOUBLE NOT NULL, inst_mag DOUBLE NOT NULL, inst_err DOUBLE NOT NULL, x FLOAT NULL, y FLOAT NULL,
  fwhm FLOAT NULL, sky FLOAT NULL, peak FLOAT NULL, flag VARCHAR(120) NOT NULL`;

/** Seconds that the database takes to load the file into a plain table of its columns: nothing checked, nothing matched. */
export async function loadPlainly(file: string): Promise<number> {
  await database().query('DROP TABLE IF EXISTS plain_load');
  await database().query(`CREATE TABLE plain_load (${columns}) ENGINE=InnoDB DEFAULT CHARSET=utf8mb4`);
  const begun_ms = performance.now();
  await database().query(
    `LOAD DATA LOCAL INFILE ${database().escape(file)} INTO TABLE plain_load CHARACTER SET utf8mb4
     FIELDS TERMINATED BY ',' OPTIONALLY ENCLOSED BY '"' LINES TERMINATED BY '\\n' IGNORE 1 LINES
     (frame, star, ra, decl, inst_mag, inst_err, x, y, fwhm, sky, peak, flag)`,
  );
  const seconds = (performance.now() - begun_ms) / 1000;
  await database().query('DROP TABLE plain_load');
  return seconds;
}
