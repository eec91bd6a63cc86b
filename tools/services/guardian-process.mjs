// Runs on its own: reads lines {"add": ward} and {"remove": pid}; when the pipe closes it stops the wards in order and ends.
import readline from 'node:readline';
import { endProcess } from './process-identity.mjs';

/** @typedef {import('./guardian.mjs').Ward} Ward */
/** @type {Map<number, Ward>} */
const wards = new Map();

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => undefined);

for await (const line of readline.createInterface({ input: process.stdin })) {
  /** @type {{ add?: Ward, remove?: number }} */
  const message = JSON.parse(line);
  if (message.add !== undefined) wards.set(message.add.pid, message.add);
  if (message.remove !== undefined) wards.delete(message.remove);
}

const orders = [...new Set([...wards.values()].map((ward) => ward.order))].sort((a, b) => b - a);
for (const order of orders) {
  const together = [...wards.values()].filter((ward) => ward.order === order);
  await Promise.all(together.map((ward) => endProcess(ward, ward.stopSignal, ward.deadlineMs)));
}
