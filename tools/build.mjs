// npm run build: kernels, page (dist/page) and command line (dist/cli).
import { buildCommandLine, buildPage, installPackages } from "./prepare.mjs";

installPackages();
buildPage();
buildCommandLine();
