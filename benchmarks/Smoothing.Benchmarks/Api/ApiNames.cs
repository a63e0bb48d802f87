using System.Globalization;
using System.Reflection;

namespace Smoothing.Benchmarks.Api;

/// <summary>Types and members as C# writes them, and as the documentation file names them.</summary>
internal static class ApiNames
{
    private static readonly Dictionary<Type, string> s_keywords = new()
    {
        [typeof(double)] = "double", [typeof(int)] = "int", [typeof(long)] = "long", [typeof(ulong)] = "ulong", [typeof(bool)] = "bool", [typeof(string)] = "string", [typeof(void)] = "void", [typeof(byte)] = "byte", [typeof(object)] = "object",
    };

    public static string Of(Type type)
    {
        if (type.IsByRef)
        {
            return Of(type.GetElementType()!);
        }

        if (s_keywords.TryGetValue(type, out string? keyword))
        {
            return keyword;
        }

        if (type.IsArray)
        {
            return Of(type.GetElementType()!) + "[]";
        }

        if (Nullable.GetUnderlyingType(type) is { } inner)
        {
            return Of(inner) + "?";
        }

        string name = type.IsNested && !type.IsGenericParameter ? Of(type.DeclaringType!) + "." + type.Name : type.Name;
        return type.IsGenericType ? name.Split('`')[0] + "<" + string.Join(", ", type.GetGenericArguments().Select(Of)) + ">" : name;
    }

    public static string Declaration(Type type)
    {
        bool record = type.GetMethod("<Clone>$") is not null;
        string kind = type.IsEnum ? "enum" : type.IsInterface ? "interface" : type.IsValueType ? "readonly struct" : record ? "record" : "class";
        string manner = type.IsEnum || type.IsValueType ? "" : type.IsAbstract && type.IsSealed ? "static " : type.IsAbstract ? "abstract " : type.IsSealed ? "sealed " : "";
        string parent = type is { IsClass: true, BaseType: { } above } && above != typeof(object) ? " : " + Of(above) : "";
        return $"public {manner}{kind} {Of(type)}{parent}";
    }

    public static string Signature(MemberInfo member) => member switch
    {
        ConstructorInfo c => $"`{c.DeclaringType!.Name}({Parameters(c)})`",
        PropertyInfo p => $"`{(p.GetMethod!.IsStatic ? "static " : "")}{Of(p.PropertyType)} {p.Name}`",
        MethodInfo m => $"`{(m.IsStatic ? "static " : "")}{Of(m.ReturnType)} {(m.Name.StartsWith("op_", StringComparison.Ordinal) ? "operator " + m.Name[3..] : m.Name)}({Parameters(m)})`",
        FieldInfo f => $"`{(f.IsLiteral ? "const " : "")}{Of(f.FieldType)} {f.Name}`",
        _ => $"`{member.Name}`",
    };

    /// <summary>Constructors, properties, methods.</summary>
    public static int Rank(MemberInfo member) => member switch { ConstructorInfo => 0, FieldInfo => 1, PropertyInfo => 2, _ => 3 };

    /// <summary>The member's name in the documentation file; null for what is no member of its own.</summary>
    public static string? Id(MemberInfo member) => member switch
    {
        ConstructorInfo c => $"M:{Plain(c.DeclaringType!)}.#ctor{Arguments(c)}",
        PropertyInfo p => $"P:{Plain(p.DeclaringType!)}.{p.Name}",
        FieldInfo f => $"F:{Plain(f.DeclaringType!)}.{f.Name}",
        MethodInfo { IsSpecialName: true } m when !m.Name.StartsWith("op_", StringComparison.Ordinal) => null,
        MethodInfo m => $"M:{Plain(m.DeclaringType!)}.{m.Name}{Arguments(m)}{(m.Name is "op_Implicit" or "op_Explicit" ? "~" + Full(m.ReturnType) : "")}",
        _ => null,
    };

    private static string Parameters(MethodBase method) => string.Join(", ", method.GetParameters().Select(p => $"{(p.IsOut ? "out " : "")}{Of(p.ParameterType)} {p.Name}{Default(p)}"));

    private static string Default(ParameterInfo parameter) => !parameter.HasDefaultValue ? "" : " = " + parameter.DefaultValue switch
    {
        null => parameter.ParameterType.IsValueType && Nullable.GetUnderlyingType(parameter.ParameterType) is null ? "default" : "null",
        bool b => b ? "true" : "false",
        string s => "\"" + s + "\"",
        object value when parameter.ParameterType.IsEnum => Enum.GetName(parameter.ParameterType, value) ?? value.ToString(),
        object value => Convert.ToString(value, CultureInfo.InvariantCulture),
    };

    private static string Arguments(MethodBase method)
    {
        ParameterInfo[] parameters = method.GetParameters();
        string generic = method.IsGenericMethod ? "``" + method.GetGenericArguments().Length : "";
        return generic + (parameters.Length == 0 ? "" : "(" + string.Join(",", parameters.Select(p => Full(p.ParameterType))) + ")");
    }

    private static string Plain(Type type) => type.FullName!.Replace('+', '.');

    private static string Full(Type type)
    {
        if (type.IsByRef)
        {
            return Full(type.GetElementType()!) + "@";
        }

        if (type.IsArray)
        {
            return Full(type.GetElementType()!) + "[]";
        }

        if (type.IsGenericParameter)
        {
            return "``" + type.GenericParameterPosition;
        }

        if (!type.IsGenericType)
        {
            return Plain(type);
        }

        return Plain(type.GetGenericTypeDefinition()).Split('`')[0] + "{" + string.Join(",", type.GetGenericArguments().Select(Full)) + "}";
    }
}
