import type { RuleMove } from '../study/index.js';

/** What was changed, in a few words. */
export function moveWords({ kind, subject }: RuleMove, crew: (name: string) => string): string {
  switch (kind) {
    case 'as stated':
      return 'the rule itself';
    case 'without a mark':
      return `without the worst mark, ${subject}`;
    case 'without a far mark':
      return `without the far mark ${subject}`;
    case 'without a day':
      return `without the worst day, ${subject}`;
    case 'without a crew': {
      const name = crew(subject ?? '');
      return name.startsWith('crew ') ? `without ${name}` : `without crew ${name}`;
    }
    case 'wrong fixes counted in':
      return 'suspected wrong fixes counted in';
    case 'other form':
      return subject === 'linear-sum' ? 'terms added as they are' : 'terms added as squares';
    case 'other reference':
      return subject === 'absolute' ? 'with the errors of the marks' : 'without the errors of the marks';
  }
}
