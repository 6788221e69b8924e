/** z3-solver, a general SMT library, as an oracle and for comparison. */
import { init } from "z3-solver";

export interface Reading {
  /** Null when the text was read without a mistake. */
  readonly mistake: string | null;
  readonly assertions: number;
  /** 1 satisfiable, -1 unsatisfiable, 0 neither within the limit; null when nothing was asked. */
  readonly answer: -1 | 0 | 1 | null;
  /** Wall-clock time of reading and answering. */
  readonly milliseconds: number;
}

/** `rlimit` counts units of work, so that z3 ends at the same place each time; `timeout` is in milliseconds. */
export type Limit = { readonly rlimit: number } | { readonly timeout: number };

export interface Oracle {
  /** Reads SMT-LIB text and, where asked for, says whether its assertions are satisfiable. */
  readonly read: (text: string, limit: Limit, asks: boolean) => Promise<Reading>;
  /** Ends its threads. */
  readonly close: () => void;
}

export async function startOracle(): Promise<Oracle> {
  const { Z3, em } = await init();
  const read = async (text: string, limit: Limit, asks: boolean): Promise<Reading> => {
    const config = Z3.mk_config();
    const context = Z3.mk_context(config);
    Z3.del_config(config);
    const solver = Z3.mk_solver(context);
    Z3.solver_inc_ref(context, solver);
    const parameters = Z3.mk_params(context);
    Z3.params_inc_ref(context, parameters);
    for (const [name, value] of Object.entries(limit))
      Z3.params_set_uint(context, parameters, Z3.mk_string_symbol(context, name), value);
    Z3.solver_set_params(context, solver, parameters);
    const start = performance.now();
    let mistake: string | null = null;
    try {
      Z3.solver_from_string(context, solver, text);
      const code = Z3.get_error_code(context);
      if (code !== 0) mistake = Z3.get_error_msg(context, code);
    } catch (error) {
      mistake = String(error);
    }
    const answer = asks && mistake === null ? await Z3.solver_check(context, solver) : null;
    const milliseconds = performance.now() - start;
    const held = Z3.solver_get_assertions(context, solver);
    Z3.ast_vector_inc_ref(context, held);
    const assertions = Z3.ast_vector_size(context, held);
    Z3.ast_vector_dec_ref(context, held);
    Z3.params_dec_ref(context, parameters);
    Z3.solver_dec_ref(context, solver);
    Z3.del_context(context);
    return { mistake, assertions, answer: answer as Reading["answer"], milliseconds };
  };
  return { read, close: () => em.PThread.terminateAllThreads() };
}
