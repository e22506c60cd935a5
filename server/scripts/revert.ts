import { withOwner } from './owner-data-source.ts';

await withOwner((db) => db.undoLastMigration({ transaction: 'each' }));
console.log('The last migration is undone.');
