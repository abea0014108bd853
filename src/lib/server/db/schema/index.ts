export * from './catalog';
export * from './jobs';
export * from './mail';
export * from './metal';
export * from './orders';
export * from './people';
export * from './plans';
