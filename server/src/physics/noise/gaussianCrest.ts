/** Peak of Gaussian noise in terms of its rms value: exceeded 0.1 % of the time, both signs together (quantile of the normal distribution, 3.2905). */
export const gaussianCrest = 3.29;
