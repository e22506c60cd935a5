/** How a value came to be here: read in the source named, or recalled and not looked up. */
export type Provenance = 'read' | 'fromMemory';

/** A value that a book or manual gives, shown as information beside a figure, never as a verdict. */
export type PublishedValue = {
  readonly about: 'specificGravity' | 'heave' | 'piping' | 'exitGradient' | 'gradientAtToe' | 'laneRatio';
  readonly name: string;
  /** One value, or the ends of a range. */
  readonly from: number;
  readonly to: number;
  readonly source: string;
  readonly provenance: Provenance;
};

const VENKATRAMAIAH = 'Venkatramaiah, Geotechnical Engineering, Table 3.1';
const HANDY = 'Handy and Spangler, Geotechnical Engineering, sec. 7.8';
const BOND = 'Bond and Harris (2008), Decoding Eurocode 7, older advice quoted there';
const EM_1901 = 'as quoted in EM 1110-2-1901';
const LANE = 'Lane (1935), Trans. ASCE 100';

const value = (
  about: PublishedValue['about'],
  name: string,
  from: number,
  to: number,
  source: string,
  provenance: Provenance,
): PublishedValue => ({ about, name, from, to, source, provenance });

/**
 * Values that manuals and books give: usual grain specific gravities, customary least factors, Lane's least weighted
 * creep ratios. Those marked `fromMemory` were not looked up and must be shown with that remark.
 */
export const PUBLISHED_VALUES: readonly PublishedValue[] = [
  value('specificGravity', 'quartz sand', 2.64, 2.65, VENKATRAMAIAH, 'read'),
  value('specificGravity', 'silt', 2.68, 2.72, VENKATRAMAIAH, 'read'),
  value('specificGravity', 'clay', 2.44, 2.92, VENKATRAMAIAH, 'read'),
  value('specificGravity', 'loess', 2.65, 2.75, VENKATRAMAIAH, 'read'),
  value('specificGravity', 'peat', 1.26, 1.8, VENKATRAMAIAH, 'read'),
  value('specificGravity', 'most sands', 2.65, 2.68, HANDY, 'read'),
  value('specificGravity', 'most clays', 2.68, 2.72, HANDY, 'read'),
  value('heave', 'sheeted excavation, low advice', 1.5, 2, BOND, 'read'),
  value('heave', 'sheeted excavation, strict advice', 4, 5, BOND, 'read'),
  value(
    'piping',
    'erosion and piping, conventional practice',
    3,
    3,
    'Duncan and Sleep, Evaluating reliability in geotechnical engineering, abstract',
    'read',
  ),
  value('exitGradient', 'Harr 1962', 4, 5, EM_1901, 'fromMemory'),
  value('exitGradient', 'Cedergren 1977', 2.5, 3, EM_1901, 'fromMemory'),
  value('exitGradient', 'range quoted', 1.5, 15, EM_1901, 'fromMemory'),
  value(
    'gradientAtToe',
    'levee toe with a blanket, allowable gradient',
    0.5,
    0.5,
    'EM 1110-2-1913',
    'fromMemory',
  ),
  value(
    'gradientAtToe',
    'the same as a factor, for a critical gradient of about 0.8',
    1.6,
    1.6,
    'EM 1110-2-1913',
    'fromMemory',
  ),
  value('laneRatio', 'very fine sand or silt', 8.5, 8.5, LANE, 'read'),
  value('laneRatio', 'fine sand', 7, 7, LANE, 'read'),
  value('laneRatio', 'medium sand', 6, 6, LANE, 'fromMemory'),
  value('laneRatio', 'coarse sand', 5, 5, LANE, 'read'),
  value('laneRatio', 'fine gravel', 4, 4, LANE, 'fromMemory'),
  value('laneRatio', 'medium gravel', 3.5, 3.5, LANE, 'fromMemory'),
  value('laneRatio', 'coarse gravel with cobbles', 3, 3, LANE, 'fromMemory'),
  value('laneRatio', 'boulders with some cobbles and gravel', 2.5, 2.5, LANE, 'fromMemory'),
  value('laneRatio', 'soft clay', 3, 3, LANE, 'read'),
  value('laneRatio', 'medium clay', 2, 2, LANE, 'fromMemory'),
  value('laneRatio', 'hard clay', 1.8, 1.8, LANE, 'fromMemory'),
  value('laneRatio', 'very hard clay or hardpan', 1.6, 1.6, LANE, 'read'),
];

/** The published values about one thing, in the order of the table. */
export function publishedValues(about: PublishedValue['about']): PublishedValue[] {
  return PUBLISHED_VALUES.filter((each) => each.about === about);
}
