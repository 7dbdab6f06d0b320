/** A cluster for one run (tests, benchmark), whose folder is removed at the end. */
import { chmodSync, mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { startCluster } from './cluster.mjs';

export async function startTemporaryCluster(supervisor, { parent, prefix, fsync }) {
  mkdirSync(parent, { recursive: true });
  const dir = mkdtempSync(join(parent, prefix));
  // The server runs as another user when we are root: it has to get through, its own files stay private.
  chmodSync(dir, 0o755);
  const removeFiles = (folder = dir) => {
    for (const path of new Set([dir, folder])) rmSync(path, { recursive: true, force: true });
  };
  let cluster;
  try {
    cluster = await startCluster({ dir, fsync });
  } catch (error) {
    removeFiles();
    throw error;
  }
  const stop = async () => {
    await cluster.stop();
    removeFiles(cluster.folder);
  };
  const { exited, pid, folder } = cluster;
  supervisor.adopt({
    title: 'The database of this run',
    log: join(folder, 'postgres.log'),
    exited,
    pid,
    stop,
    forceSignal: 'SIGQUIT',
  });
  supervisor.check();
  return cluster;
}
