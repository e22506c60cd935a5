import { withOwner } from './owner-data-source.ts';

const done = await withOwner((db) => db.runMigrations({ transaction: 'each' }));
console.log(done.length > 0 ? `Done: ${done.map((each) => each.name).join(', ')}.` : 'Nothing was pending.');
