import type { ProjectRole } from '../../shared/schemas/account.js';
import type { PutThresholds } from '../../shared/schemas/thresholds.js';
import { defaultThresholds } from '../../shared/schemas/thresholds.js';
import { footbridge } from './batches/footbridge.js';
import { generator } from './batches/generator.js';
import { nightWatch } from './batches/nightWatch.js';
import { pumpHallOne } from './batches/pumpHallOne.js';
import { pumpHallTwo } from './batches/pumpHallTwo.js';
import { stillArriving } from './batches/stillArriving.js';
import { supplyVoltage } from './batches/supplyVoltage.js';
import { twoRates } from './batches/twoRates.js';
import type { DemoBatch } from './DemoBatch.js';

export interface DemoProject {
  name: string;
  description: string;
  /** E-mail address of each member, with the roles there. */
  members: Record<string, ProjectRole[]>;
  uploaderEmail: string;
  thresholds: PutThresholds | null;
  batches: DemoBatch[];
}

const surveyTeam: DemoProject['members'] = {
  'ines@marram.example': ['analyst'],
  'tomas@marram.example': ['reviewer'],
  'yara@marram.example': ['qaManager'],
  'ove@marram.example': ['analyst', 'reviewer', 'qaManager'],
};

/** Three projects of the invented survey; Ines is no member of the last one and must not see it. */
export const demoProjects: readonly DemoProject[] = [
  {
    name: 'Ferrow Quay, pump halls',
    description: 'Autumn survey of the drainage pumps and their gearboxes at the Ferrow Quay station.',
    members: surveyTeam,
    uploaderEmail: 'ines@marram.example',
    thresholds: null,
    batches: [pumpHallOne, pumpHallTwo, twoRates, nightWatch, stillArriving],
  },
  {
    name: 'Ferrow Quay, standby power',
    description: 'Load test of the standby generator, and the supply voltage at the switchboards.',
    members: { ...surveyTeam, 'ines@marram.example': ['analyst', 'reviewer'] },
    uploaderEmail: 'ines@marram.example',
    thresholds: {
      values: { ...defaultThresholds, requiredProtectionDb: 30, independentReview: true },
      reason: 'The client asks for independent review; 30 dB protection is enough for a load test.',
    },
    batches: [generator, supplyVoltage],
  },
  {
    name: 'Ferrow Quay, footbridge',
    description: 'Walking tests on the footbridge beside the sluice.',
    members: {
      'ove@marram.example': ['analyst'],
      'tomas@marram.example': ['reviewer'],
      'yara@marram.example': ['qaManager'],
    },
    uploaderEmail: 'ove@marram.example',
    thresholds: null,
    batches: [footbridge],
  },
];
