namespace CarryTest.History.Writing;

/// <summary>One row of a chain file: a strike's call and put at one instant. Prices are unscaled: ten-thousandths of the currency, 0 = no quote.</summary>
/// <param name="QuotedAt">UTC</param>
/// <param name="Expiry">the contract's own expiry date</param>
/// <param name="Strike">thousandths of the currency</param>
/// <param name="CallBid">ten-thousandths</param>
/// <param name="CallAsk">ten-thousandths</param>
/// <param name="PutBid">ten-thousandths</param>
/// <param name="PutAsk">ten-thousandths</param>
/// <param name="UnderlyingBid">ten-thousandths</param>
/// <param name="UnderlyingAsk">ten-thousandths</param>
/// <param name="CallBidSize">contracts</param>
/// <param name="CallAskSize">contracts</param>
/// <param name="PutBidSize">contracts</param>
/// <param name="PutAskSize">contracts</param>
/// <param name="UnderlyingBidSize">shares</param>
/// <param name="UnderlyingAskSize">shares</param>
public readonly record struct StrikeRow(
    DateTime QuotedAt, DateOnly Expiry, int Strike, int CallBid, int CallAsk, int PutBid, int PutAsk, int UnderlyingBid, int UnderlyingAsk,
    int CallBidSize, int CallAskSize, int PutBidSize, int PutAskSize, int UnderlyingBidSize, int UnderlyingAskSize);
