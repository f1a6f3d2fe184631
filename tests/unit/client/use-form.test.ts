import { nextTick } from 'vue';
import { describe, expect, it, vi } from 'vitest';
import { z } from 'zod';
import { useFieldMessages } from '../../../shared/contracts/field-messages.ts';
import { ApiError, unreachable } from '../../../src/api/api-error.ts';
import { parseDraft } from '../../../src/composables/parse-draft.ts';
import { type SubmitContext, useForm } from '../../../src/composables/useForm.ts';

useFieldMessages();

const Loss = z.strictObject({
  pieces: z.int('Enter a whole number.').min(1, 'At least 1.'),
  note: z.string().max(10).optional(),
  address: z.object({ city: z.string().min(1, 'Fill this in.') }),
});
const empty = { pieces: null, note: '', address: { city: '' } };
const filled = { pieces: 3, note: '', address: { city: 'Tidewick' } };

const refused = (status: number, fields: { path: string; message: string }[] = []) =>
  new ApiError({ code: 'rule.refused', status, detail: 'Not now.', fields });

describe('useForm', () => {
  it('when fields break the contract, shows a message at each dotted path and sends nothing', async () => {
    const send = vi.fn(() => Promise.resolve());
    const form = useForm(Loss, empty, send);

    expect(await form.submit()).toBe(false);

    expect(form.errors).toEqual({ pieces: 'Enter a whole number.', 'address.city': 'Fill this in.' });
    expect(form.field('address.city').errorMessages).toEqual(['Fill this in.']);
    expect(send).not.toHaveBeenCalled();
  });

  it('when a refused field changes, only its own message goes', async () => {
    const form = useForm(Loss, empty, () => Promise.resolve());
    await form.submit();

    form.values.pieces = 2;
    await nextTick();

    expect(form.errors).toEqual({ 'address.city': 'Fill this in.' });
  });

  it('when the server refuses fields, shows its messages in place and no general failure', async () => {
    const form = useForm(Loss, filled, () =>
      Promise.reject(refused(400, [{ path: 'pieces', message: 'Only 2 left.' }])),
    );

    expect(await form.submit()).toBe(false);

    expect(form.field('pieces').errorMessages).toEqual(['Only 2 left.']);
    expect(form.failure).toBeNull();
    expect(form.refusals).toBe(1);
  });

  it('when the server refuses the whole, keeps its reason', async () => {
    const form = useForm(Loss, filled, () => Promise.reject(refused(409)));

    await form.submit();

    expect(form.failure?.detail).toBe('Not now.');
  });

  it('when submitted twice at once, sends once', async () => {
    const send = vi.fn(() => Promise.resolve());
    const form = useForm(Loss, filled, send);

    const outcomes = await Promise.all([form.submit(), form.submit()]);

    expect(outcomes).toEqual([true, false]);
    expect(send).toHaveBeenCalledTimes(1);
  });

  it('when the server did not answer, the next try has the same key; after an answer it has a new one', async () => {
    const keys: string[] = [];
    const answers = [unreachable(), refused(409)];
    const form = useForm(Loss, filled, (_data, { idempotencyKey }: SubmitContext) => {
      keys.push(idempotencyKey);
      const failure = answers.shift();
      return failure ? Promise.reject(failure) : Promise.resolve();
    });

    for (let attempt = 0; attempt < 4; attempt += 1) await form.submit();

    expect(keys[1]).toBe(keys[0]);
    expect(new Set(keys).size).toBe(3);
  });
});

describe('parseDraft', () => {
  it('when an empty field may be left out, leaves it out', () => {
    const parsed = parseDraft(z.strictObject({ email: z.email().optional() }), { email: '' });

    expect(parsed).toEqual({ ok: true, data: {} });
  });

  it('when an empty field may be null, sends null', () => {
    const parsed = parseDraft(z.strictObject({ litres: z.number().nullable() }), { litres: '' });

    expect(parsed).toEqual({ ok: true, data: { litres: null } });
  });

  it('when an empty field is needed, asks to fill it in', () => {
    const parsed = parseDraft(z.strictObject({ litres: z.number() }), { litres: null });

    expect(parsed).toEqual({ ok: false, errors: { litres: 'Fill this in.' } });
  });

  it('when a list holds a bad row, names the row in the path', () => {
    const parsed = parseDraft(z.strictObject({ rows: z.array(z.strictObject({ n: z.number() })) }), {
      rows: [{ n: 1 }, { n: 'x' }],
    });

    expect(parsed).toEqual({ ok: false, errors: { 'rows.1.n': 'Enter a number.' } });
  });
});
