export * from './common';
export * from './labs';
export * from './cabinet';
export * from './benches';
export * from './protocols';
export * from './versions';
export * from './runs';
export * from './home';
