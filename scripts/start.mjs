import { runProduct } from './product.mjs';
import { main } from './say.mjs';

await main(async () => {
  process.exitCode = await runProduct({ watched: false });
});
