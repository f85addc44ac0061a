"""What moved between two surveys: python3 examples/python/confirmations.py [request.json]"""

from client import post_calculation, read_request

answer = post_calculation("/v1/confirmations", read_request("confirmations/casing-moved-same-set-up"))
unit, result = answer["units"]["offset"], answer["result"]


def vector(of):
    return f"h {of['h']:.4f} {unit}, v {of['v']:.4f} {unit}"


print(f"Record {answer['id']}")
for caution in answer["cautions"]:
    print(f"Caution: {caution['text']}")
words = {True: "repeat", False: "do not repeat", None: "are not shown to repeat"}
print(f"Reference stations {words[result['reference']['repeats']]}")
for moved in result["moved"]:
    achieved = vector(moved["achieved"]) if moved["achieved"] else "not known"
    planned = vector(moved["planned"]) if moved["planned"] else "nothing"
    print(f"{moved['id']}: planned {planned}; achieved {achieved}")
print(f"Unexpected: {', '.join(result['unexpected']) or 'none'}")
print(f"Outstanding: {', '.join(result['outstanding']) or 'none'}")
for warning in result["warnings"]:
    print(f"  {warning['code']}: {warning['detail']}")
