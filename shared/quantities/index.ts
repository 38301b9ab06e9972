export { formatQuantity, quantityText } from './format-quantity.ts';
export { parseQuantity, type QuantityReading } from './parse-quantity.ts';
