/** Recipe section `scan`: what the files do not say about the scan. */
import type { z } from 'zod';
import { choiceField, flagField, numberField, optionalChoiceField, optionalNumberField, section } from '../schema/fields.ts';

export const heightUnits = ['m', 'mm', 'um', 'nm', 'pm', 'angstrom'] as const;
export const currentUnits = ['A', 'mA', 'uA', 'nA', 'pA', 'fA', 'relative'] as const;

export const scanSection = section({
  channel: optionalChoiceField(['height', 'current'], {
    title: 'Channel', description: 'Role of a map whose name does not say whether it is a height or a current.', absent: 'taken from the file name',
  }),
  widthUm: optionalNumberField({ above: 0, max: 1e6 }, {
    title: 'Map width', unit: 'µm', description: 'Full width of the map, pixel edge to pixel edge.', absent: 'taken from the file or its sidecar',
  }),
  heightUm: optionalNumberField({ above: 0, max: 1e6 }, {
    title: 'Map height', unit: 'µm', description: 'Full height of the map, pixel edge to pixel edge.', absent: 'taken from the file, its sidecar, or the width with square pixels',
  }),
  biasV: optionalNumberField({ min: -100, max: 100 }, {
    title: 'Scan bias', unit: 'V', description: 'Voltage between tip and sample during the current map.', absent: 'taken from the file name or sidecar; without it no thickness and no density',
  }),
  biasOn: choiceField(['sample', 'tip'], 'sample', {
    title: 'Bias on', description: 'Which side the bias was applied to; turns the sign of bias and current together.',
  }),
  surface: choiceField(['barrier', 'stack'], 'barrier', {
    title: 'Surface scanned', description: 'A bare barrier, or the finished stack with the emitter on top (then no thickness from current).',
  }),
  heightUnit: optionalChoiceField(heightUnits, {
    title: 'Height unit', description: 'Unit of the height values.', absent: 'taken from the file or its sidecar',
  }),
  currentUnit: optionalChoiceField(currentUnits, {
    title: 'Current unit', description: 'Unit of the current values; "relative" when the scale in amperes is unknown.', absent: 'taken from the file or its sidecar',
  }),
  flipX: flagField(false, { title: 'Mirror left–right', description: 'Mirror the maps left to right after reading.' }),
  flipY: flagField(false, { title: 'Mirror top–bottom', description: 'Mirror the maps top to bottom after reading.' }),
  saturationA: optionalNumberField({ above: 0 }, {
    title: 'Saturation', unit: 'A', description: 'Current above which the amplifier saturates.', absent: 'found where many pixels share the largest value',
  }),
  floorA: optionalNumberField({ above: 0 }, {
    title: 'Floor', unit: 'A', description: 'Current below which the amplifier only shows noise.', absent: 'measured from the map',
  }),
  centreXUm: numberField(0, {}, { title: 'Scan centre x', unit: 'µm', description: 'Centre of the map in the microscope’s coordinates.' }),
  centreYUm: numberField(0, {}, { title: 'Scan centre y', unit: 'µm', description: 'Centre of the map in the microscope’s coordinates.' }),
  rotationDeg: numberField(0, { min: -360, max: 360 }, { title: 'Scan rotation', unit: '°', description: 'Rotation of the map’s x axis in the microscope’s coordinates, counter-clockwise.' }),
  slowUp: flagField(false, { title: 'Slow axis upwards', description: 'The first scan line is the picture’s bottom row.' }),
});

export type ScanSection = z.output<typeof scanSection>;
