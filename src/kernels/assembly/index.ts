/** All kernels as one module. Numbers and pointers only: memory is planned by the caller, nothing is imported. */
export { findRuns, numberRuns } from "./label-runs";
export { squaredDistances } from "./squared-distances";
export { greyOpening } from "./grey-opening";
export { rowDifferenceMedians } from "./row-difference-medians";
export { riseAboveGround } from "./rise-above-ground";
export { nearestAdmitted } from "./nearest-admitted";
export { dilate } from "./dilate";
export { subtractSurface } from "./subtract-surface";
export { colourMap } from "./colour-map";
