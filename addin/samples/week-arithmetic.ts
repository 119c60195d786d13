/**
 * What the sample's formulas work out, from the same figures and in the same order of operations: the values stored
 * beside them.
 */
import { products, purchasePrices, resources, weeklyCosts, type Product } from './tile-works-figures';

export const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0);
export const sumOf = (value: (product: Product) => number): number => sum(products.map(value));

/** Money left from a square metre after clay, glaze, gas and packing, as the Costs sheet works it out. */
export function contribution(product: Product): number {
  const [clay, white, colour, none, gas, packing] = purchasePrices.map((input) => input.price);
  const glaze = { 'White glaze': white, 'Colour glaze': colour, 'No glaze': none }[product.glaze];
  return (
    product.price -
    product.bodyKilograms * clay -
    (product.glazeLitres / 100) * glaze -
    product.gasCubicMetres * gas -
    packing
  );
}

export const pressHours = (product: Product): number => (product.made * product.pressHours) / 100;
export const kilnHours = (product: Product): number => (product.made * product.kilnHours) / 100;
export const glazeLitres = (product: Product): number => (product.made * product.glazeLitres) / 100;
export const bodyTonnes = (product: Product): number => (product.made * product.bodyKilograms) / 1000;
export const gasCubicMetres = (product: Product): number => product.made * product.gasCubicMetres;
export const packingHours = (product: Product): number => (product.made * product.packingHours) / 100;

export const availableHours = (name: string): number => {
  const resource = resources.find((candidate) => candidate.name === name);
  if (resource === undefined) {
    throw new RangeError(`${name} has no hours.`);
  }
  return resource.shifts * resource.hoursPerShift * resource.running;
};

export const fixedCosts = sum(weeklyCosts.map((cost) => cost.amount));
