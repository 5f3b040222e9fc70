/**
 * npm run audit:verify
 *
 * Works the audit chains of all labs out again and says where they were tampered with. Needs DATABASE_URL and the
 * other settings in the environment, as the web server does. Ends with 1 where a chain does not hold.
 */
import { closeDb } from '@/db/connection';
import { verifyAllChains } from '@/lib/audit/verify-all-chains';

let holds = true;
try {
  for (const { chainId, entries, faults } of await verifyAllChains()) {
    console.log(
      `${chainId}: ${entries} rows, ${faults.length === 0 ? 'the chain holds' : `${faults.length} faults`}`,
    );
    for (const fault of faults) console.log(`  ${fault.message}`);
    if (faults.length > 0) holds = false;
  }
  console.log(holds ? 'Every chain holds.' : 'At least one chain does not hold.');
} finally {
  await closeDb();
}
process.exitCode = holds ? 0 : 1;
