import type { PulseTrain } from '../signal/pulse-train.ts';
import { type Field, readFieldsOf, reportMissingKeys } from './fields.ts';
import type { Given } from './model.ts';
import { readEnds, readValue } from './quantities.ts';
import type { Reader } from './reader.ts';
import { given, readNumber, reportWrongKind } from './values.ts';

const USUAL_DUTY = 0.5;

/** Reads `pulses`: a train of pulses of which the edges count. */
export function readPulses(reader: Reader, field: Field | undefined): Given<PulseTrain> | undefined {
  if (!field || field.node.kind === 'empty') return undefined;
  if (field.node.kind !== 'map') {
    reportWrongKind(reader, field);
    return undefined;
  }
  const fields = readFieldsOf(reader, 'pulses', field, field.node);
  reportMissingKeys(reader, fields, ['per-turn', 'speed']);
  const perTurn = readNumber(reader, fields.byKey.get('per-turn'))?.value;
  const speedField = fields.byKey.get('speed');
  const speed = speedField && readEnds(reader, speedField);
  const duty = readValue(reader, fields.byKey.get('duty'))?.value ?? USUAL_DUTY;
  if (perTurn === undefined || !speed) return undefined;
  return given(field, { perTurn, topSpeedRpm: speed.highValue * RPM_PER_HZ, duty });
}

/** Speeds are read in turns per second. */
const RPM_PER_HZ = 60;
