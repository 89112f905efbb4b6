import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync } from 'node:fs';
import path from 'node:path';
import { readJson, writeJson } from './processes.mjs';

const NAMES = [
  'databaseRootPassword',
  'databaseOwnerPassword',
  'databaseApplicationPassword',
  'nextAuthSecret',
];

/**
 * The installation's secrets, made at the first start: random, readable by this user only, outside version
 * control. The same ones at every later start.
 * @param dataFolder the folder that keeps them
 * @throws Error when the file is there but not whole (a database would be locked out by new passwords)
 */
export function installationSecrets(dataFolder) {
  const file = path.join(dataFolder, 'secrets.json');
  const kept = readJson(file);
  if (kept) {
    const missing = NAMES.filter((name) => typeof kept[name] !== 'string' || kept[name].length < 32);
    if (missing.length === 0) {
      chmodSync(file, 0o600);
      return kept;
    }
  }
  if (existsSync(file))
    throw new Error(`${file} is damaged. Put it back from a copy, or remove it to have it made anew.`);
  const made = Object.fromEntries(NAMES.map((name) => [name, randomBytes(32).toString('base64url')]));
  writeJson(file, made, 0o600);
  return made;
}
