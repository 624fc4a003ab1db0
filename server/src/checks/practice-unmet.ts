import type { Practice } from '../practices/model.ts';
import { PRACTICES } from '../practices/practices.ts';
import { decidesText, demandText, sourceText, sourceWithSubjects } from '../practices/words.ts';
import { type Check, SAYS_NOTHING, type Said } from './check.ts';
import { shortfallBy } from './practice-shortfalls.ts';

export const practiceUnmet: Check<'channel'> = {
  name: 'practice-unmet',
  kind: 'channel',
  severity: 'warning',
  finds: 'The channel does not meet what a practice that it `follows` asks for.',
  why: "A practice is a row of a table: what a standard, or common practice, asks of a rate, a band, a filter, a record or a window. What is taken to it can be compared with what others have taken to it; what is not, can't. Each row holds only what is sure, names its source and says what it leaves out. No figure was looked up for it: all are from memory. Meeting every one of them is not yet following the standard, whose own text decides.",
  shows: `rig: Sled test
channels:
  head:
    follows: impact-class-1000
    rate: 8 kHz
    band: 0.1 Hz .. 1 kHz
    undeclared: -80 dBFS
`,
  clean: `rig: Sled test
channels:
  head:
    follows: impact-class-1000
    # Ten times the class.
    rate: 10 kHz
    band: 0.1 Hz .. 1 kHz
    undeclared: -80 dBFS
`,
  sources: PRACTICES.map((practice) => `\`${practice.name}\`: ${sourceWithSubjects(practice)}.`),
  run(view) {
    const { follows } = view.channel;
    if (follows.length === 0) return SAYS_NOTHING;
    const said: Said[] = [];
    for (const followed of follows) {
      const { practice, place } = followed;
      for (const requirement of practice.requirements) {
        const shortfall = shortfallBy(view, followed, requirement);
        if (!shortfall) continue;
        const { standing, what, figures, excess } = shortfall;
        said.push({
          about: `${practice.name} ${requirement.name}`,
          message: `${what}; \`${practice.name}\` asks for ${demandText(requirement)}. ${sourceSentence(practice)}`,
          place: standing.place,
          related: [...standing.related, { place, message: `\`${practice.name}\` is followed because of this.` }],
          figures: { ...figures, source: sourceText(practice) },
          excess,
        });
      }
    }
    return said;
  },
};

/** Where the figure comes from, and whose word counts in the end. */
function sourceSentence(practice: Practice): string {
  return `The figure is that of ${sourceText(practice)}. ${decidesText(practice)}`;
}
