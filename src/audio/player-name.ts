/** Under which the audio thread's part is registered. */
export const playerName = 'stepwell-player';
