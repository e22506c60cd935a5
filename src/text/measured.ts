import { inLanguage } from './language.ts';

/** Words for what instruments showed, beside the net. */
const en = {
  title: (name: string) => `Measured at ${name || 'the point'}`,
  lead: 'What the instrument of this point showed. The difference is measured minus net: positive is adverse, the ground holds more water than the net says.',
  open: 'Type what was measured',
  change: 'Change what was measured',
  column: (unit: string) => `Measured, ${unit}`,
  difference: (unit: string) => `Measured − net, ${unit}`,
  as: 'What was read',
  kinds: { totalHead: 'a total head', pressureHead: 'a pressure head', porePressure: 'a pressure' },
  values: {
    totalHead: (units: { level: string }) => `Total head, ${units.level}`,
    pressureHead: (units: { length: string }) => `Pressure head above the tip, ${units.length}`,
    porePressure: (units: { pressure: string }) => `Pressure at the tip, ${units.pressure}`,
  },
  plusMinus: (unit: string) => `± of it, ${unit}`,
  plusMinusHint: 'Half of the range that holds the true value with 95 %. Empty: it counts as exact.',
  on: 'Read on',
  onHint: 'The day, and the reservoir level if you know it.',
  tip: (unit: string) => `± of the elevation typed, ${unit}`,
  tipHint: 'How well the elevation of the tip is known.',
  tooSmall: 'A ± cannot be below zero.',
  clear: 'Take the measured value away',
  noNet: 'The net gives no head here to set it beside.',
  wet: 'Water was measured above the phreatic line of the net.',
  wetShort: 'above the phreatic line',
  result: (difference: string, plusMinus: string, unit: string) =>
    `Measured minus net ${difference}${plusMinus} ${unit}.`,
  beyondAdverse: 'More than the ± explains, and adverse.',
  beyondLow: 'Less than the net says, by more than the ± explains.',
  within: 'Within the ±.',
  labels: {
    changed: (name: string) => `typed what was measured at ${name}`,
    cleared: (name: string) => `took the measured value of ${name} away`,
    tip: (name: string) => `typed how well the elevation of ${name} is known`,
  },
} as const;
export const measuredText = inLanguage({ en });
