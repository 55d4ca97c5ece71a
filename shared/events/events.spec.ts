import {refusedAt} from '../test-support/changed';
import {Nudge, Topic} from './events';

describe('Topic', () => {
  it('accepts one attempt, and all of them', () => {
    expect(refusedAt(Topic, 'attempt:0199f0a0-0000-7000-8000-000000000001')).toEqual([]);
    expect(refusedAt(Topic, 'attempts')).toEqual([]);
  });

  for (const topic of ['', 'attempt:', 'attempt:1', 'attempts:all', 'exercises', 'xattempts', 5])
    it(`refuses ${JSON.stringify(topic)}`, () => {
      expect(Topic.safeParse(topic).success).toBeFalse();
    });
});

describe('Nudge', () => {
  it('says what changed and nothing of what it became', () => {
    const nudge = {topic: 'attempts', kind: 'attempt', id: 'x'};

    expect(refusedAt(Nudge, nudge)).toEqual([]);
    expect(refusedAt(Nudge, {...nudge, score: 12})).toEqual(['score']);
    expect(refusedAt(Nudge, {kind: 'attempt', id: 'x'})).toEqual(['topic']);
  });
});
