/**
 * The one exception that a user may see, and what it says.
 *
 * <p>Owns the kinds of refusal, their exit codes and the form of their message. Knows no other package.
 */
package turnstone.fault;
