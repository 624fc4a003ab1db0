import { namePlace, readEntryFields } from './fields.ts';
import type { Filter, Sensor } from './model.ts';
import { readFilter } from './read-filter.ts';
import { readSensor } from './read-sensor.ts';
import type { Reader } from './reader.ts';
import { checkUncomputed } from './uncomputed.ts';

/** Reads an entry of `filters`. */
export function readNamedFilter(reader: Reader): Filter {
  return readFilter(reader, readEntryFields(reader, 'filter'), reader.entry.name, namePlace(reader.entry));
}

/** Reads an entry of `sensors`. */
export function readNamedSensor(reader: Reader): Sensor {
  const fields = readEntryFields(reader, 'sensor');
  checkUncomputed(reader, fields);
  return readSensor(reader, fields, reader.entry.name, namePlace(reader.entry));
}
