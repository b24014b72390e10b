import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { wantsDemo } from '../../server/setup/database.mjs';
import { tellingLine } from '../../server/setup/fail.mjs';
import { checkNode } from '../../server/setup/node-version.mjs';
import { leaveHome, notedProcess, noteProcess, takeHome } from '../../server/setup/processes.mjs';

describe('the version of Node.js', () => {
  it.each(['20.19.0', '20.20.2', '22.1.0', '24.0.0'])('%s will do', (version) => {
    expect(() => checkNode(version)).not.toThrow();
  });
  it.each(['18.19.0', '20.18.3', '16.20.2'])('%s is refused in one line that names what is needed', (version) => {
    expect(() => checkNode(version)).toThrow(`Node.js 20.19 or newer is needed, this is ${version}`);
  });
});

describe('the demo teams, whose password is printed in the README', () => {
  const here = 'postgres://a:b@127.0.0.1:5432/x';
  const elsewhere = 'postgres://a:b@db.example:5432/x';
  it.each([
    ['the private cluster', {}],
    ['the private cluster in production', { NODE_ENV: 'production' }],
    ['a database of one’s own on this machine', { DATABASE_URL: here }],
  ])('are loaded with %s', (_, settings) => {
    expect(wantsDemo(settings)).toBe(true);
  });
  it.each([
    ['a database elsewhere', { DATABASE_URL: elsewhere }],
    ['a database elsewhere in production', { DATABASE_URL: elsewhere, NODE_ENV: 'production' }],
    ['an outside database in production', { DATABASE_URL: here, NODE_ENV: 'production' }],
    ['an address that others reach', { HOST: '0.0.0.0' }],
    ['TRIMWICK_DEMO=0', { TRIMWICK_DEMO: '0' }],
  ])('are not loaded with %s', (_, settings) => {
    expect(wantsDemo(settings)).toBe(false);
  });
});

describe('what a failed program said', () => {
  it('is told by the line that names the error, else by the last', () => {
    expect(tellingLine('starting\nnpm error code EUSAGE\nsee the log\n')).toBe('npm error code EUSAGE');
    expect(tellingLine('one\ntwo\n\n')).toBe('two');
  });
});

describe('a noted process', () => {
  let home: string;
  beforeEach(() => {
    home = mkdtempSync(path.join(os.tmpdir(), 'noted-'));
  });
  afterEach(() => {
    rmSync(home, { recursive: true, force: true });
  });

  it('is known while it runs, and not where its number now belongs to another or the note is half written', () => {
    const file = path.join(home, 'own.pid');
    noteProcess(file, process.pid);
    expect(notedProcess(file)?.pid).toBe(process.pid);
    writeFileSync(file, JSON.stringify({ pid: process.pid, began: '1' }));
    expect(notedProcess(file)).toBeUndefined();
    writeFileSync(file, '{"pid":');
    expect(notedProcess(file)).toBeUndefined();
  });

  it('holds its home until it leaves it', () => {
    takeHome(home, 4310);
    expect(() => takeHome(home, 4310)).toThrow(/Port 4310 is in use/);
    expect(() => takeHome(home, 4400)).toThrow(/already runs from .* on port 4310/);
    leaveHome(home);
    expect(() => takeHome(home, 4400)).not.toThrow();
  });
});
