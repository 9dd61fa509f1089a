/** Speed of light in vacuum, km/s: exact by the definition of the metre (BIPM, SI brochure, 9th edition). */
export const SPEED_OF_LIGHT_KM_S = 299_792.458;
