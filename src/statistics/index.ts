export { t975, wilsonInterval, z975 } from "./intervals.ts";
export { mean, median, quantile, standardDeviation } from "./moments.ts";
