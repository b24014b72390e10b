import bcrypt from 'bcryptjs';

/** bcrypt’s cost: about a quarter of a second on one core. */
const rounds = 11;

/** What bcrypt reads of a password; what comes after would not count, so such a password is no password. */
const mostBytes = 72;

/** Hashes a password, or compares one with a hash. Off the main thread: it is slow by design. */
export default async function runTask(task: { password: string; hash?: string }): Promise<string | boolean> {
  const tooLong = Buffer.byteLength(task.password, 'utf8') > mostBytes;
  if (task.hash !== undefined) return (await bcrypt.compare(task.password, task.hash)) && !tooLong;
  if (tooLong) throw new RangeError('A password has at most 72 bytes');
  return bcrypt.hash(task.password, rounds);
}
