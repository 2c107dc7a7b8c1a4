import { describe, expect, it } from 'vitest';
import { DEVICE_NAMES, type DeviceRow, deviceRow, type Outcome } from '#libs/engine/index.js';
import { deviceName, deviceTable, enteredWords, openDevices } from './device-words.js';

const tableOf = (...devices: DeviceRow[]) => deviceTable({ result: { devices } } as unknown as Outcome);
const row = (parts: Partial<DeviceRow> & Pick<DeviceRow, 'device'>): DeviceRow =>
  deviceRow({ basis: 'standard', source: 'practice', ...parts });

describe('a device in words', () => {
  it.each(DEVICE_NAMES)('%s has a name and says what it needs', (device) => {
    const full = row({ device, value: 12.3, least: 45.6, most: 78.9, unit: 'A', fitted: 50 });
    const [words] = tableOf(full);
    expect(words!.device).not.toBe(device);
    expect(`${words!.met}${words!.need}`).not.toMatch(/[{}[\]–]/);
    expect(words!.need).not.toBe('');
    expect(words!.basis).toBe('common practice');
  });

  it.each(DEVICE_NAMES)('%s leaves out what is not known', (device) => {
    const [words] = tableOf(row({ device, unit: 'A' }));
    expect(`${words!.met}${words!.need}`).not.toMatch(/null|undefined|NaN|[{}[\]]/);
    expect(words!.fitted).toMatch(/^(not entered|–)$/);
  });

  it('puts numbers in with their unit', () => {
    const [words] = tableOf(row({ device: 'mainDevice.setting', value: 100, least: 143, unit: 'A', fitted: 150 }));
    expect(words).toMatchObject({
      met: '100\u00a0A fundamental, all stages',
      need: '143\u00a0A or more',
      state: 'fits',
    });
    const [limited] = tableOf(row({ device: 'mainDevice.setting', value: 100, least: 143, most: 160, unit: 'A' }));
    expect(limited!.need).toBe('143\u00a0A or more, at most 160\u00a0A');
  });

  it('names the group where there are several', () => {
    const at = (group: number) => row({ device: 'fuse.rating', group, value: 1, least: 1.6, most: 2, unit: 'A' });
    expect(tableOf(at(0))[0]!.device).toBe('fuse of a stage');
    expect(tableOf(at(0), at(1))[1]!.device).toBe('fuse of a stage, group\u00a02');
  });

  it('says what was entered as a person would', () => {
    expect(enteredWords('earthedStar')).toBe('earthed star');
    expect(enteredWords('IP31')).toBe('IP31');
    expect(deviceName('protection.overPressure')).toBe('over-pressure');
  });

  it('counts what was not entered', () => {
    expect(openDevices([row({ device: 'fuse.rating' }), row({ device: 'fuse.rating', fitted: 3 })])).toBe(1);
  });
});
