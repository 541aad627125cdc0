namespace Permute.Design;

/// <summary>Which departures from the null hypothesis count as evidence.</summary>
public enum Direction
{
    /// <summary>Large T.</summary>
    Greater,

    /// <summary>Small T: works on −T, so values and critical values are positive for evidence.</summary>
    Less,

    /// <summary>Large |T|; clusters of each sign are formed apart and share one maximum.</summary>
    Both,
}
