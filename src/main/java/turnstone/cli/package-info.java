/**
 * The command line: commands, their messages and exit codes, and the start of the program.
 * It may use every other package, and alone writes to standard output and standard error and ends the process.
 * No other package may know it.
 */
package turnstone.cli;
