import path from 'node:path';
import { checkDatabase, openDatabase } from './database.mjs';
import { runScript } from './fail.mjs';
import { checkNode } from './node-version.mjs';
import { ensurePackages } from './packages.mjs';
import { ensureHome, packaged, trimwickHome } from './paths.mjs';
import { endLeftovers, leaveHome, takeHome } from './processes.mjs';
import { checkPortFree, migrate, ownAddress, readPort, Service, stopRequested, waitHealthy } from './service.mjs';

/** Serves from the sources until a stop is asked for: the API reloads, the client is exchanged in the page. */
async function serve(home, port, clientPort, database, stopping) {
  const env = {
    ...database.env,
    PORT: String(port),
    VITE_PORT: String(clientPort),
    TRIMWICK_HOME: home,
    NODE_ENV: 'development',
  };
  await migrate(env, [packaged('tsx'), 'server/migrate.ts']);
  const services = [];
  try {
    services.push(
      new Service(
        packaged('tsx'),
        ['watch', '--clear-screen=false', 'server/main.ts'],
        env,
        path.join(home, 'server.pid'),
      ),
    );
    if ((await Promise.race([waitHealthy(ownAddress(port), services[0]), stopping])) !== undefined) return;
    services.push(new Service(packaged('vite'), [], env, path.join(home, 'client.pid')));
    console.log(`\nTrimwick, reloading as you edit: http://127.0.0.1:${clientPort}\nCtrl-C stops it.`);
    await Promise.race([stopping, ...services.map((service) => service.ended)]);
  } finally {
    await Promise.all(services.map((service) => service.stop()));
  }
}

await runScript(async () => {
  checkNode();
  const port = readPort('PORT', 4310);
  const clientPort = readPort('VITE_PORT', port + 1);
  const home = trimwickHome();
  ensureHome(home);
  takeHome(home, port);
  try {
    await endLeftovers(home);
    await checkPortFree(port);
    await checkPortFree(clientPort, 'VITE_PORT');
    await checkDatabase();
    await ensurePackages();
    const stopping = stopRequested();
    const database = await openDatabase(home);
    try {
      await serve(home, port, clientPort, database, stopping);
    } finally {
      await database.stop();
    }
  } finally {
    leaveHome(home);
  }
});
