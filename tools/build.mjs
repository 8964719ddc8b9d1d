// npm run build: kernels, page (dist/page) and command line (dist/cli).
import { buildCommandLine, buildKernels, buildPage, installPackages } from "./prepare.mjs";

installPackages();
buildKernels();
buildPage();
buildCommandLine();
