import { DECISION_RULES, RULE_NAMES, type DecisionRule } from '@/emc/kinds';

export { RULE_NAMES };

/** For a choice among them. */
export const RULE_CHOICES = DECISION_RULES.map((value) => ({ value, word: RULE_NAMES[value] }));

/** What each rule does with a margin, as a sentence. */
export const RULE_SAYS: Record<DecisionRule, string> = {
  'guarded-by-u':
    'A reading is under when its margin is larger than the expanded uncertainty U, over when it is over by more than U, and inconclusive in between.',
  'cispr-16-4-2':
    'What U is above Ucispr is added to the level, which is then compared with the limit; on the limit is under. The rule of CISPR 11, 14-1 and 32 and of IEC 61000-6-3 and -6-4.',
  'simple-acceptance':
    'The level itself is compared with the limit; on the limit is under. U is stated and has no part in the verdict.',
};
