/** How the converting process ends: with a result, or for one of these. */
export const EXIT = { done: 0, parentGone: 3, tooSlow: 4, tooMuchMemory: 5, crashed: 6 };
