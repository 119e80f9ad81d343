namespace CarryTest.Market.Faults;

/// <summary>The input is wrong. The message is for the person who must mend it: what was found, what was expected, where, what to do. It is shown without a stack trace.</summary>
/// <param name="message">complete sentences; places as file, row group, row, column or file:line:column</param>
/// <param name="inner">the cause, for a debugger</param>
public class InputException(string message, Exception? inner = null) : Exception(message, inner);
