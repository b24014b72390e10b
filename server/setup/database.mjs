import { trimwickHome } from './paths.mjs';
import { PrivateCluster } from './postgres.mjs';

/**
 * The database of a start: the private cluster, or the server that DATABASE_URL names.
 *
 * @returns environment for the server’s processes, and how to stop what was started
 */
export async function openDatabase() {
  if (process.env.DATABASE_URL) {
    const { hostname } = new URL(process.env.DATABASE_URL);
    const loopback = ['127.0.0.1', 'localhost', '[::1]'].includes(hostname);
    // Demo teams have a published password: never in production beside a database elsewhere.
    const demo = loopback || process.env.NODE_ENV !== 'production';
    return {
      env: {
        DATABASE_URL: process.env.DATABASE_URL,
        DATABASE_OWNER_URL: process.env.DATABASE_OWNER_URL ?? process.env.DATABASE_URL,
        TRIMWICK_DEMO: demo ? '1' : '0',
      },
      demo,
      stop: async () => {},
    };
  }
  const cluster = new PrivateCluster(trimwickHome());
  await cluster.start();
  return {
    env: { DATABASE_URL: cluster.applicationUrl, DATABASE_OWNER_URL: cluster.ownerUrl, TRIMWICK_DEMO: '1' },
    demo: true,
    stop: () => cluster.stop(),
  };
}
