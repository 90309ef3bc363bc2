import { describe, expect, it } from 'vitest';
import { detailText } from '../../../app/w/[workspace]/settings/activity/detail-text';

describe('the details of an entry', () => {
  it.each([
    [{}, ''],
    [{ wireHops: 16, name: 'Hive' }, 'Hive; wire hops: 16'],
    [{ bench: 'Slope', timeLimitMs: 5000 }, 'bench: Slope; time limit: 5 s'],
    [{ before: 'viewer', after: null }, 'before: viewer; after: none'],
    [{ archived: true }, 'archived: yes'],
  ])('%j read "%s"', (detail, text) => {
    expect(detailText(detail)).toBe(text);
  });
});
