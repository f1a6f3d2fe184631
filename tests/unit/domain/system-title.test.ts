import { expect, it } from 'vitest';
import { systemTitle } from '../../../shared/domain/system-title.ts';

it('systemTitle: code and name stand together, and once where both are the same', () => {
  expect(systemTitle({ code: 'D', name: 'Saltings' })).toBe('D Saltings');
  expect(systemTitle({ code: 'QT-1', name: 'qt-1' })).toBe('QT-1');
  expect(systemTitle({ code: 'A', name: '' })).toBe('A');
});
