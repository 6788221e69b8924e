/** What the kernel says of itself. */
import packageJson from "../../package.json" with { type: "json" };
import { PROTOCOL_VERSION, type ReplyContent } from "./messages.ts";

/** The kernel's name, in kernel specifications and notebooks. */
export const KERNEL_NAME = "twoplace";
export const KERNEL_DISPLAY_NAME = "Twoplace";
export const KERNEL_VERSION: string = packageJson.version;

export const languageInfo = {
  name: KERNEL_NAME,
  version: KERNEL_VERSION,
  mimetype: "text/x-twoplace",
  file_extension: ".twoplace",
  // Named, since converters otherwise look for a lexer by the language's name and warn.
  pygments_lexer: "text",
};

export const kernelInfo: ReplyContent<"kernel_info_reply"> = {
  status: "ok",
  protocol_version: PROTOCOL_VERSION,
  implementation: KERNEL_NAME,
  implementation_version: KERNEL_VERSION,
  language_info: languageInfo,
  banner: `Twoplace ${KERNEL_VERSION}: checks of axioms of a relation, answered with evidence`,
  help_links: [],
  supported_features: [],
};
