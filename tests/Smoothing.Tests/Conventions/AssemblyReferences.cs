using System.Collections.Immutable;
using System.Reflection;
using System.Reflection.Emit;
using System.Reflection.Metadata;
using System.Reflection.Metadata.Ecma335;
using System.Reflection.PortableExecutable;

namespace Smoothing.Tests.Conventions;

/// <summary>Reads a compiled assembly and lists which of its own namespaces each type uses: signatures, fields, bases and method bodies.</summary>
internal static class AssemblyReferences
{
    private static readonly OpCode[] s_codes = [.. typeof(OpCodes).GetFields(BindingFlags.Public | BindingFlags.Static).Select(f => (OpCode)f.GetValue(null)!)];
    private static readonly Dictionary<ushort, OpCode> s_byValue = s_codes.ToDictionary(c => (ushort)c.Value);

    public static IEnumerable<(string Type, string Namespace, string UsedType, string UsedNamespace)> Of(string path)
    {
        using var stream = File.OpenRead(path);
        using var pe = new PEReader(stream);
        MetadataReader reader = pe.GetMetadataReader();
        var found = new HashSet<(string, string, string, string)>();
        foreach (TypeDefinitionHandle handle in reader.TypeDefinitions)
        {
            (string name, string space) = Named(reader, handle);
            var used = new HashSet<TypeDefinitionHandle>();
            var decoder = new Collector(used);
            TypeDefinition type = reader.GetTypeDefinition(handle);
            Add(reader, type.BaseType, decoder, used);
            foreach (FieldDefinitionHandle field in type.GetFields())
            {
                reader.GetFieldDefinition(field).DecodeSignature(decoder, null);
            }

            foreach (MethodDefinitionHandle method in type.GetMethods())
            {
                MethodDefinition definition = reader.GetMethodDefinition(method);
                definition.DecodeSignature(decoder, null);
                if (definition.RelativeVirtualAddress != 0)
                {
                    Body(reader, pe.GetMethodBody(definition.RelativeVirtualAddress), decoder, used);
                }
            }

            foreach (TypeDefinitionHandle other in used)
            {
                (string otherName, string otherSpace) = Named(reader, other);
                found.Add((name, space, otherName, otherSpace));
            }
        }

        return found;
    }

    private static void Body(MetadataReader reader, MethodBodyBlock body, Collector decoder, HashSet<TypeDefinitionHandle> used)
    {
        if (!body.LocalSignature.IsNil)
        {
            reader.GetStandaloneSignature(body.LocalSignature).DecodeLocalSignature(decoder, null);
        }

        BlobReader il = body.GetILReader();
        while (il.RemainingBytes > 0)
        {
            ushort value = il.ReadByte();
            if (value == 0xFE)
            {
                value = (ushort)(0xFE00 | il.ReadByte());
            }

            OperandType operand = s_byValue[value].OperandType;
            switch (operand)
            {
                case OperandType.InlineField or OperandType.InlineMethod or OperandType.InlineTok or OperandType.InlineType:
                    Add(reader, MetadataTokens.EntityHandle(il.ReadInt32()), decoder, used);
                    break;
                case OperandType.InlineSwitch:
                    int targets = il.ReadInt32();
                    il.Offset += 4 * targets;
                    break;
                case OperandType.InlineI8 or OperandType.InlineR:
                    il.Offset += 8;
                    break;
                case OperandType.InlineVar:
                    il.Offset += 2;
                    break;
                case OperandType.ShortInlineBrTarget or OperandType.ShortInlineI or OperandType.ShortInlineVar:
                    il.Offset += 1;
                    break;
                case OperandType.InlineNone:
                    break;
                default:
                    il.Offset += 4;
                    break;
            }
        }
    }

    private static void Add(MetadataReader reader, EntityHandle handle, Collector decoder, HashSet<TypeDefinitionHandle> used)
    {
        if (handle.IsNil)
        {
            return;
        }

        switch (handle.Kind)
        {
            case HandleKind.TypeDefinition:
                used.Add((TypeDefinitionHandle)handle);
                break;
            case HandleKind.MethodDefinition:
                used.Add(reader.GetMethodDefinition((MethodDefinitionHandle)handle).GetDeclaringType());
                break;
            case HandleKind.FieldDefinition:
                used.Add(reader.GetFieldDefinition((FieldDefinitionHandle)handle).GetDeclaringType());
                break;
            case HandleKind.TypeSpecification:
                reader.GetTypeSpecification((TypeSpecificationHandle)handle).DecodeSignature(decoder, null);
                break;
            case HandleKind.MethodSpecification:
                MethodSpecification specification = reader.GetMethodSpecification((MethodSpecificationHandle)handle);
                specification.DecodeSignature(decoder, null);
                Add(reader, specification.Method, decoder, used);
                break;
            case HandleKind.MemberReference:
                Add(reader, reader.GetMemberReference((MemberReferenceHandle)handle).Parent, decoder, used);
                break;
            default:
                break;
        }
    }

    private static (string Name, string Namespace) Named(MetadataReader reader, TypeDefinitionHandle handle)
    {
        TypeDefinition type = reader.GetTypeDefinition(handle);
        string name = reader.GetString(type.Name);
        while (type.IsNested)
        {
            type = reader.GetTypeDefinition(type.GetDeclaringType());
            name = reader.GetString(type.Name) + "." + name;
        }

        return (name, reader.GetString(type.Namespace));
    }

    private sealed class Collector(HashSet<TypeDefinitionHandle> used) : ISignatureTypeProvider<int, object?>
    {
        public int GetTypeFromDefinition(MetadataReader reader, TypeDefinitionHandle handle, byte rawTypeKind)
        {
            used.Add(handle);
            return 0;
        }

        public int GetTypeFromSpecification(MetadataReader reader, object? genericContext, TypeSpecificationHandle handle, byte rawTypeKind) =>
            reader.GetTypeSpecification(handle).DecodeSignature(this, genericContext);

        public int GetArrayType(int elementType, ArrayShape shape) => 0;

        public int GetByReferenceType(int elementType) => 0;

        public int GetFunctionPointerType(MethodSignature<int> signature) => 0;

        public int GetGenericInstantiation(int genericType, ImmutableArray<int> typeArguments) => 0;

        public int GetGenericMethodParameter(object? genericContext, int index) => 0;

        public int GetGenericTypeParameter(object? genericContext, int index) => 0;

        public int GetModifiedType(int modifier, int unmodifiedType, bool isRequired) => 0;

        public int GetPinnedType(int elementType) => 0;

        public int GetPointerType(int elementType) => 0;

        public int GetPrimitiveType(PrimitiveTypeCode typeCode) => 0;

        public int GetSZArrayType(int elementType) => 0;

        public int GetTypeFromReference(MetadataReader reader, TypeReferenceHandle handle, byte rawTypeKind) => 0;
    }
}
