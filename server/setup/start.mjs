import path from 'node:path';
import { ensureBuilt } from './build.mjs';
import { checkDatabase, openDatabase } from './database.mjs';
import { runScript, SetupError } from './fail.mjs';
import { checkNode } from './node-version.mjs';
import { ensurePackages } from './packages.mjs';
import { ensureHome, trimwickHome } from './paths.mjs';
import { endLeftovers, leaveHome, takeHome } from './processes.mjs';
import { checkPortFree, migrate, ownAddress, readPort, stopRequested, waitHealthy, webProcess } from './service.mjs';

function greet(port, demo) {
  console.log(`\nTrimwick is at ${ownAddress(port)}\n`);
  if (demo) {
    console.log('Demo sign-ins, password trim-the-wick-4310:');
    console.log('  Brackenmoor Lanterns    admin@ designer@ engineer@ reviewer@ viewer@brackenmoor.example');
    console.log('  Saltmarsh Instruments   engineer@saltmarsh.example\n');
  }
  console.log('Ctrl-C stops it.');
}

/** Serves until a stop is asked for. */
async function serve(home, port, database, stopping) {
  const env = { NODE_ENV: 'production', ...database.env, PORT: String(port), TRIMWICK_HOME: home };
  await migrate(env);
  const service = webProcess(env, path.join(home, 'server.pid'));
  try {
    const stopped = await Promise.race([waitHealthy(ownAddress(port), service), stopping]);
    if (stopped !== undefined) return;
    greet(port, database.demo);
    const end = await Promise.race([stopping, service.ended]);
    if (typeof end === 'object') throw new SetupError('The server ended by itself (see above)');
    console.log('\nStopping …');
  } finally {
    await service.stop();
  }
}

await runScript(async () => {
  checkNode();
  const port = readPort('PORT', 4310);
  const home = trimwickHome();
  ensureHome(home);
  takeHome(home, port);
  try {
    await endLeftovers(home);
    await checkPortFree(port);
    await checkDatabase();
    await ensurePackages();
    await ensureBuilt();
    const stopping = stopRequested();
    const database = await openDatabase(home);
    try {
      await serve(home, port, database, stopping);
    } finally {
      await database.stop();
    }
  } finally {
    leaveHome(home);
  }
});
