/** What a figure measures, by which it is converted and written. */
export type Quantity =
  | 'offset'
  | 'elevation'
  | 'totalHead'
  | 'length'
  | 'drops'
  | 'count'
  | 'ratio'
  | 'factor'
  | 'pressure'
  | 'unitWeight'
  | 'permeability'
  | 'seepage'
  | 'force'
  | 'scale';

export type FigureName =
  | 'headwater'
  | 'tailwater'
  | 'gammaW'
  | 'k'
  | 'kv'
  | 'drops'
  | 'channels'
  | 'shapeFactor'
  | 'headLost'
  | 'headPerDrop'
  | 'seepage'
  | 'seepageFactor'
  | 'scale'
  | 'residual'
  | 'poorCells'
  | 'poorAngles'
  | 'poorChannels'
  | 'creepRatio'
  | 'outletHead'
  | 'offset'
  | 'elevation'
  | 'dropsLost'
  | 'totalHead'
  | 'pressureHead'
  | 'porePressure'
  | 'measuredDifference'
  | 'greatestPressure'
  | 'uplift'
  | 'upliftUp'
  | 'upliftSideways'
  | 'upliftArm'
  | 'excess'
  | 'excessUp'
  | 'ru'
  | 'cellGradient'
  | 'pointGradient'
  | 'exitFactor'
  | 'pointFactor'
  | 'seepageForce'
  | 'excessHead'
  | 'heaveFactor';

/** A figure with its ±; null where it was not worked out or there is none. */
export type Figure = {
  readonly what: FigureName;
  readonly quantity: Quantity;
  readonly value: number | null;
  readonly plusMinus: number | null;
  /** Significant figures that it deserves, where that is not the quantity's own matter. */
  readonly digits: number | null;
};

export type GroupKind = 'levels' | 'net' | 'outlet' | 'point' | 'profile' | 'sample' | 'exit' | 'heave';

/** The figures of one thing: of the net, of a reading point, of a profile. */
export type FigureGroup = {
  readonly kind: GroupKind;
  /** By which it is found again in another reading of the same net. */
  readonly id: string;
  readonly name: string;
  readonly status: 'read' | 'abovePhreatic' | 'withheld';
  /** Why there are no figures; empty where there are. */
  readonly reason: string;
  readonly figures: readonly Figure[];
};
