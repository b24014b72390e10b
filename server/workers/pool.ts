import { createRequire } from 'node:module';
import { pathToFileURL } from 'node:url';
import { Piscina } from 'piscina';
import { DomainError } from '../errors.js';
import type { EngineTaskName, EngineTasks, TaskAnswer } from './engine-tasks.js';

/** Run from its sources the worker needs the loader that the main thread has; built it needs none. */
function makePool(name: string, maxThreads: number): Piscina {
  const fromSource = import.meta.url.endsWith('.ts');
  return new Piscina({
    filename: new URL(`./${name}.worker.${fromSource ? 'ts' : 'js'}`, import.meta.url).href,
    minThreads: 1,
    maxThreads,
    idleTimeout: 60_000,
    maxQueue: 1000,
    execArgv: fromSource ? ['--import', pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href] : [],
  });
}

/** Longest that one engine task may take [ms]; then its thread is ended. */
const engineTimeoutMs = 30_000;

/** The threads on which the engine and password hashing run, so that the web thread never stalls. */
export class Workers {
  private readonly engine = makePool('engine', 2);
  private readonly passwords = makePool('password', 1);

  /**
   * Runs an engine task.
   *
   * @param prefix put before every path of an error: where in the request the document stands
   * @throws DomainError 422 with what the engine refused, 503 when too much is waiting
   */
  async run<K extends EngineTaskName>(
    name: K,
    input: EngineTasks[K]['input'],
    prefix = '',
  ): Promise<EngineTasks[K]['output']> {
    let answer: TaskAnswer<EngineTasks[K]['output']>;
    try {
      answer = (await this.engine.run({ name, input }, { signal: AbortSignal.timeout(engineTimeoutMs) })) as TaskAnswer<
        EngineTasks[K]['output']
      >;
    } catch (error) {
      if (error instanceof Error && error.name === 'AbortError') {
        throw new DomainError(422, 'too-slow', 'This took longer than 30 s and was given up');
      }
      if (error instanceof Error && error.message.includes('queue')) {
        throw new DomainError(503, 'busy', 'Too much is being computed at once: try again in a moment');
      }
      throw error;
    }
    if (answer.ok) return answer.value;
    const { code, message, errors } = answer.error;
    throw new DomainError(
      422,
      code,
      message,
      errors.map((error) => ({ ...error, path: `${prefix}${error.path}` })),
    );
  }

  async hashPassword(password: string): Promise<string> {
    return (await this.passwords.run({ password })) as string;
  }

  async checkPassword(password: string, hash: string): Promise<boolean> {
    return (await this.passwords.run({ password, hash })) as boolean;
  }

  async close(): Promise<void> {
    await Promise.all([this.engine.destroy(), this.passwords.destroy()]);
  }
}
