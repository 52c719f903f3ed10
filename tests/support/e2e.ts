import { test as base } from '@playwright/test';
import type { Product } from './product.ts';
import { startProduct } from './product.ts';

type WorkerFixtures = {
  /** Settings of the product that a file's tests need otherwise than by default. */
  productEnv: Record<string, string>;
  product: Product;
};

/**
 * Browser tests against a real product. Each test runner process has a product of its own, with its own
 * freshly filled demo clinic; a failed test gives the tests after it a new one.
 */
export const test = base.extend<object, WorkerFixtures>({
  productEnv: [{}, { scope: 'worker', option: true }],
  product: [
    async ({ productEnv }, use) => {
      const product = await startProduct({ env: productEnv });
      await use(product);
      await product.stop();
    },
    // The first one may have to build.
    { scope: 'worker', timeout: 240_000 },
  ],
  baseURL: async ({ product }, use) => use(product.url),
});
