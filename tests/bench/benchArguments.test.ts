import { describe, expect, it } from 'vitest';
import { benchArguments } from './benchArguments.js';

describe('benchArguments', () => {
  it('takes the built-in set when nothing else is named', () => {
    expect(benchArguments([], {}).builtinSeeds).toEqual([1]);
    expect(benchArguments(['--corpus', 'a,b'], {})).toMatchObject({ directories: ['a', 'b'], builtinSeeds: [] });
  });

  it('takes the command from the line or the environment', () => {
    expect(benchArguments(['--make', 'make it', '--seeds', '901,902'], {})).toMatchObject({
      command: 'make it',
      seeds: ['901', '902'],
    });
    expect(benchArguments(['--seeds', '5'], { OVERFOLD_LABELLED_SET_COMMAND: 'run' }).command).toBe('run');
  });

  it('refuses seeds without a command and a command without seeds', () => {
    expect(() => benchArguments(['--seeds', '5'], {})).toThrow('--seeds needs --make');
    expect(() => benchArguments(['--make', 'run'], {})).toThrow('--make needs --seeds');
  });

  it('refuses what is no whole number', () => {
    expect(() => benchArguments(['--builtin', '1,x'], {})).toThrow('--builtin: "x" is no whole number above 0.');
    expect(benchArguments(['--builtin', '1,2'], {}).builtinSeeds).toEqual([1, 2]);
  });
});
