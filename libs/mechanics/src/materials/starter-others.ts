import { starter, type StarterMaterial } from './starter-material';

/** Densities at room temperature, check values section 7; a range there is its middle ± half its width here. */
export const starterOthers: readonly StarterMaterial[] = [
  starter('abs', 'ABS', 'polymer', 1040, 30, 'memory'),
  starter('asa', 'ASA', 'polymer', 1070, 'blend', 'memory'),
  starter('pla', 'PLA', 'polymer', 1240, 30, 'memory'),
  starter('petg', 'PETG', 'polymer', 1270, 20, 'memory'),
  starter('pa12', 'PA12, moulded', 'polymer', 1010, 'polymer', 'memory'),
  // .93 to .99 g/cm³.
  starter('pa12-sintered', 'PA12, sintered', 'polymer', 960, 30, 'memory'),
  starter('pa66', 'PA66', 'polymer', 1140, 'polymer', 'nist'),
  starter('pc', 'PC (polycarbonate)', 'polymer', 1200, 'polymer', 'nist'),
  starter('pom', 'POM (acetal)', 'polymer', 1425, 'polymer', 'nist'),
  starter('peek', 'PEEK', 'polymer', 1300, 20, 'memory'),
  starter('pe', 'PE (polyethylene)', 'polymer', 940, 'polymer', 'nist'),
  starter('pp', 'PP (polypropylene)', 'polymer', 900, 'polymer', 'nist'),
  starter('ps', 'PS (polystyrene)', 'polymer', 1060, 'polymer', 'nist'),
  // The NIST list has 1300.
  starter('pvc-rigid', 'PVC, rigid', 'polymer', 1400, 100, 'memory'),
  starter('pmma', 'PMMA (acrylic)', 'polymer', 1190, 'polymer', 'nist'),
  starter('ptfe', 'PTFE', 'polymer', 2200, 'polymer', 'nist'),
  starter('pet', 'PET', 'polymer', 1400, 'polymer', 'nist'),
  starter('polyimide', 'Polyimide', 'polymer', 1420, 'polymer', 'nist'),
  // 1.15 to 1.20 g/cm³.
  starter('resin-cured', 'Printing resin, cured', 'polymer', 1175, 25, 'memory'),

  starter('natural-rubber', 'Natural rubber, gum', 'elastomer', 920, 'elastomer', 'nist'),
  starter('neoprene', 'Neoprene', 'elastomer', 1230, 'elastomer', 'nist'),
  starter('fkm', 'FKM (fluoroelastomer)', 'elastomer', 1800, 'elastomer', 'nist'),
  starter('tpu', 'TPU', 'elastomer', 1200, 'blend', 'memory'),

  starter('cfrp', 'CFRP (carbon fibre in epoxy)', 'composite', 1550, 50, 'memory'),
  starter('fr4', 'FR4 (glass fibre in epoxy)', 'composite', 1850, 'composite', 'memory'),
  starter('aramid-fibre', 'Aramid fibre', 'composite', 1440, 'polymer', 'nist'),

  starter('balsa', 'Balsa', 'wood', 130, 'wood', 'tpsx'),
  starter('cypress', 'Cypress', 'wood', 460, 'wood', 'tpsx'),
  starter('mahogany', 'Mahogany', 'wood', 540, 'wood', 'tpsx'),
  starter('maple', 'Maple', 'wood', 710, 'wood', 'tpsx'),
  starter('teak', 'Teak', 'wood', 640, 'wood', 'tpsx'),
  starter('oak', 'Oak', 'wood', 710, 'wood', 'physics'),
  starter('pine', 'Pine', 'wood', 373, 'wood', 'physics'),

  starter('glass', 'Glass, plate', 'glass-ceramic', 2400, 'glass', 'nist'),
  starter('glass-borosilicate', 'Borosilicate glass', 'glass-ceramic', 2230, 'glass', 'nist'),
  starter('alumina', 'Aluminium oxide, dense', 'glass-ceramic', 3970, 'glass', 'nist'),

  starter('concrete', 'Concrete', 'other', 2300, 'mixed', 'nist'),
  starter('granite', 'Granite', 'other', 2700, 'stone', 'physics'),
  // Machined grades, 1.75 to 1.90 g/cm³.
  starter('graphite', 'Graphite, machined grades', 'other', 1825, 75, 'memory'),
  // Between 0 and 30 °C water stays within 3 kg/m³ of its density at 20 °C.
  starter('water', 'Water at 20 °C', 'other', 998.2, 3, 'physics'),
  starter('cork', 'Cork', 'other', 240, 'cork', 'physics'),
  starter('eps', 'EPS (polystyrene foam)', 'other', 16.3, 'foam', 'tpsx'),
];
