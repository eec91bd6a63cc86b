import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The root of the checkout. */
export const root = fileURLToPath(new URL('../../', import.meta.url)).replace(/\/$/, '');

/** @param {...string} parts */
export const inCheckout = (...parts) => path.join(root, ...parts);

/** A sentence for the person at the terminal; nothing else is printed about it. */
export class Obstacle extends Error {}
