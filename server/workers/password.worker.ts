import bcrypt from 'bcryptjs';

/** bcrypt’s cost: about a quarter of a second on one core. */
const rounds = 11;

/** Hashes a password, or compares one with a hash. Off the main thread: it is slow by design. */
export default async function runTask(task: { password: string; hash?: string }): Promise<string | boolean> {
  return task.hash === undefined ? bcrypt.hash(task.password, rounds) : bcrypt.compare(task.password, task.hash);
}
