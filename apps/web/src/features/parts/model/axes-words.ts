import type { AxesKind } from '@masswright/contracts';

/** Which of the three axes are told by the body itself, by kind. */
const unique: Record<AxesKind, readonly [boolean, boolean, boolean]> = {
  distinct: [true, true, true],
  'disc-like': [false, false, true],
  'rod-like': [true, false, false],
  ball: [false, false, false],
};

export function isAxisUnique(kind: AxesKind, number: 1 | 2 | 3): boolean {
  return unique[kind][number - 1] ?? false;
}

export function describeAxes(kind: AxesKind): string {
  switch (kind) {
    case 'distinct':
      return 'Three distinct moments: each axis is told by the body.';
    case 'disc-like':
      return 'Moments 1 and 2 are equal, as of a disc: axis 3 stands alone, and axes 1 and 2 are not unique. Any two at right angles to it and to each other serve as well.';
    case 'rod-like':
      return 'Moments 2 and 3 are equal, as of a rod: axis 1 stands alone, and axes 2 and 3 are not unique. Any two at right angles to it and to each other serve as well.';
    case 'ball':
      return 'All three moments are equal, as of a ball: no axis is unique. Every line through the centre of mass is a principal axis.';
  }
}
