/** SQL: somebody else wrote in the note `o` after what the person, a parameter such as `$1`, has read of it. */
export const isUnreadBy = (person: string) => `EXISTS (
        SELECT 1 FROM (
          SELECT e.author_id, row_number() OVER (ORDER BY e.created_at, e.id) AS place
          FROM note_entry e WHERE e.note_id = o.id
        ) e
        WHERE e.author_id <> ${person} AND e.place > coalesce(
          (SELECT r.entries FROM note_read r WHERE r.note_id = o.id AND r.person_id = ${person}), 0))`;
