import { expect, test } from 'vitest';

test('zod is told not to compile schemas before it makes the first one', async () => {
  await import('#src/lib/zod-setting.ts');
  const { config } = await import('zod');
  expect(config().jitless).toBe(true);
});
