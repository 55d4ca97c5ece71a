/** Counts up when any change makes a run give other bytes; results remember the number they were made with. */
export const ENGINE = 2;
