import type { Chain } from '../chain/model.ts';
import { reported } from './number.ts';

/** A level under a name that tells its scale: dBFS where there is a full scale. `null` where it is no number. */
export function levelKey(name: string, chain: Chain, level: number): Readonly<Record<string, number | null>> {
  const value = Number.isFinite(level) ? reported(level) : null;
  switch (chain.levelUnit) {
    case 'dbfs':
      return { [`${name}Dbfs`]: value };
    case 'db-volt':
      return { [`${name}DbVolt`]: value };
    case 'db-measured':
      return { [`${name}DbMeasured`]: value };
    case 'relative':
      return { [`${name}Db`]: value };
  }
}
