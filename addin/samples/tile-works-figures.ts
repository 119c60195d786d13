/**
 * The figures of the invented tile works: what it makes, what it buys, the hours it has. Invented throughout; sized like
 * a works that fires some three and a half thousand square metres a week.
 */

export interface Product {
  readonly name: string;
  readonly press: 'Small' | 'Large';
  readonly kiln: 'Roller' | 'Shuttle';
  readonly glaze: 'White glaze' | 'Colour glaze' | 'No glaze';
  /** € per m². */
  readonly price: number;
  /** kg per m². */
  readonly bodyKilograms: number;
  /** Per 100 m², as the three hours below. */
  readonly glazeLitres: number;
  readonly pressHours: number;
  readonly kilnHours: number;
  readonly packingHours: number;
  /** Per m². */
  readonly gasCubicMetres: number;
  /** m² that go on one pallet. */
  readonly palletSquareMetres: number;
  /** m²; below 0 where stock covers more than the orders. */
  readonly ordersLessStock: number;
  /** m². */
  readonly sellsAtMost: number;
  /** m²: what the planner made last week and starts from. */
  readonly made: number;
}

// prettier-ignore
const productFigures = [
  // name, press, kiln, glaze, price, body, glaze l, press h, kiln h, packing h, gas, pallet, orders less stock, sells, made
  ['Marl 10×20 white gloss', 'Small', 'Roller', 'White glaze', 21.5, 14.2, 38, 2.1, 2.4, 3.6, 1.9, 48, 420, 900, 560],
  ['Marl 10×20 sea green', 'Small', 'Roller', 'Colour glaze', 27.8, 14.2, 41, 2.1, 2.6, 4.1, 2.0, 48, 180, 520, 300],
  ['Heron 15×15 white gloss', 'Small', 'Roller', 'White glaze', 19.6, 13.0, 36, 1.8, 2.2, 3.3, 1.8, 54, 350, 800, 420],
  ['Heron 15×15 oxblood', 'Small', 'Shuttle', 'Colour glaze', 32.5, 13.0, 47, 1.9, 15.5, 4.6, 3.4, 54, -25, 240, 40],
  ['Lark 7×30 cream crackle', 'Small', 'Roller', 'White glaze', 28.6, 13.6, 44, 2.6, 2.9, 5.6, 2.2, 42, -60, 560, 330],
  ['Lark 7×30 cobalt crackle', 'Small', 'Roller', 'Colour glaze', 34.6, 13.6, 48, 2.6, 3.3, 6.0, 2.4, 42, 80, 320, 280],
  ['Sedge 20×20 matt grey', 'Large', 'Roller', 'White glaze', 24.2, 17.6, 33, 2.7, 3.0, 3.1, 2.3, 36, 300, 750, 380],
  ['Sedge 20×20 charcoal', 'Large', 'Roller', 'Colour glaze', 25.9, 17.6, 35, 2.7, 3.1, 3.1, 2.4, 36, 150, 600, 190],
  ['Fen 30×60 sand, roller kiln', 'Large', 'Roller', 'White glaze', 33.5, 22.5, 30, 3.4, 4.3, 3.8, 2.9, 30, 0, 760, 430],
  ['Fen 30×60 sand, shuttle kiln', 'Large', 'Shuttle', 'White glaze', 33.5, 22.5, 30, 3.4, 14.0, 4.2, 4.6, 30, 0, 300, 110],
  ['Quay 30×30 salt fired', 'Large', 'Shuttle', 'No glaze', 36.1, 20.4, 0, 2.9, 18.0, 3.4, 4.4, 32, 40, 300, 180],
  ['Quay 30×30 unglazed', 'Large', 'Roller', 'No glaze', 17.9, 20.4, 0, 2.9, 3.4, 2.6, 2.5, 32, -140, 500, 180],
] as const;

export const products: readonly Product[] = productFigures.map((figures) => ({
  name: figures[0],
  press: figures[1],
  kiln: figures[2],
  glaze: figures[3],
  price: figures[4],
  bodyKilograms: figures[5],
  glazeLitres: figures[6],
  pressHours: figures[7],
  kilnHours: figures[8],
  packingHours: figures[9],
  gasCubicMetres: figures[10],
  palletSquareMetres: figures[11],
  ordersLessStock: figures[12],
  sellsAtMost: figures[13],
  made: figures[14],
}));

/** In the order in which the Costs sheet lists them: clay, the three glazes, gas, packing. */
export const purchasePrices = [
  { input: 'Clay body', unit: 'kg', price: 0.19 },
  { input: 'White glaze', unit: 'l', price: 1.15 },
  { input: 'Colour glaze', unit: 'l', price: 3.4 },
  { input: 'No glaze', unit: 'l', price: 0 },
  { input: 'Gas', unit: 'm³', price: 0.62 },
  { input: 'Packing', unit: 'm²', price: 0.95 },
] as const;

/** Hours of a resource: shifts (firings for the shuttle kiln) × hours × the share of time it runs. */
export const resources = [
  { name: 'Small presses', shifts: 8, hoursPerShift: 7.5, running: 0.78 },
  { name: 'Large press', shifts: 8, hoursPerShift: 7.5, running: 0.84 },
  { name: 'Roller kiln', shifts: 14, hoursPerShift: 7.5, running: 0.94 },
  { name: 'Shuttle kiln', shifts: 5, hoursPerShift: 14, running: 0.95 },
  { name: 'Sorting and packing', shifts: 22, hoursPerShift: 7.5, running: 0.92 },
] as const;

/** € a week, whatever is made. */
export const weeklyCosts = [
  { name: 'Wages and shifts', amount: 38600 },
  { name: 'Rent, rates, insurance', amount: 7200 },
  { name: 'Power and maintenance', amount: 5400 },
] as const;
