import * as z from 'zod/mini';
import { MAX_NOTE_LENGTH } from './limits.ts';

/** What the reviewers of a dam answer on each revision, and their answers. */

export const MAX_CHECK_LIST_ITEMS = 60;
export const MAX_CHECK_ITEM_LENGTH = 300;

/** One question. Its id changes when its words do, so that no answer belongs to other words. */
export const checkListItem = z.object({
  id: z.string().check(z.minLength(1), z.maxLength(64)),
  text: z.string().check(z.trim(), z.minLength(1), z.maxLength(MAX_CHECK_ITEM_LENGTH)),
});
export type CheckListItem = z.infer<typeof checkListItem>;

/** `PUT /dams/:damId/check-list`: the dam's own list in its order; null puts the usual one back. */
export const checkListInput = z.object({
  items: z.nullable(z.array(checkListItem).check(z.maxLength(MAX_CHECK_LIST_ITEMS))),
});
export const checkListDto = z.object({
  items: z.array(checkListItem),
  /** True while the dam has no list of its own. */
  isUsual: z.boolean(),
});
export type CheckListDto = z.infer<typeof checkListDto>;

export const checkAnswer = z.enum(['yes', 'no', 'notApplicable']);
export type CheckAnswer = z.infer<typeof checkAnswer>;

export const checkListAnswer = z.object({
  itemId: z.string().check(z.maxLength(64)),
  answer: z.nullable(checkAnswer),
  remark: z.string().check(z.trim(), z.maxLength(MAX_NOTE_LENGTH)),
});
export type CheckListAnswer = z.infer<typeof checkListAnswer>;

/** An item as a decision froze it. */
export const answeredItem = z.object({
  id: z.string(),
  text: z.string(),
  /** Null: left unanswered, which only a revision that was returned may be. */
  answer: z.nullable(checkAnswer),
  remark: z.string(),
});
export type AnsweredItem = z.infer<typeof answeredItem>;
