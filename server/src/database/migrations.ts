import { CreatePeople1764570000000 } from './migrations/1764570000000-create-people';
import { CreateAccess1764570000100 } from './migrations/1764570000100-create-access';
import { CreateMailAndAudit1764570000200 } from './migrations/1764570000200-create-mail-and-audit';
import { CreateArchive1764580000060 } from './migrations/1764580000060-create-archive';
import { CreateTakes1764600000000 } from './migrations/1764600000000-create-takes';
import { CreateRigCalibrations1764601000000 } from './migrations/1764601000000-create-rig-calibrations';

/** Every migration in order; one that has been merged is never edited. */
export const migrations = [
  CreatePeople1764570000000,
  CreateAccess1764570000100,
  CreateMailAndAudit1764570000200,
  CreateArchive1764580000060,
  CreateTakes1764600000000,
  CreateRigCalibrations1764601000000,
];
