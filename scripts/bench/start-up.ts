/** From the command to "ready": with an empty database, and again with everything there. */
import type { Take } from './measurement';
import { median } from './measurement';
import { forgetData, type Product, type ProductPlace, startProduct } from './product';

const AGAIN = 3;

/** Measures both and leaves the last one running. Packages and the web build are there before the clock starts. */
export async function measureStartUp(place: ProductPlace, take: Take): Promise<Product> {
  // Builds what is not built yet: that happens once per change and is no part of a start.
  await (await startProduct(place)).stop();
  forgetData(place);
  let product = await startProduct(place);
  take({
    group: 'start-up',
    name: 'with an empty database, built already',
    value: product.startedInMs,
    unit: 'ms',
    details: {},
  });
  const timesMs: number[] = [];
  for (let time = 0; time < AGAIN; time++) {
    await product.stop();
    product = await startProduct(place);
    timesMs.push(product.startedInMs);
  }
  take({
    group: 'start-up',
    name: 'again',
    value: median(timesMs),
    unit: 'ms',
    details: { times: AGAIN, slowestMs: Math.round(Math.max(...timesMs)) },
  });
  return product;
}
