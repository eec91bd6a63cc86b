import { existsSync, mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { endProcess, findIdentity, isAlive } from '../services/process-identity.mjs';
import { Obstacle } from '../setup/checkout.mjs';

/** @typedef {import('../services/guardian.mjs').Ward} Ward */

/**
 * Notes of the processes that a start runs, one file each, so that the next start finds what one that ended badly left behind.
 */
export class RunNotes {
  /** @param {string} folder */
  constructor(folder) {
    this.folder = folder;
    mkdirSync(folder, { recursive: true });
    this.own = path.join(folder, 'start.json');
  }

  /** Refuses when another run of the kind goes on in this checkout. @param {string} what as people read it, such as its address */
  claim(what) {
    if (existsSync(this.own)) {
      const other = JSON.parse(readFileSync(this.own, 'utf8'));
      if (isAlive(other)) throw new Obstacle(`There is one running already in this checkout: ${other.what} (process ${other.pid}).`);
    }
    writeFileSync(this.own, JSON.stringify({ ...findIdentity(process.pid), what }));
  }

  /** @param {Ward} ward */
  write(ward) {
    writeFileSync(path.join(this.folder, `process-${ward.name.toLowerCase().replace(/\W+/g, '-')}.json`), JSON.stringify(ward));
  }

  /** Stops what an earlier start left running, in order. @returns {Promise<string[]>} the names */
  async stopLeftovers() {
    /** @type {Ward[]} */
    const left = [];
    for (const name of readdirSync(this.folder).filter((file) => file.startsWith('process-'))) {
      /** @type {Ward} */
      const ward = JSON.parse(readFileSync(path.join(this.folder, name), 'utf8'));
      if (isAlive(ward)) left.push(ward);
      rmSync(path.join(this.folder, name));
    }
    left.sort((a, b) => b.order - a.order);
    for (const ward of left) await endProcess(ward, ward.stopSignal, ward.deadlineMs);
    return left.map((ward) => ward.name);
  }

  /** @param {boolean} all also the notes of processes */
  clear(all) {
    rmSync(this.own, { force: true });
    if (all) for (const name of readdirSync(this.folder)) rmSync(path.join(this.folder, name));
  }
}
