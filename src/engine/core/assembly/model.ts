/** The formulas of one model, imported from its own emitted module over the shared memory. */
@external('model', 'prepare') export declare function prepare(): void;
@external('model', 'rhs') export declare function rhs(t: f64, u: usize, out: usize): void;
@external('model', 'jacobian') export declare function jacobian(t: f64, u: usize, out: usize): void;

/** Functions of the host: those of AssemblyScript's own library keep tables in memory, where the model's numbers lie. */
@external('math', 'exp') export declare function exp(x: f64): f64;
@external('math', 'log') export declare function log(x: f64): f64;
@external('math', 'pow') export declare function pow(x: f64, y: f64): f64;
