/** Checks the audit trail's hash chain in the database at DATABASE_URL and names the first break. */
import { connectDatabase } from '../server/db/sequelize.ts';
import { verifyChain } from '../server/features/audit-events/verify.ts';

const url = process.env['DATABASE_URL'];
if (!url) {
  console.error('DATABASE_URL is not set. Run `npm run verify-audit`, which knows the private database.');
  process.exit(2);
}
const sequelize = connectDatabase(url);
try {
  const report = await verifyChain(new Date());
  if (report.firstBreak) {
    console.error(
      `The audit trail is broken at event ${report.firstBreak.sequence}. ${report.firstBreak.what}`,
    );
    console.error(`${report.events} events before it are unbroken.`);
    process.exitCode = 1;
  } else {
    console.log(`The audit trail is unbroken: ${report.events} events, last hash ${report.lastHash}.`);
  }
} finally {
  await sequelize.close();
}
