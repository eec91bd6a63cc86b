export { integrateCorners, integrateStl } from './blocked';
export { integrateCornersCarefully } from './double-double';
export { sketchCorners, sketchStl } from './sketch';
