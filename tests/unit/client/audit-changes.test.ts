import { describe, expect, it } from 'vitest';
import { actionWords, changesBetween, fieldWords, recordName } from '@/views/settings/audit-changes.ts';

describe('what a change did', () => {
  it('when fields differ, only those are named, nested ones by dotted names', () => {
    const before = { name: 'A', size: { rows: 4, columns: 8 }, version: 1 };
    const after = { name: 'A', size: { rows: 5, columns: 8 }, version: 2 };

    expect(changesBetween(before, after)).toEqual([{ field: 'size.rows', before: '4', after: '5' }]);
  });

  it('when a record was made or removed, all of it is new or gone', () => {
    expect(changesBetween(null, { code: 'R1', note: null })).toEqual([{ field: 'code', before: null, after: 'R1' }]);
    expect(changesBetween({ code: 'R1' }, null)).toEqual([{ field: 'code', before: 'R1', after: null }]);
  });

  it('when nothing was kept, there is nothing to show', () => {
    expect(changesBetween(null, null)).toEqual([]);
  });

  it('names the record by code, number, name or e-mail, as it is after the change', () => {
    expect(recordName({ code: 'R1' }, { code: 'R2', name: 'Rack' })).toBe('R2');
    expect(recordName({ email: 'a@example.com' }, null)).toBe('a@example.com');
    expect(recordName(null, { pieces: 3 })).toBe('');
  });

  it('says the action in words', () => {
    expect(actionWords('user.signed_in')).toBe('User signed in');
  });
});

describe('the name of a field', () => {
  it.each([
    ['name', 'name'],
    ['holdUntil', 'hold until'],
    ['pieces.0.listingId', 'pieces 1, listing id'],
    ['netVolumeL', 'net volume l'],
  ])('reads %s as %s', (field, words) => {
    expect(fieldWords(field)).toBe(words);
  });
});
