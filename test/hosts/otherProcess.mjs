/** Opens a store file as another process would: holds it until told to let go, or dies in the middle of its work. */
import process from 'node:process';
import Database from 'better-sqlite3';

const [file, work] = process.argv.slice(2);
const database = new Database(file);
database.exec("BEGIN IMMEDIATE; UPDATE jobs SET file = 'written by the other process'");
if (work === 'hold') {
  process.once('message', () => {
    database.exec('COMMIT');
    database.close();
    process.disconnect();
  });
  process.send('holding');
} else {
  database.exec("COMMIT; BEGIN IMMEDIATE; UPDATE jobs SET file = 'never finished'");
  process.kill(process.pid, 'SIGKILL');
}
