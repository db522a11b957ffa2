// @vitest-environment happy-dom
import { mount } from '@vue/test-utils';
import { describe, expect, it } from 'vitest';
import type { ThreePoint } from '../../shared/contracts/values';
import { readMinutes, readPresence } from '../../shared/domain/entries';
import BaseEntry from '../../src/components/base/BaseEntry.vue';

const minutes = (text = '30 · 45 · 70') => mount(BaseEntry<ThreePoint>, { props: { label: 'Minutes', text, read: readMinutes } });

describe('text edited in place', () => {
  it('is taken with Enter, read', async () => {
    const entry = minutes();
    await entry.find('input').setValue('50');
    expect(entry.emitted('take')).toBeUndefined();
    await entry.find('input').trigger('keydown', { key: 'Enter' });
    expect(entry.emitted('take')).toEqual([[50]]);
  });

  it('is taken when it is left, and cleared by nothing', async () => {
    const entry = minutes();
    await entry.find('input').setValue('');
    await entry.find('input').trigger('blur');
    expect(entry.emitted('take')).toEqual([[null]]);
  });

  it('says nothing where nothing changed', async () => {
    const entry = minutes();
    await entry.find('input').trigger('blur');
    expect(entry.emitted('take')).toBeUndefined();
  });

  it('stays as typed where it is not understood, and says what was expected, tied to the field', async () => {
    const entry = minutes();
    const input = entry.find('input');
    await input.setValue('an hour');
    await input.trigger('blur');
    expect(entry.emitted('take')).toBeUndefined();
    expect(input.element.value).toBe('an hour');
    expect(input.attributes('aria-invalid')).toBe('true');
    expect(entry.find(`#${CSS.escape(input.attributes('aria-describedby') ?? '')}`).text()).toContain('Expected minutes such as 45');
  });

  it('gives back what stood there with Esc, and keeps that Esc to itself', async () => {
    const entry = minutes();
    const input = entry.find('input');
    let left = 0;
    entry.element.addEventListener('keydown', () => (left += 1));
    await input.setValue('99');
    await input.trigger('keydown', { key: 'Escape' });
    expect(input.element.value).toBe('30 · 45 · 70');
    await input.trigger('keydown', { key: 'Escape' });
    expect(left).toBe(1);
  });

  it('takes what others changed, but not over what is being mended', async () => {
    const entry = minutes();
    await entry.setProps({ text: '60' });
    expect(entry.find('input').element.value).toBe('60');
    await entry.find('input').setValue('an hour');
    await entry.find('input').trigger('blur');
    await entry.setProps({ text: '75' });
    expect(entry.find('input').element.value).toBe('an hour');
  });

  it('writes several lines with Enter and takes them with Ctrl+Enter', async () => {
    const read = (text: string) => readPresence(text, '2027-03-08');
    const entry = mount(BaseEntry, { props: { label: 'Windows', text: 'always', read, lines: 2 } });
    const area = entry.find('textarea');
    await area.setValue('8 Mar 14–18\n9 Mar');
    await area.trigger('keydown', { key: 'Enter' });
    expect(entry.emitted('take')).toBeUndefined();
    await area.trigger('keydown', { key: 'Enter', ctrlKey: true });
    expect(entry.emitted('take')?.[0]?.[0]).toHaveLength(2);
  });
});
