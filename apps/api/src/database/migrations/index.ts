import { MakePeople1764547200000 } from './1764547200000-make-people.js';
import { MakeHouse1764547260000 } from './1764547260000-make-house.js';
import { MakePartiesAndPlaces1764547320000 } from './1764547320000-make-parties-and-places.js';
import { MakeLots1764547380000 } from './1764547380000-make-lots.js';
import { MakeLedger1764547440000 } from './1764547440000-make-ledger.js';
import { GuardLedger1764547500000 } from './1764547500000-guard-ledger.js';
import { ReckonCosts1764547560000 } from './1764547560000-reckon-costs.js';
import { WriteMovements1764547620000 } from './1764547620000-write-movements.js';
import { SealLedger1764547680000 } from './1764547680000-seal-ledger.js';
import { GrantRights1764547740000 } from './1764547740000-grant-rights.js';

/** In the order they run. Dated files, never edited once landed. */
export const migrations = [
  MakePeople1764547200000,
  MakeHouse1764547260000,
  MakePartiesAndPlaces1764547320000,
  MakeLots1764547380000,
  MakeLedger1764547440000,
  GuardLedger1764547500000,
  ReckonCosts1764547560000,
  WriteMovements1764547620000,
  SealLedger1764547680000,
  GrantRights1764547740000,
];
