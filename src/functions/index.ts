// The functions bundle. The build adds a call of CustomFunctions.associate for every worksheet function of these files.

export * from './landing';
export * from './rates';
export * from './spurs';
export * from './filter';
export * from './noise';
export * from './converter';
